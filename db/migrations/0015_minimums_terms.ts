import { ID, table } from '../columns'

export const { up, down } = table('minimums_terms', `
  ${ID},
  label VARCHAR(80) NOT NULL,
  from_on DATE NOT NULL,
  to_on DATE NULL,
  CONSTRAINT uq_minimums_terms_from UNIQUE (from_on),
  CONSTRAINT ck_minimums_terms_span CHECK (to_on IS NULL OR to_on >= from_on)
`)
