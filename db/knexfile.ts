import { databaseConfig } from './config'
import { knexConfig } from './connection'
import { MIGRATOR } from './migrate'

const url = process.env.DATABASE_URL
if (!url) throw new Error('Set DATABASE_URL to the database that the migrations shall run in')

/** For Knex's own command line: `node --import tsx node_modules/knex/bin/cli.js --knexfile db/knexfile.ts migrate:list`. */
export default { ...knexConfig(databaseConfig(url, { statementTimeout: 0 })), migrations: MIGRATOR }
