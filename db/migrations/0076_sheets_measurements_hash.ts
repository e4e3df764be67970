import { alter, ASCII } from '../columns'

/** By which a head that was entered twice is found: the same readings, line by line. */
export const { up, down } = alter('sheets',
  `ADD COLUMN measurements_hash CHAR(64) ${ASCII} GENERATED ALWAYS AS (SHA2(measurements, 256)) STORED, ADD INDEX ix_sheets_measurements (measurements_hash)`,
  'DROP INDEX ix_sheets_measurements, DROP COLUMN measurements_hash')
