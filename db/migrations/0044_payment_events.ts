import { ASCII, ID, table } from '../columns'

export const { up, down } = table('payment_events', `
  ${ID},
  provider_event_id VARCHAR(255) ${ASCII} NOT NULL,
  kind VARCHAR(80) ${ASCII} NOT NULL,
  payload JSON NOT NULL,
  received_at DATETIME(3) NOT NULL,
  handled_at DATETIME(3) NULL,
  last_error VARCHAR(1000) NULL,
  CONSTRAINT uq_payment_events_provider UNIQUE (provider_event_id),
  INDEX ix_payment_events_handled (handled_at, received_at)
`)
