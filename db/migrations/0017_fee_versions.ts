import { ASCII, table } from '../columns'

export const { up, down } = table('fee_versions', `
  version INT UNSIGNED NOT NULL PRIMARY KEY,
  from_on DATE NOT NULL,
  currency CHAR(3) ${ASCII} NOT NULL,
  created_by BIGINT UNSIGNED NULL,
  created_at DATETIME(3) NOT NULL,
  CONSTRAINT uq_fee_versions_currency UNIQUE (version, currency),
  INDEX ix_fee_versions_from (from_on),
  INDEX ix_fee_versions_created_by (created_by),
  CONSTRAINT fk_fee_versions_created_by FOREIGN KEY (created_by) REFERENCES users (id),
  CONSTRAINT ck_fee_versions_currency CHECK (currency REGEXP '^[A-Z]{3}$')
`)
