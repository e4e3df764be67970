import { ASCII, ID, table } from '../columns'

export const { up, down } = table('entry_events', `
  ${ID},
  entry_id BIGINT UNSIGNED NOT NULL,
  seq INT UNSIGNED NOT NULL,
  at DATETIME(3) NOT NULL,
  kind VARCHAR(40) ${ASCII} NOT NULL,
  from_state VARCHAR(20) ${ASCII} NULL,
  to_state VARCHAR(20) ${ASCII} NULL,
  actor_user_id BIGINT UNSIGNED NULL,
  args JSON NOT NULL,
  commitments JSON NOT NULL,
  prev_hash CHAR(64) ${ASCII} NULL,
  hash CHAR(64) ${ASCII} NOT NULL,
  CONSTRAINT uq_entry_events_seq UNIQUE (entry_id, seq),
  CONSTRAINT uq_entry_events_hash UNIQUE (hash),
  INDEX ix_entry_events_at (at, id),
  INDEX ix_entry_events_actor (actor_user_id, at),
  CONSTRAINT fk_entry_events_entry FOREIGN KEY (entry_id) REFERENCES entries (id),
  CONSTRAINT fk_entry_events_actor FOREIGN KEY (actor_user_id) REFERENCES users (id),
  CONSTRAINT ck_entry_events_seq CHECK (seq > 0),
  CONSTRAINT ck_entry_events_prev CHECK (seq = 1 OR prev_hash IS NOT NULL),
  CONSTRAINT ck_entry_events_hash CHECK (hash REGEXP '^[0-9a-f]{64}$')
`)
