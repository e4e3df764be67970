import type { Knex } from 'knex'
import { MIGRATIONS, type Migration } from './migrations'

type NamedMigration = readonly [name: string, migration: Migration]

/** "There already": table, trigger, column, index, foreign key. */
const DONE_BEFORE = new Set([1050, 1359, 1060, 1061, 1826])
function isDoneBefore(error: unknown): boolean {
  const { errno, sqlMessage } = error as { errno?: number, sqlMessage?: string }
  return errno !== undefined && (DONE_BEFORE.has(errno) || (errno === 1005 && /errno: 121/.test(sqlMessage ?? '')))
}

/**
 * A process that was killed may have carried out a statement and not noted it: DDL commits by itself. So the migration
 * that comes next is let off when what it makes is there already (a statement of MariaDB is done whole or not at all).
 */
function forgiving({ up, down }: Migration): Migration {
  return {
    up: db => up(db).catch((error: unknown) => {
      if (!isDoneBefore(error)) throw error
    }),
    down,
  }
}

/** The migrations as a list in code, so that a bundle carries them and no folder is read at run time. */
function source(forgive?: string): Knex.MigrationSource<NamedMigration> {
  return {
    getMigrations: () => Promise.resolve([...MIGRATIONS]),
    getMigrationName: ([name]) => name,
    getMigration: ([name, migration]) => Promise.resolve(name === forgive ? forgiving(migration) : migration),
  }
}

/** Shared with knexfile.ts. DDL commits by itself, so a transaction around it would only pretend. */
export const MIGRATOR: Knex.MigratorConfig = {
  migrationSource: source(),
  tableName: 'schema_migrations',
  disableTransactions: true,
}

/** The newest migration that this program knows. */
export const latest: string = MIGRATIONS.at(-1)![0]

/** How long one process waits for another that is migrating the same database, in seconds. */
const PATIENCE = 120

/**
 * Lets one process at a time migrate a database. The lock is the connection's: it goes with a process that is killed,
 * which Knex's own mark in a table does not.
 */
async function alone<T>(db: Knex, work: () => Promise<T>): Promise<T> {
  return db.transaction(async (trx) => {
    const [[row]] = await trx.raw('SELECT GET_LOCK(CONCAT(\'migrate \', DATABASE()), ?) AS got', [PATIENCE]) as [{ got: number | null }[]]
    if (row?.got !== 1) throw new Error('Another process is changing the tables of this database and does not come to an end')
    try {
      await db.migrate.forceFreeMigrationsLock(MIGRATOR)
      return await work()
    }
    finally {
      await trx.raw('SELECT RELEASE_LOCK(CONCAT(\'migrate \', DATABASE()))')
    }
  })
}

/** Runs what has not run yet. Returns the names, in order. The pool needs two connections. */
export async function migrateUp(db: Knex): Promise<string[]> {
  return alone(db, async () => {
    const [done] = await db.migrate.list(MIGRATOR) as [{ name: string }[], unknown]
    const ran = new Set(done.map(one => one.name))
    const next = MIGRATIONS.find(([name]) => !ran.has(name))
    const [, names] = await db.migrate.latest({ ...MIGRATOR, migrationSource: source(next?.[0]) }) as [number, string[]]
    return names
  })
}

/** Takes back everything, or the newest `steps`. Returns the names, in the order in which they were undone. */
export async function migrateDown(db: Knex, steps = Number.POSITIVE_INFINITY): Promise<string[]> {
  return alone(db, async () => {
    const undone: string[] = []
    while (undone.length < steps) {
      const [, names] = await db.migrate.down(MIGRATOR) as [number, string[]]
      if (names.length === 0) break
      undone.push(...names)
    }
    return undone
  })
}

/** The newest migration that has run in this database, or null in an empty one. */
export async function schemaVersion(db: Knex): Promise<string | null> {
  if (!(await db.schema.hasTable('schema_migrations'))) return null
  const row = await db('schema_migrations').orderBy('name', 'desc').first('name') as { name: string } | undefined
  return row?.name ?? null
}
