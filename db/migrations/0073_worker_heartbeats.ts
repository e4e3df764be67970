import { ASCII, table } from '../columns'

/** One row a running worker; /api/health reads the newest. */
export const { up, down } = table('worker_heartbeats', `
  name VARCHAR(100) ${ASCII} NOT NULL PRIMARY KEY,
  started_at DATETIME(3) NOT NULL,
  seen_at DATETIME(3) NOT NULL,
  INDEX ix_worker_heartbeats_seen (seen_at)
`)
