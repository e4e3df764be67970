import { table } from '../columns'

export const { up, down } = table('district_neighbours', `
  district_id BIGINT UNSIGNED NOT NULL,
  neighbour_id BIGINT UNSIGNED NOT NULL,
  PRIMARY KEY (district_id, neighbour_id),
  INDEX ix_district_neighbours_neighbour (neighbour_id),
  CONSTRAINT fk_district_neighbours_district FOREIGN KEY (district_id) REFERENCES districts (id) ON DELETE CASCADE,
  CONSTRAINT fk_district_neighbours_neighbour FOREIGN KEY (neighbour_id) REFERENCES districts (id) ON DELETE CASCADE,
  CONSTRAINT ck_district_neighbours_other CHECK (district_id <> neighbour_id)
`)
