import { ID, table } from '../columns'

export const { up, down } = table('workflow_versions', `
  ${ID},
  number INT UNSIGNED NOT NULL,
  created_at DATETIME(3) NOT NULL,
  created_by BIGINT UNSIGNED NULL,
  note VARCHAR(300) NULL,
  CONSTRAINT uq_workflow_versions_number UNIQUE (number),
  INDEX ix_workflow_versions_created_by (created_by),
  CONSTRAINT fk_workflow_versions_created_by FOREIGN KEY (created_by) REFERENCES users (id)
`)
