import { ASCII, EXACT, ID, UID, oneOf, table } from '../columns'

export const { up, down } = table('uploads', `
  ${ID},
  ${UID},
  user_id BIGINT UNSIGNED NOT NULL,
  entry_id BIGINT UNSIGNED NULL,
  kind VARCHAR(30) ${ASCII} NOT NULL,
  name VARCHAR(200) NOT NULL,
  size BIGINT UNSIGNED NOT NULL,
  received BIGINT UNSIGNED NOT NULL DEFAULT 0,
  state VARCHAR(10) ${ASCII} NOT NULL DEFAULT 'open',
  storage_key VARCHAR(200) ${EXACT} NOT NULL,
  document_id BIGINT UNSIGNED NULL,
  created_at DATETIME(3) NOT NULL,
  expires_at DATETIME(3) NOT NULL,
  CONSTRAINT uq_uploads_uid UNIQUE (uid),
  CONSTRAINT uq_uploads_storage_key UNIQUE (storage_key),
  INDEX ix_uploads_user (user_id, state),
  INDEX ix_uploads_entry (entry_id, state),
  INDEX ix_uploads_expires (expires_at),
  INDEX ix_uploads_document (document_id),
  CONSTRAINT fk_uploads_user FOREIGN KEY (user_id) REFERENCES users (id),
  CONSTRAINT fk_uploads_entry FOREIGN KEY (entry_id) REFERENCES entries (id),
  CONSTRAINT fk_uploads_document FOREIGN KEY (document_id) REFERENCES documents (id),
  ${oneOf('ck_uploads_state', 'state', ['open', 'stored', 'failed'])},
  CONSTRAINT ck_uploads_received CHECK (received <= size)
`)
