import { ASCII, ID, oneOf, table } from '../columns'

export const { up, down } = table('stake_declarations', `
  ${ID},
  entry_id BIGINT UNSIGNED NOT NULL,
  user_id BIGINT UNSIGNED NOT NULL,
  kind VARCHAR(10) ${ASCII} NOT NULL,
  reason VARCHAR(1000) NULL,
  declared_at DATETIME(3) NOT NULL,
  CONSTRAINT uq_stake_declarations_one UNIQUE (entry_id, user_id, kind),
  INDEX ix_stake_declarations_user (user_id),
  CONSTRAINT fk_stake_declarations_entry FOREIGN KEY (entry_id) REFERENCES entries (id),
  CONSTRAINT fk_stake_declarations_user FOREIGN KEY (user_id) REFERENCES users (id),
  ${oneOf('ck_stake_declarations_kind', 'kind', ['shop', 'other'])}
`)
