import { table } from '../columns'

export const { up, down } = table('accreditation_species', `
  accreditation_id BIGINT UNSIGNED NOT NULL,
  species_id BIGINT UNSIGNED NOT NULL,
  PRIMARY KEY (accreditation_id, species_id),
  INDEX ix_accreditation_species_species (species_id),
  CONSTRAINT fk_accreditation_species_accreditation FOREIGN KEY (accreditation_id) REFERENCES accreditations (id) ON DELETE CASCADE,
  CONSTRAINT fk_accreditation_species_species FOREIGN KEY (species_id) REFERENCES species (id)
`)
