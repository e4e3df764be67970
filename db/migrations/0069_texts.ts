import { ASCII, table } from '../columns'

export const { up, down } = table('texts', `
  \`key\` VARCHAR(120) ${ASCII} NOT NULL,
  locale VARCHAR(12) ${ASCII} NOT NULL,
  version INT UNSIGNED NOT NULL DEFAULT 1,
  body TEXT NOT NULL,
  seeded_body TEXT NULL,
  edited_by BIGINT UNSIGNED NULL,
  edited_at DATETIME(3) NULL,
  PRIMARY KEY (\`key\`, locale),
  INDEX ix_texts_edited_by (edited_by),
  CONSTRAINT fk_texts_edited_by FOREIGN KEY (edited_by) REFERENCES users (id)
`)
