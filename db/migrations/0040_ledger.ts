import { ASCII, ID, UID, oneOf, table } from '../columns'

export const { up, down } = table('ledger', `
  ${ID},
  ${UID},
  entry_id BIGINT UNSIGNED NOT NULL,
  kind VARCHAR(16) ${ASCII} NOT NULL,
  amount_minor BIGINT UNSIGNED NOT NULL,
  currency CHAR(3) ${ASCII} NOT NULL,
  provider_id VARCHAR(255) ${ASCII} NULL,
  checkout_id BIGINT UNSIGNED NULL,
  by_user_id BIGINT UNSIGNED NULL,
  reason VARCHAR(500) NULL,
  at DATETIME(3) NOT NULL,
  CONSTRAINT uq_ledger_uid UNIQUE (uid),
  CONSTRAINT uq_ledger_provider UNIQUE (provider_id),
  INDEX ix_ledger_entry (entry_id, at),
  INDEX ix_ledger_at (at),
  INDEX ix_ledger_checkout (checkout_id),
  INDEX ix_ledger_by (by_user_id),
  CONSTRAINT fk_ledger_entry FOREIGN KEY (entry_id) REFERENCES entries (id),
  CONSTRAINT fk_ledger_checkout FOREIGN KEY (checkout_id) REFERENCES checkouts (id),
  CONSTRAINT fk_ledger_by FOREIGN KEY (by_user_id) REFERENCES users (id),
  ${oneOf('ck_ledger_kind', 'kind', ['charge', 'refund', 'dispute', 'waiver', 'office_payment'])},
  CONSTRAINT ck_ledger_currency CHECK (currency REGEXP '^[A-Z]{3}$'),
  CONSTRAINT ck_ledger_office CHECK (kind NOT IN ('waiver', 'office_payment') OR (by_user_id IS NOT NULL AND reason IS NOT NULL)),
  CONSTRAINT ck_ledger_provider CHECK (kind <> 'charge' OR provider_id IS NOT NULL)
`)
