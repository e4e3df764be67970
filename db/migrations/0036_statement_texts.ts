import { ASCII, table } from '../columns'

export const { up, down } = table('statement_texts', `
  version INT UNSIGNED NOT NULL,
  locale VARCHAR(12) ${ASCII} NOT NULL,
  body TEXT NOT NULL,
  created_at DATETIME(3) NOT NULL,
  PRIMARY KEY (version, locale)
`)
