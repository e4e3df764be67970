/**
 * Writes db/tables.d.ts from a database of its own that it migrates and drops again:
 * `DATABASE_URL=mysql://… npm run db:types`. The account must be allowed to make databases.
 */
import { writeFileSync } from 'node:fs'
import { databaseConfig } from '../db/config'
import { connect } from '../db/connection'
import { migrateUp } from '../db/migrate'
import { tableTypes } from './lib/table-types'

const url = process.env.DATABASE_URL
if (!url) throw new Error('Set DATABASE_URL to a server on which a database may be made')
const config = databaseConfig(url, { statementTimeout: 0 })
const scratch = `${config.database}_types`

const server = connect(config)
await server.raw(`DROP DATABASE IF EXISTS \`${scratch}\``)
await server.raw(`CREATE DATABASE \`${scratch}\` CHARACTER SET utf8mb4 COLLATE utf8mb4_uca1400_nopad_ai_ci`)
const db = connect({ ...config, database: scratch })
try {
  await migrateUp(db)
  writeFileSync(new URL('../db/tables.d.ts', import.meta.url), await tableTypes(db))
}
finally {
  await db.destroy()
  await server.raw(`DROP DATABASE \`${scratch}\``)
  await server.destroy()
}
