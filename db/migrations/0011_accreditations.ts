import { ASCII, ID, UID, table } from '../columns'

export const { up, down } = table('accreditations', `
  ${ID},
  ${UID},
  user_id BIGINT UNSIGNED NOT NULL,
  number VARCHAR(20) ${ASCII} NOT NULL,
  valid_from DATE NOT NULL,
  valid_to DATE NOT NULL,
  suspended_at DATETIME(3) NULL,
  created_at DATETIME(3) NOT NULL,
  CONSTRAINT uq_accreditations_uid UNIQUE (uid),
  CONSTRAINT uq_accreditations_number UNIQUE (number),
  INDEX ix_accreditations_user (user_id, valid_to),
  INDEX ix_accreditations_valid_to (valid_to),
  CONSTRAINT fk_accreditations_user FOREIGN KEY (user_id) REFERENCES users (id),
  CONSTRAINT ck_accreditations_span CHECK (valid_to >= valid_from)
`)
