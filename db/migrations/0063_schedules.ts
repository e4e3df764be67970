import { ASCII, table } from '../columns'

export const { up, down } = table('schedules', `
  task VARCHAR(60) ${ASCII} NOT NULL,
  period VARCHAR(30) ${ASCII} NOT NULL,
  run_at DATETIME(3) NOT NULL,
  CONSTRAINT uq_schedules_period PRIMARY KEY (task, period)
`)
