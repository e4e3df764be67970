import { ASCII, ID, table } from '../columns'

export const { up, down } = table('fees', `
  ${ID},
  version INT UNSIGNED NOT NULL,
  class_id BIGINT UNSIGNED NULL,
  amount_minor BIGINT UNSIGNED NOT NULL,
  currency CHAR(3) ${ASCII} NOT NULL,
  class_key BIGINT UNSIGNED GENERATED ALWAYS AS (IFNULL(class_id, 0)) STORED,
  CONSTRAINT uq_fees_version_class UNIQUE (version, class_key),
  INDEX ix_fees_class (class_id),
  INDEX ix_fees_version_currency (version, currency),
  CONSTRAINT fk_fees_version FOREIGN KEY (version, currency) REFERENCES fee_versions (version, currency),
  CONSTRAINT fk_fees_class FOREIGN KEY (class_id) REFERENCES classes (id)
`)
