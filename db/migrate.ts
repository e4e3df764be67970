import type { Knex } from 'knex'
import { MIGRATIONS, type Migration } from './migrations'

type NamedMigration = readonly [name: string, migration: Migration]

/** The migrations as a list in code, so that a bundle carries them and no folder is read at run time. */
const source: Knex.MigrationSource<NamedMigration> = {
  getMigrations: () => Promise.resolve([...MIGRATIONS]),
  getMigrationName: ([name]) => name,
  getMigration: ([, migration]) => Promise.resolve(migration),
}

/** Shared with knexfile.ts. DDL commits by itself, so a transaction around it would only pretend. */
export const MIGRATOR: Knex.MigratorConfig = {
  migrationSource: source,
  tableName: 'schema_migrations',
  disableTransactions: true,
}

/** The newest migration that this program knows. */
export const latest: string = MIGRATIONS.at(-1)![0]

/** Runs what has not run yet. Returns the names, in order. */
export async function migrateUp(db: Knex): Promise<string[]> {
  const [, names] = await db.migrate.latest(MIGRATOR) as [number, string[]]
  return names
}

/** Takes back everything, or the newest `steps`. Returns the names, in the order in which they were undone. */
export async function migrateDown(db: Knex, steps = Number.POSITIVE_INFINITY): Promise<string[]> {
  const undone: string[] = []
  while (undone.length < steps) {
    const [, names] = await db.migrate.down(MIGRATOR) as [number, string[]]
    if (names.length === 0) break
    undone.push(...names)
  }
  return undone
}

/** The newest migration that has run in this database, or null in an empty one. */
export async function schemaVersion(db: Knex): Promise<string | null> {
  if (!(await db.schema.hasTable('schema_migrations'))) return null
  const row = await db('schema_migrations').orderBy('name', 'desc').first('name') as { name: string } | undefined
  return row?.name ?? null
}
