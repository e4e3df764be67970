import { ASCII, oneOf, table } from '../columns'

export const { up, down } = table('workflow_states', `
  version_id BIGINT UNSIGNED NOT NULL,
  code VARCHAR(20) ${ASCII} NOT NULL,
  turn VARCHAR(10) ${ASCII} NOT NULL,
  sort SMALLINT UNSIGNED NOT NULL DEFAULT 0,
  seeded JSON NULL,
  PRIMARY KEY (version_id, code),
  CONSTRAINT fk_workflow_states_version FOREIGN KEY (version_id) REFERENCES workflow_versions (id),
  ${oneOf('ck_workflow_states_turn', 'turn', ['entrant', 'measurer', 'reviewer', 'panel', 'nobody'])}
`)
