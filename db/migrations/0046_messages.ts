import { ASCII, ID, UID, oneOf, table } from '../columns'

export const { up, down } = table('messages', `
  ${ID},
  ${UID},
  entry_id BIGINT UNSIGNED NOT NULL,
  author_user_id BIGINT UNSIGNED NOT NULL,
  audience VARCHAR(10) ${ASCII} NOT NULL,
  body VARCHAR(4000) NOT NULL,
  created_at DATETIME(3) NOT NULL,
  read_at DATETIME(3) NULL,
  CONSTRAINT uq_messages_uid UNIQUE (uid),
  INDEX ix_messages_entry (entry_id, created_at),
  INDEX ix_messages_author (author_user_id),
  CONSTRAINT fk_messages_entry FOREIGN KEY (entry_id) REFERENCES entries (id),
  CONSTRAINT fk_messages_author FOREIGN KEY (author_user_id) REFERENCES users (id),
  ${oneOf('ck_messages_audience', 'audience', ['entrant', 'measurer', 'office', 'panel'])}
`)
