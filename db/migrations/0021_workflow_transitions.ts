import { ASCII, table } from '../columns'

export const { up, down } = table('workflow_transitions', `
  version_id BIGINT UNSIGNED NOT NULL,
  code VARCHAR(30) ${ASCII} NOT NULL,
  from_states JSON NOT NULL,
  to_state VARCHAR(20) ${ASCII} NULL,
  parties JSON NOT NULL,
  guards JSON NOT NULL,
  effects JSON NOT NULL,
  comment_required TINYINT(1) NOT NULL DEFAULT 0,
  sort SMALLINT UNSIGNED NOT NULL DEFAULT 0,
  seeded JSON NULL,
  PRIMARY KEY (version_id, code),
  INDEX ix_workflow_transitions_to (version_id, to_state),
  CONSTRAINT fk_workflow_transitions_version FOREIGN KEY (version_id) REFERENCES workflow_versions (id),
  CONSTRAINT fk_workflow_transitions_to FOREIGN KEY (version_id, to_state) REFERENCES workflow_states (version_id, code)
`)
