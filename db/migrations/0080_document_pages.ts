import { ID, table } from '../columns'

export const { up, down } = table('document_pages', `
  ${ID},
  document_id BIGINT UNSIGNED NOT NULL,
  page SMALLINT UNSIGNED NOT NULL,
  file_id BIGINT UNSIGNED NOT NULL,
  width INT UNSIGNED NOT NULL,
  height INT UNSIGNED NOT NULL,
  CONSTRAINT uq_document_pages_page UNIQUE (document_id, page),
  INDEX ix_document_pages_file (file_id),
  CONSTRAINT fk_document_pages_document FOREIGN KEY (document_id) REFERENCES documents (id),
  CONSTRAINT fk_document_pages_file FOREIGN KEY (file_id) REFERENCES files (id),
  CONSTRAINT ck_document_pages_page CHECK (page > 0)
`)
