import { ASCII, table } from '../columns'

export const { up, down } = table('checks', `
  entry_id BIGINT UNSIGNED NOT NULL,
  code VARCHAR(40) ${ASCII} NOT NULL,
  ticked_by BIGINT UNSIGNED NOT NULL,
  ticked_at DATETIME(3) NOT NULL,
  PRIMARY KEY (entry_id, code),
  INDEX ix_checks_ticked_by (ticked_by),
  CONSTRAINT fk_checks_entry FOREIGN KEY (entry_id) REFERENCES entries (id),
  CONSTRAINT fk_checks_ticked_by FOREIGN KEY (ticked_by) REFERENCES users (id)
`)
