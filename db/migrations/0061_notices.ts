import { ASCII, EXACT, ID, UID, oneOf, table } from '../columns'

export const { up, down } = table('notices', `
  ${ID},
  ${UID},
  template VARCHAR(60) ${ASCII} NOT NULL,
  user_id BIGINT UNSIGNED NULL,
  to_email VARCHAR(254) ${EXACT} NOT NULL,
  entry_id BIGINT UNSIGNED NULL,
  args JSON NOT NULL,
  locale VARCHAR(12) ${ASCII} NOT NULL DEFAULT 'en',
  state VARCHAR(10) ${ASCII} NOT NULL DEFAULT 'waiting',
  attempts SMALLINT UNSIGNED NOT NULL DEFAULT 0,
  run_at DATETIME(3) NOT NULL,
  claimed_until DATETIME(3) NULL,
  sent_at DATETIME(3) NULL,
  message_id VARCHAR(255) ${ASCII} NULL,
  last_error VARCHAR(1000) NULL,
  created_at DATETIME(3) NOT NULL,
  CONSTRAINT uq_notices_uid UNIQUE (uid),
  INDEX ix_notices_due (state, run_at, id),
  INDEX ix_notices_entry (entry_id, created_at),
  INDEX ix_notices_user (user_id, created_at),
  INDEX ix_notices_created (created_at, id),
  CONSTRAINT fk_notices_user FOREIGN KEY (user_id) REFERENCES users (id),
  CONSTRAINT fk_notices_entry FOREIGN KEY (entry_id) REFERENCES entries (id),
  ${oneOf('ck_notices_state', 'state', ['waiting', 'sent', 'failed'])},
  CONSTRAINT ck_notices_sent CHECK ((state = 'sent') = (sent_at IS NOT NULL))
`)
