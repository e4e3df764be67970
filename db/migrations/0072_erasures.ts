import { ID, table } from '../columns'

export const { up, down } = table('erasures', `
  ${ID},
  user_id BIGINT UNSIGNED NULL,
  entry_person_id BIGINT UNSIGNED NULL,
  reason VARCHAR(500) NOT NULL,
  by_user_id BIGINT UNSIGNED NULL,
  at DATETIME(3) NOT NULL,
  applied_at DATETIME(3) NULL,
  INDEX ix_erasures_user (user_id),
  INDEX ix_erasures_person (entry_person_id),
  INDEX ix_erasures_by (by_user_id),
  CONSTRAINT fk_erasures_user FOREIGN KEY (user_id) REFERENCES users (id),
  CONSTRAINT fk_erasures_person FOREIGN KEY (entry_person_id) REFERENCES entry_people (id),
  CONSTRAINT fk_erasures_by FOREIGN KEY (by_user_id) REFERENCES users (id),
  CONSTRAINT ck_erasures_whom CHECK ((user_id IS NULL) <> (entry_person_id IS NULL))
`)
