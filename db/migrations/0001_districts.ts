import { ASCII, ID, table } from '../columns'

export const { up, down } = table('districts', `
  ${ID},
  code VARCHAR(40) ${ASCII} NOT NULL,
  name VARCHAR(80) NOT NULL,
  sort SMALLINT UNSIGNED NOT NULL DEFAULT 0,
  CONSTRAINT uq_districts_code UNIQUE (code),
  CONSTRAINT uq_districts_name UNIQUE (name)
`)
