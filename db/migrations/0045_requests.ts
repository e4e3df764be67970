import { ASCII, ID, UID, table } from '../columns'

export const { up, down } = table('requests', `
  ${ID},
  ${UID},
  entry_id BIGINT UNSIGNED NOT NULL,
  kind VARCHAR(20) ${ASCII} NOT NULL,
  text VARCHAR(2000) NOT NULL,
  wants JSON NOT NULL DEFAULT '[]',
  asked_by BIGINT UNSIGNED NULL,
  asked_at DATETIME(3) NOT NULL,
  answered_at DATETIME(3) NULL,
  answer_text VARCHAR(2000) NULL,
  answered_by BIGINT UNSIGNED NULL,
  closed_at DATETIME(3) NULL,
  CONSTRAINT uq_requests_uid UNIQUE (uid),
  INDEX ix_requests_entry (entry_id, closed_at, asked_at),
  INDEX ix_requests_asked_by (asked_by),
  INDEX ix_requests_answered_by (answered_by),
  CONSTRAINT fk_requests_entry FOREIGN KEY (entry_id) REFERENCES entries (id),
  CONSTRAINT fk_requests_asked_by FOREIGN KEY (asked_by) REFERENCES users (id),
  CONSTRAINT fk_requests_answered_by FOREIGN KEY (answered_by) REFERENCES users (id),
  CONSTRAINT ck_requests_text CHECK (CHAR_LENGTH(TRIM(text)) > 0),
  CONSTRAINT ck_requests_answered CHECK ((answered_at IS NULL) = (answered_by IS NULL))
`)
