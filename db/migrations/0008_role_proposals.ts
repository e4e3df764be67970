import { ASCII, ID, UID, oneOf, table } from '../columns'

export const { up, down } = table('role_proposals', `
  ${ID},
  ${UID},
  user_id BIGINT UNSIGNED NOT NULL,
  role VARCHAR(10) ${ASCII} NOT NULL,
  proposed_by BIGINT UNSIGNED NOT NULL,
  proposed_at DATETIME(3) NOT NULL,
  decision VARCHAR(10) ${ASCII} NULL,
  decided_by BIGINT UNSIGNED NULL,
  decided_at DATETIME(3) NULL,
  open_role VARCHAR(10) ${ASCII} GENERATED ALWAYS AS (IF(decided_at IS NULL, role, NULL)) STORED,
  CONSTRAINT uq_role_proposals_uid UNIQUE (uid),
  CONSTRAINT uq_role_proposals_open UNIQUE (user_id, open_role),
  INDEX ix_role_proposals_open (open_role, proposed_at),
  INDEX ix_role_proposals_proposed_by (proposed_by),
  INDEX ix_role_proposals_decided_by (decided_by),
  CONSTRAINT fk_role_proposals_user FOREIGN KEY (user_id) REFERENCES users (id),
  CONSTRAINT fk_role_proposals_proposed_by FOREIGN KEY (proposed_by) REFERENCES users (id),
  CONSTRAINT fk_role_proposals_decided_by FOREIGN KEY (decided_by) REFERENCES users (id),
  ${oneOf('ck_role_proposals_role', 'role', ['measurer', 'reviewer', 'judge', 'registrar'])},
  ${oneOf('ck_role_proposals_decision', 'decision', ['granted', 'refused', 'withdrawn'])},
  CONSTRAINT ck_role_proposals_other CHECK (proposed_by <> user_id),
  CONSTRAINT ck_role_proposals_decided CHECK ((decision IS NULL) = (decided_at IS NULL) AND (decision IS NULL) = (decided_by IS NULL)),
  CONSTRAINT ck_role_proposals_second CHECK (decision IS NULL OR decision <> 'granted' OR (decided_by <> proposed_by AND decided_by <> user_id))
`)
