import { ASCII, table } from '../columns'

export const { up, down } = table('list_counts', `
  class_id BIGINT UNSIGNED NOT NULL,
  district_id BIGINT UNSIGNED NOT NULL DEFAULT 0,
  method VARCHAR(16) ${ASCII} NOT NULL DEFAULT '',
  net16 INT NOT NULL,
  n INT UNSIGNED NOT NULL,
  PRIMARY KEY (class_id, district_id, method, net16),
  CONSTRAINT fk_list_counts_class FOREIGN KEY (class_id) REFERENCES classes (id)
`)
