/**
 * Looks through the whole registry and says every thing that does not agree, a line each; exit code 1 when there is one.
 * `npm run check`, with DATABASE_URL or the database of the data folder running.
 */
import { databaseConfig } from '../db/config'
import { connect } from '../db/connection'
import { checkRegistry } from '../server/services/integrity/check'

async function run(): Promise<void> {
  const url = process.env.DATABASE_URL
  if (!url) throw new Error('DATABASE_URL is missing: the database to check')
  const db = connect(databaseConfig(url, { statementTimeout: 0, poolMax: 1 }))
  try {
    let findings = 0
    for await (const { code, where, detail } of checkRegistry(db, null, what => console.error(`Checking ${what}`))) {
      findings++
      console.log(`${code} ${where}${detail ? `: ${detail}` : ''}`)
    }
    console.log(findings === 0 ? 'Everything agrees.' : `${findings} findings.`)
    if (findings > 0) process.exitCode = 1
  }
  finally {
    await db.destroy()
  }
}

run().catch((error: unknown) => {
  console.error(error instanceof Error ? error.message : String(error))
  process.exitCode = 2
})
