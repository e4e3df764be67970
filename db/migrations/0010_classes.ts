import { ASCII, ID, oneOf, table } from '../columns'

export const { up, down } = table('classes', `
  ${ID},
  code VARCHAR(40) ${ASCII} NOT NULL,
  species_id BIGINT UNSIGNED NOT NULL,
  definition VARCHAR(48) ${ASCII} NOT NULL,
  step VARCHAR(4) ${ASCII} NOT NULL,
  typicality VARCHAR(10) ${ASCII} NOT NULL,
  offered TINYINT(1) NOT NULL DEFAULT 0,
  sort SMALLINT UNSIGNED NOT NULL DEFAULT 0,
  seeded JSON NULL,
  CONSTRAINT uq_classes_code UNIQUE (code),
  CONSTRAINT uq_classes_species UNIQUE (species_id, typicality),
  CONSTRAINT uq_classes_id_species UNIQUE (id, species_id),
  CONSTRAINT fk_classes_species FOREIGN KEY (species_id) REFERENCES species (id),
  ${oneOf('ck_classes_step', 'step', ['1/8', '1/16'])},
  ${oneOf('ck_classes_typicality', 'typicality', ['typical', 'nontypical', 'single'])},
  CONSTRAINT ck_classes_definition CHECK (definition LIKE CONCAT(code, '@%'))
`)
