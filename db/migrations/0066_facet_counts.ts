import { ASCII, table } from '../columns'

export const { up, down } = table('facet_counts', `
  class_id BIGINT UNSIGNED NOT NULL,
  district_id BIGINT UNSIGNED NOT NULL,
  method VARCHAR(16) ${ASCII} NOT NULL DEFAULT '',
  year SMALLINT UNSIGNED NOT NULL DEFAULT 0,
  n INT UNSIGNED NOT NULL,
  PRIMARY KEY (class_id, district_id, method, year),
  INDEX ix_facet_counts_district (district_id),
  CONSTRAINT fk_facet_counts_class FOREIGN KEY (class_id) REFERENCES classes (id),
  CONSTRAINT fk_facet_counts_district FOREIGN KEY (district_id) REFERENCES districts (id)
`)
