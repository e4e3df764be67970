import { ASCII, table } from '../columns'

export const { up, down } = table('counters', `
  name VARCHAR(40) ${ASCII} NOT NULL PRIMARY KEY,
  value BIGINT UNSIGNED NOT NULL DEFAULT 0
`)
