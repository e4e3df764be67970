import { alter } from '../columns'

export const { up, down } = alter('entries',
  'ADD CONSTRAINT fk_entries_standing_sheet FOREIGN KEY (standing_sheet_id, id) REFERENCES sheets (id, entry_id)',
  'DROP FOREIGN KEY fk_entries_standing_sheet')
