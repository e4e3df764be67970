import { ASCII, ID, UID, oneOf, table } from '../columns'

export const { up, down } = table('sittings', `
  ${ID},
  ${UID},
  held_on DATE NOT NULL,
  place VARCHAR(200) NOT NULL,
  chair_user_id BIGINT UNSIGNED NOT NULL,
  state VARCHAR(10) ${ASCII} NOT NULL DEFAULT 'planned',
  created_at DATETIME(3) NOT NULL,
  opened_at DATETIME(3) NULL,
  closed_at DATETIME(3) NULL,
  closed_by BIGINT UNSIGNED NULL,
  minutes_file_id BIGINT UNSIGNED NULL,
  CONSTRAINT uq_sittings_uid UNIQUE (uid),
  INDEX ix_sittings_state (state, held_on, id),
  INDEX ix_sittings_chair (chair_user_id, state),
  INDEX ix_sittings_closed_by (closed_by),
  INDEX ix_sittings_minutes (minutes_file_id),
  CONSTRAINT fk_sittings_chair FOREIGN KEY (chair_user_id) REFERENCES users (id),
  CONSTRAINT fk_sittings_closed_by FOREIGN KEY (closed_by) REFERENCES users (id),
  CONSTRAINT fk_sittings_minutes FOREIGN KEY (minutes_file_id) REFERENCES files (id),
  ${oneOf('ck_sittings_state', 'state', ['planned', 'open', 'closed'])},
  CONSTRAINT ck_sittings_opened CHECK ((state = 'planned') = (opened_at IS NULL)),
  CONSTRAINT ck_sittings_closed CHECK ((state = 'closed') = (closed_at IS NOT NULL))
`)
