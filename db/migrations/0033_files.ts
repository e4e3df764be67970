import { ASCII, EXACT, ID, table } from '../columns'

export const { up, down } = table('files', `
  ${ID},
  sha256 CHAR(64) ${ASCII} NOT NULL,
  size BIGINT UNSIGNED NOT NULL,
  mime VARCHAR(80) ${ASCII} NOT NULL,
  storage_key VARCHAR(200) ${EXACT} NOT NULL,
  created_at DATETIME(3) NOT NULL,
  CONSTRAINT uq_files_sha256 UNIQUE (sha256),
  CONSTRAINT uq_files_storage_key UNIQUE (storage_key),
  CONSTRAINT ck_files_sha256 CHECK (sha256 REGEXP '^[0-9a-f]{64}$')
`)
