import { ASCII, ID, oneOf, table } from '../columns'

export const { up, down } = table('stake_clearances', `
  ${ID},
  entry_id BIGINT UNSIGNED NOT NULL,
  user_id BIGINT UNSIGNED NOT NULL,
  entry_person_id BIGINT UNSIGNED NOT NULL,
  kind VARCHAR(10) ${ASCII} NOT NULL,
  reason VARCHAR(1000) NOT NULL,
  cleared_by BIGINT UNSIGNED NOT NULL,
  cleared_at DATETIME(3) NOT NULL,
  CONSTRAINT uq_stake_clearances_one UNIQUE (entry_id, user_id, entry_person_id, kind),
  INDEX ix_stake_clearances_user (user_id),
  INDEX ix_stake_clearances_person (entry_person_id),
  INDEX ix_stake_clearances_cleared_by (cleared_by),
  CONSTRAINT fk_stake_clearances_entry FOREIGN KEY (entry_id) REFERENCES entries (id),
  CONSTRAINT fk_stake_clearances_user FOREIGN KEY (user_id) REFERENCES users (id),
  CONSTRAINT fk_stake_clearances_person FOREIGN KEY (entry_person_id) REFERENCES entry_people (id),
  CONSTRAINT fk_stake_clearances_cleared_by FOREIGN KEY (cleared_by) REFERENCES users (id),
  ${oneOf('ck_stake_clearances_kind', 'kind', ['name', 'address'])},
  CONSTRAINT ck_stake_clearances_other CHECK (cleared_by <> user_id)
`)
