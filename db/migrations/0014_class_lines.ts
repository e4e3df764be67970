import { ASCII, table } from '../columns'

export const { up, down } = table('class_lines', `
  district_id BIGINT UNSIGNED NOT NULL,
  species_id BIGINT UNSIGNED NOT NULL,
  class_id BIGINT UNSIGNED NOT NULL,
  on_line TINYINT(1) NOT NULL DEFAULT 0,
  side VARCHAR(20) ${ASCII} NOT NULL DEFAULT '',
  PRIMARY KEY (district_id, species_id, class_id, side),
  INDEX ix_class_lines_class (class_id, species_id),
  CONSTRAINT fk_class_lines_district FOREIGN KEY (district_id) REFERENCES districts (id),
  CONSTRAINT fk_class_lines_class FOREIGN KEY (class_id, species_id) REFERENCES classes (id, species_id),
  CONSTRAINT ck_class_lines_side CHECK ((on_line = 1) = (side <> ''))
`)
