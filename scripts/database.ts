/**
 * Brings a database to what this program needs: migrations, reference rows and, with `--demo`, the invented society in
 * a database that is empty. `DATABASE_URL=mysql://… node --import tsx scripts/database.ts [--demo]`
 */
import { databaseConfig } from '../db/config'
import { connect } from '../db/connection'
import { migrateUp } from '../db/migrate'
import { demoState, seedDemo } from '../seeds/demo'
import { seedReference } from '../seeds/reference'

const say = (text: string) => console.log(text)

async function run(): Promise<void> {
  const url = process.env.DATABASE_URL
  if (!url) throw new Error('DATABASE_URL is missing: the database to bring up to date')
  const db = connect(databaseConfig(url, { statementTimeout: 0, poolMax: 2 }))
  try {
    const ran = await migrateUp(db)
    if (ran.length > 0) say(`Ran ${ran.length} migrations, the last ${ran.at(-1)!}`)
    const now = new Date()
    await seedReference(db, now)
    if (!process.argv.includes('--demo')) return
    const state = await demoState(db)
    if (state === 'half') throw new Error('The demo data is half written: remove the data folder and start again')
    if (state === 'none') {
      const began = Date.now()
      await seedDemo(db, { now, progress: say })
      say(`Demo data is in, after ${((Date.now() - began) / 1000).toFixed(1)} s`)
    }
  }
  finally {
    await db.destroy()
  }
}

run().catch((error: unknown) => {
  console.error(error instanceof Error ? error.message : String(error))
  process.exitCode = 1
})
