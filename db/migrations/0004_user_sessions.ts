import { ASCII, ID, UID, table } from '../columns'

export const { up, down } = table('user_sessions', `
  ${ID},
  ${UID},
  user_id BIGINT UNSIGNED NOT NULL,
  created_at DATETIME(3) NOT NULL,
  last_seen_at DATETIME(3) NOT NULL,
  expires_at DATETIME(3) NOT NULL,
  ended_at DATETIME(3) NULL,
  user_agent VARCHAR(300) NULL,
  address_hash CHAR(64) ${ASCII} NULL,
  second_factor_at DATETIME(3) NULL,
  reauth_at DATETIME(3) NULL,
  CONSTRAINT uq_user_sessions_uid UNIQUE (uid),
  INDEX ix_user_sessions_user (user_id, ended_at, expires_at),
  INDEX ix_user_sessions_expires (expires_at),
  CONSTRAINT fk_user_sessions_user FOREIGN KEY (user_id) REFERENCES users (id)
`)
