import { alter } from '../columns'

export const { up, down } = alter('animals',
  'ADD CONSTRAINT fk_animals_live_entry FOREIGN KEY (live_entry_id, id) REFERENCES entries (id, animal_id)',
  'DROP FOREIGN KEY fk_animals_live_entry')
