import { table } from '../columns'

export const { up, down } = table('sitting_judges', `
  sitting_id BIGINT UNSIGNED NOT NULL,
  user_id BIGINT UNSIGNED NOT NULL,
  invited_at DATETIME(3) NOT NULL,
  present TINYINT(1) NOT NULL DEFAULT 0,
  PRIMARY KEY (sitting_id, user_id),
  INDEX ix_sitting_judges_user (user_id),
  CONSTRAINT fk_sitting_judges_sitting FOREIGN KEY (sitting_id) REFERENCES sittings (id),
  CONSTRAINT fk_sitting_judges_user FOREIGN KEY (user_id) REFERENCES users (id)
`)
