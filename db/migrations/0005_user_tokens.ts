import { ASCII, EXACT, ID, oneOf, table } from '../columns'

export const { up, down } = table('user_tokens', `
  ${ID},
  kind VARCHAR(20) ${ASCII} NOT NULL,
  token_hash CHAR(64) ${ASCII} NOT NULL,
  user_id BIGINT UNSIGNED NULL,
  email VARCHAR(254) ${EXACT} NULL,
  payload JSON NULL,
  created_at DATETIME(3) NOT NULL,
  expires_at DATETIME(3) NOT NULL,
  used_at DATETIME(3) NULL,
  CONSTRAINT uq_user_tokens_hash UNIQUE (token_hash),
  INDEX ix_user_tokens_user (user_id, kind, used_at),
  INDEX ix_user_tokens_email (email, kind),
  INDEX ix_user_tokens_expires (expires_at),
  CONSTRAINT fk_user_tokens_user FOREIGN KEY (user_id) REFERENCES users (id),
  ${oneOf('ck_user_tokens_kind', 'kind', ['confirm_email', 'reset_password', 'change_email', 'invite', 'first_registrar', 'claim'])},
  CONSTRAINT ck_user_tokens_for CHECK (user_id IS NOT NULL OR email IS NOT NULL OR kind IN ('claim', 'first_registrar')),
  CONSTRAINT ck_user_tokens_expires CHECK (expires_at > created_at)
`)
