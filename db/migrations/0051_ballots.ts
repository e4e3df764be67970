import { ASCII, ID, oneOf, table } from '../columns'

export const { up, down } = table('ballots', `
  ${ID},
  docket_item_id BIGINT UNSIGNED NOT NULL,
  judge_user_id BIGINT UNSIGNED NOT NULL,
  vote VARCHAR(12) ${ASCII} NOT NULL,
  ground VARCHAR(40) ${ASCII} NULL,
  reason VARCHAR(2000) NULL,
  requests JSON NULL,
  cast_at DATETIME(3) NOT NULL,
  CONSTRAINT uq_ballots_judge UNIQUE (docket_item_id, judge_user_id),
  INDEX ix_ballots_judge (judge_user_id, cast_at),
  CONSTRAINT fk_ballots_docket_item FOREIGN KEY (docket_item_id) REFERENCES docket_items (id),
  CONSTRAINT fk_ballots_judge FOREIGN KEY (judge_user_id) REFERENCES users (id),
  ${oneOf('ck_ballots_vote', 'vote', ['accept', 'return', 'decline', 'uphold', 'strike', 'reinstate', 'stand_aside'])},
  CONSTRAINT ck_ballots_reason CHECK (vote = 'accept' OR CHAR_LENGTH(TRIM(IFNULL(reason, ''))) > 0)
`)
