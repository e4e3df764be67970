import { table } from '../columns'

export const { up, down } = table('file_openings', `
  entry_id BIGINT UNSIGNED NOT NULL,
  user_id BIGINT UNSIGNED NOT NULL,
  first_at DATETIME(3) NOT NULL,
  last_at DATETIME(3) NOT NULL,
  PRIMARY KEY (entry_id, user_id),
  INDEX ix_file_openings_user (user_id),
  CONSTRAINT fk_file_openings_entry FOREIGN KEY (entry_id) REFERENCES entries (id),
  CONSTRAINT fk_file_openings_user FOREIGN KEY (user_id) REFERENCES users (id)
`)
