import { ASCII, ID, table } from '../columns'

export const { up, down } = table('species', `
  ${ID},
  code VARCHAR(40) ${ASCII} NOT NULL,
  scientific_name VARCHAR(80) NOT NULL,
  family VARCHAR(20) ${ASCII} NOT NULL,
  sort SMALLINT UNSIGNED NOT NULL DEFAULT 0,
  seeded JSON NULL,
  CONSTRAINT uq_species_code UNIQUE (code)
`)
