import { ID, UID, table } from '../columns'

export const { up, down } = table('animals', `
  ${ID},
  ${UID},
  species_id BIGINT UNSIGNED NOT NULL,
  live_entry_id BIGINT UNSIGNED NULL,
  created_at DATETIME(3) NOT NULL,
  CONSTRAINT uq_animals_uid UNIQUE (uid),
  CONSTRAINT uq_animals_live_entry UNIQUE (live_entry_id),
  INDEX ix_animals_live_entry_animal (live_entry_id, id),
  INDEX ix_animals_species (species_id),
  CONSTRAINT fk_animals_species FOREIGN KEY (species_id) REFERENCES species (id)
`)
