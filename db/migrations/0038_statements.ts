import { ASCII, ID, UID, oneOf, table } from '../columns'

export const { up, down } = table('statements', `
  ${ID},
  ${UID},
  entry_id BIGINT UNSIGNED NOT NULL,
  text_version INT UNSIGNED NOT NULL,
  locale VARCHAR(12) ${ASCII} NOT NULL DEFAULT 'en',
  part VARCHAR(10) ${ASCII} NOT NULL,
  signer_name VARCHAR(120) NOT NULL,
  user_id BIGINT UNSIGNED NULL,
  body_hash CHAR(64) ${ASCII} NOT NULL,
  signed_at DATETIME(3) NOT NULL,
  voided_at DATETIME(3) NULL,
  standing_part VARCHAR(10) ${ASCII} GENERATED ALWAYS AS (IF(voided_at IS NULL, part, NULL)) STORED,
  CONSTRAINT uq_statements_uid UNIQUE (uid),
  CONSTRAINT uq_statements_standing UNIQUE (entry_id, standing_part),
  INDEX ix_statements_text (text_version, locale),
  INDEX ix_statements_user (user_id),
  CONSTRAINT fk_statements_entry FOREIGN KEY (entry_id) REFERENCES entries (id),
  CONSTRAINT fk_statements_text FOREIGN KEY (text_version, locale) REFERENCES statement_texts (version, locale),
  CONSTRAINT fk_statements_user FOREIGN KEY (user_id) REFERENCES users (id),
  ${oneOf('ck_statements_part', 'part', ['hunter', 'finder', 'owner', 'club', 'guardian', 'heir'])}
`)
