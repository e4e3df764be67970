import { ASCII, ID, table } from '../columns'

export const { up, down } = table('recovery_codes', `
  ${ID},
  user_id BIGINT UNSIGNED NOT NULL,
  code_hash CHAR(64) ${ASCII} NOT NULL,
  created_at DATETIME(3) NOT NULL,
  used_at DATETIME(3) NULL,
  CONSTRAINT uq_recovery_codes_hash UNIQUE (user_id, code_hash),
  CONSTRAINT fk_recovery_codes_user FOREIGN KEY (user_id) REFERENCES users (id)
`)
