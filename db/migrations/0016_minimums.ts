import { table } from '../columns'

export const { up, down } = table('minimums', `
  term_id BIGINT UNSIGNED NOT NULL,
  class_id BIGINT UNSIGNED NOT NULL,
  min16 INT UNSIGNED NOT NULL,
  PRIMARY KEY (term_id, class_id),
  INDEX ix_minimums_class (class_id),
  CONSTRAINT fk_minimums_term FOREIGN KEY (term_id) REFERENCES minimums_terms (id),
  CONSTRAINT fk_minimums_class FOREIGN KEY (class_id) REFERENCES classes (id),
  CONSTRAINT ck_minimums_min CHECK (min16 > 0)
`)
