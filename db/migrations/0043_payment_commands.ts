import { ASCII, ID, oneOf, table } from '../columns'

export const { up, down } = table('payment_commands', `
  ${ID},
  kind VARCHAR(30) ${ASCII} NOT NULL,
  idempotency_key VARCHAR(100) ${ASCII} NOT NULL,
  entry_id BIGINT UNSIGNED NOT NULL,
  checkout_id BIGINT UNSIGNED NULL,
  payload JSON NOT NULL,
  state VARCHAR(10) ${ASCII} NOT NULL DEFAULT 'waiting',
  attempts SMALLINT UNSIGNED NOT NULL DEFAULT 0,
  run_at DATETIME(3) NOT NULL,
  claimed_until DATETIME(3) NULL,
  created_at DATETIME(3) NOT NULL,
  done_at DATETIME(3) NULL,
  last_error VARCHAR(1000) NULL,
  CONSTRAINT uq_payment_commands_key UNIQUE (idempotency_key),
  INDEX ix_payment_commands_due (state, run_at, id),
  INDEX ix_payment_commands_entry (entry_id),
  INDEX ix_payment_commands_checkout (checkout_id),
  CONSTRAINT fk_payment_commands_entry FOREIGN KEY (entry_id) REFERENCES entries (id),
  CONSTRAINT fk_payment_commands_checkout FOREIGN KEY (checkout_id) REFERENCES checkouts (id),
  ${oneOf('ck_payment_commands_state', 'state', ['waiting', 'done', 'failed'])},
  CONSTRAINT ck_payment_commands_done CHECK ((state = 'done') = (done_at IS NOT NULL))
`)
