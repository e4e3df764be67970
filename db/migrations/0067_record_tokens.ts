import { EXACT, table } from '../columns'

export const { up, down } = table('record_tokens', `
  token VARCHAR(40) ${EXACT} NOT NULL,
  class_id BIGINT UNSIGNED NOT NULL,
  net16 INT NOT NULL,
  record_id BIGINT UNSIGNED NOT NULL,
  PRIMARY KEY (record_id, token),
  INDEX ix_record_tokens_class_net (token, class_id, net16 DESC, record_id),
  INDEX ix_record_tokens_class (class_id),
  CONSTRAINT fk_record_tokens_record FOREIGN KEY (record_id) REFERENCES records (id),
  CONSTRAINT fk_record_tokens_class FOREIGN KEY (class_id) REFERENCES classes (id)
`)
