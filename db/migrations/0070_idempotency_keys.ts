import { ASCII, EXACT, oneOf, table } from '../columns'

export const { up, down } = table('idempotency_keys', `
  user_id BIGINT UNSIGNED NOT NULL,
  route VARCHAR(120) ${ASCII} NOT NULL,
  \`key\` VARCHAR(200) ${EXACT} NOT NULL,
  body_hash CHAR(64) ${ASCII} NOT NULL,
  state VARCHAR(10) ${ASCII} NOT NULL DEFAULT 'running',
  status SMALLINT UNSIGNED NULL,
  response LONGTEXT NULL,
  created_at DATETIME(3) NOT NULL,
  PRIMARY KEY (user_id, route, \`key\`),
  INDEX ix_idempotency_keys_created (created_at),
  CONSTRAINT fk_idempotency_keys_user FOREIGN KEY (user_id) REFERENCES users (id),
  ${oneOf('ck_idempotency_keys_state', 'state', ['running', 'done'])},
  CONSTRAINT ck_idempotency_keys_done CHECK (state = 'running' OR status IS NOT NULL)
`)
