import { ASCII, table } from '../columns'

export const { up, down } = table('settings', `
  name VARCHAR(60) ${ASCII} NOT NULL PRIMARY KEY,
  value JSON NOT NULL,
  seeded_value JSON NULL,
  edited_by BIGINT UNSIGNED NULL,
  edited_at DATETIME(3) NULL,
  INDEX ix_settings_edited_by (edited_by),
  CONSTRAINT fk_settings_edited_by FOREIGN KEY (edited_by) REFERENCES users (id)
`)
