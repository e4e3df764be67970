import { ASCII, table } from '../columns'

export const { up, down } = table('event_texts', `
  event_id BIGINT UNSIGNED NOT NULL,
  field VARCHAR(40) ${ASCII} NOT NULL,
  salt CHAR(32) ${ASCII} NOT NULL,
  body TEXT NULL,
  PRIMARY KEY (event_id, field),
  CONSTRAINT fk_event_texts_event FOREIGN KEY (event_id) REFERENCES entry_events (id)
`)
