import { ASCII, ID, UID, oneOf, table } from '../columns'

export const { up, down } = table('jobs', `
  ${ID},
  ${UID},
  kind VARCHAR(40) ${ASCII} NOT NULL,
  payload JSON NOT NULL,
  state VARCHAR(10) ${ASCII} NOT NULL DEFAULT 'waiting',
  progress SMALLINT UNSIGNED NOT NULL DEFAULT 0,
  attempts SMALLINT UNSIGNED NOT NULL DEFAULT 0,
  run_at DATETIME(3) NOT NULL,
  claimed_until DATETIME(3) NULL,
  heartbeat_at DATETIME(3) NULL,
  cancel_at DATETIME(3) NULL,
  done_at DATETIME(3) NULL,
  last_error VARCHAR(1000) NULL,
  result JSON NULL,
  created_by BIGINT UNSIGNED NULL,
  created_at DATETIME(3) NOT NULL,
  CONSTRAINT uq_jobs_uid UNIQUE (uid),
  INDEX ix_jobs_due (state, run_at, id),
  INDEX ix_jobs_kind (kind, created_at),
  INDEX ix_jobs_created_by (created_by),
  CONSTRAINT fk_jobs_created_by FOREIGN KEY (created_by) REFERENCES users (id),
  ${oneOf('ck_jobs_state', 'state', ['waiting', 'done', 'failed', 'cancelled'])},
  CONSTRAINT ck_jobs_done CHECK ((state = 'waiting') = (done_at IS NULL)),
  CONSTRAINT ck_jobs_progress CHECK (progress <= 100)
`)
