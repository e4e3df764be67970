import { ASCII, ID, oneOf, table } from '../columns'

export const { up, down } = table('user_roles', `
  ${ID},
  user_id BIGINT UNSIGNED NOT NULL,
  role VARCHAR(10) ${ASCII} NOT NULL,
  from_at DATETIME(3) NOT NULL,
  to_at DATETIME(3) NULL,
  granted_by BIGINT UNSIGNED NULL,
  ended_by BIGINT UNSIGNED NULL,
  held_role VARCHAR(10) ${ASCII} GENERATED ALWAYS AS (IF(to_at IS NULL, role, NULL)) STORED,
  CONSTRAINT uq_user_roles_held UNIQUE (user_id, held_role),
  INDEX ix_user_roles_role (held_role),
  INDEX ix_user_roles_granted_by (granted_by),
  INDEX ix_user_roles_ended_by (ended_by),
  CONSTRAINT fk_user_roles_user FOREIGN KEY (user_id) REFERENCES users (id),
  CONSTRAINT fk_user_roles_granted_by FOREIGN KEY (granted_by) REFERENCES users (id),
  CONSTRAINT fk_user_roles_ended_by FOREIGN KEY (ended_by) REFERENCES users (id),
  ${oneOf('ck_user_roles_role', 'role', ['entrant', 'shop', 'measurer', 'reviewer', 'judge', 'registrar'])},
  CONSTRAINT ck_user_roles_other CHECK (role = 'entrant' OR granted_by IS NULL OR granted_by <> user_id),
  CONSTRAINT ck_user_roles_span CHECK (to_at IS NULL OR to_at >= from_at)
`)
