import type { Knex } from 'knex'
import { databaseConfig } from '../db/config'
import { connect } from '../db/connection'
import { migrateUp } from '../db/migrate'
import { demoState, seedDemo } from '../seeds/demo'
import { seedReference } from '../seeds/reference'
import { systemClock } from '../server/clock'
import type { HartrollConfig } from '../server/config'
import { FileStorage } from '../server/storage/files'

/** Between two lines that say how far it is. */
const QUIET_MS = 1_500

async function withDatabase<T>(config: HartrollConfig, work: (db: Knex) => Promise<T>): Promise<T> {
  const db = connect(databaseConfig(config.databaseUrl, { statementTimeout: 0 }))
  try {
    return await work(db)
  }
  finally {
    await db.destroy()
  }
}

/** Takes everything out of a database. The pool is of no use afterwards: its connections stood in what is gone. */
async function emptyOut(db: Knex): Promise<void> {
  const [[row]] = await db.raw('SELECT DATABASE() AS name') as [{ name: string }[]]
  await db.raw('DROP DATABASE ??', row!.name)
  await db.raw('CREATE DATABASE ?? CHARACTER SET utf8mb4 COLLATE utf8mb4_uca1400_nopad_ai_ci', row!.name)
}

async function fill(db: Knex, files: FileStorage, say: (line: string) => void): Promise<void> {
  const began = Date.now()
  let told = 0
  await seedDemo(db, {
    now: systemClock.now(),
    files,
    progress: (text) => {
      if (Date.now() - told < QUIET_MS) return
      told = Date.now()
      say(`Demo data: ${text} …`)
    },
  })
  say(`Demo data: the Ochre Basin is there (${Math.round((Date.now() - began) / 1000)} s)`)
}

/**
 * Fills an empty database of our own with the invented society. One whose filling was cut short has served nobody yet:
 * it is emptied and filled anew.
 */
export async function fillWithDemo(config: HartrollConfig, say: (line: string) => void): Promise<void> {
  const state = await withDatabase(config, demoState)
  if (state === 'whole') return
  if (state === 'half') {
    say('Demo data: its making was cut short; beginning anew')
    await withDatabase(config, emptyOut)
    await withDatabase(config, async (db) => {
      await migrateUp(db)
      await seedReference(db, systemClock.now())
    })
  }
  await withDatabase(config, db => fill(db, new FileStorage(config), say))
}
