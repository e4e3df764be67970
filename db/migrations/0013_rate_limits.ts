import { EXACT, table } from '../columns'

export const { up, down } = table('rate_limits', `
  \`key\` VARCHAR(255) ${EXACT} NOT NULL PRIMARY KEY,
  points INT NOT NULL DEFAULT 0,
  expire BIGINT UNSIGNED NULL,
  INDEX ix_rate_limits_expire (expire)
`)
