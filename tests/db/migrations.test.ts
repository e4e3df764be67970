import { readdirSync, readFileSync } from 'node:fs'
import { beforeAll, describe, expect, it } from 'vitest'
import type { Knex } from 'knex'
import { openDatabase } from '../../db/connection'
import { MIGRATIONS } from '../../db/migrations'
import { latest, migrateDown, migrateUp, schemaVersion } from '../../db/migrate'
import { migrationIndex } from '../../scripts/lib/migration-index'
import { tableTypes } from '../../scripts/lib/table-types'
import { useEmptyDatabase } from '../support/database'

const own = useEmptyDatabase()
let db: Knex
beforeAll(() => {
  db = own.db
})

async function schemaText(): Promise<string> {
  const tables = await db('information_schema.tables').whereRaw('table_schema = database()').orderBy('table_name').pluck('table_name') as string[]
  const texts: string[] = []
  for (const table of tables) {
    const [[row]] = await db.raw(`SHOW CREATE TABLE \`${table}\``) as [Record<string, string>[]]
    texts.push(row!['Create Table']!.replace(/ AUTO_INCREMENT=\d+/, ''))
  }
  const triggers = await db('information_schema.triggers').whereRaw('trigger_schema = database()').orderBy('trigger_name')
    .select('trigger_name as name', 'action_statement as body') as { name: string, body: string }[]
  return [...texts, ...triggers.map(trigger => `${trigger.name}: ${trigger.body}`)].join('\n')
}

describe('migrations', () => {
  it('run up, leave nothing behind when taken back, and run up again to the same schema in under ten seconds', async () => {
    const began = Date.now()
    expect(await migrateUp(db)).toHaveLength(MIGRATIONS.length)
    expect(Date.now() - began).toBeLessThan(10_000)
    expect(await schemaVersion(db)).toBe(latest)
    const first = await schemaText()

    expect(await migrateDown(db)).toHaveLength(MIGRATIONS.length)
    const left = await db('information_schema.tables').whereRaw('table_schema = database()').pluck('table_name') as string[]
    expect(left.filter(name => !name.startsWith('schema_migrations'))).toEqual([])

    await migrateUp(db)
    expect(await schemaText()).toBe(first)
    expect(await migrateUp(db)).toEqual([])
  }, 60_000)

  it('can be taken back and run again one at a time', async () => {
    const undone = await migrateDown(db, 3)
    expect(undone.map(name => name.replace(/\.ts$/, ''))).toEqual(MIGRATIONS.slice(-3).map(([name]) => name).reverse())
    expect(await migrateUp(db)).toHaveLength(3)
  })

  it.each(['0003_users', '0032_entries_standing_sheet', '0042_ledger_no_delete', '0076_sheets_measurements_hash'])(
    '%s goes on where a killed process had carried it out and not noted it', async (name) => {
      expect(MIGRATIONS.map(([known]) => known)).toContain(name)
      const before = await schemaText()
      await db('schema_migrations').where({ name }).delete()
      expect(await migrateUp(db)).toEqual([name])
      expect(await schemaText()).toBe(before)
    })

  it('that fails for another reason stops', async () => {
    await db('schema_migrations').where({ name: '0002_district_neighbours' }).delete()
    await db.raw('DROP TABLE district_neighbours')
    await db.raw('CREATE VIEW district_neighbours AS SELECT 1 AS one')
    await db('schema_migrations').where({ name: '0001_districts' }).delete()
    await expect(migrateUp(db)).rejects.toThrow(/district_neighbours/)
    await db.raw('DROP VIEW district_neighbours')
    expect(await migrateUp(db)).toEqual(['0002_district_neighbours'])
  })

  it('run once when two processes begin at the same time, and after one was killed while it held Knex\'s mark', async () => {
    await migrateDown(db, 5)
    await db('schema_migrations_lock').update({ is_locked: 1 })
    const other = openDatabase(own.url)
    const ran = await Promise.all([migrateUp(db), migrateUp(other)])
    await other.destroy()
    expect(ran.map(names => names.length).sort()).toEqual([0, 5])
  })

  it('are listed in code as they lie in the folder, in order', () => {
    const folder = new URL('../../db/migrations/', import.meta.url)
    expect(readFileSync(new URL('index.ts', folder), 'utf8')).toBe(migrationIndex(readdirSync(folder)))
  })

  it('hold one statement each', () => {
    const folder = new URL('../../db/migrations/', import.meta.url)
    for (const file of readdirSync(folder).filter(name => /^\d/.test(name))) {
      const calls = readFileSync(new URL(file, folder), 'utf8').match(/= (?:table|alter|trigger)\(/g) ?? []
      expect(calls, file).toHaveLength(1)
    }
  })
})

describe('the schema', () => {
  it('is what db/tables.d.ts says', async () => {
    expect(readFileSync(new URL('../../db/tables.d.ts', import.meta.url), 'utf8')).toBe(await tableTypes(db))
  })

  it('gives every index and constraint a name of its own', async () => {
    const ours = 'table_schema = database() and table_name not like \'schema\\_migrations%\''
    const indexes = await db('information_schema.statistics').whereRaw(ours).distinct('table_name as on', 'index_name as name') as { on: string, name: string }[]
    const wrong = indexes.filter(({ on, name }) => name !== 'PRIMARY' && !new RegExp(`^(uq|ix|fk)_${on}_`).test(name))
    expect(wrong).toEqual([])
    const constraints = await db('information_schema.table_constraints').whereRaw(ours)
      .select('table_name as on', 'constraint_name as name', 'constraint_type as type') as { on: string, name: string, type: string }[]
    // A JSON column brings a check of its own, which MariaDB calls after the column.
    const unnamed = constraints.filter(({ on, name, type }) => type !== 'PRIMARY KEY' && type !== 'CHECK' && !name.includes(`_${on}_`))
    expect(unnamed).toEqual([])
  })

  it('has an index of its own under every foreign key', async () => {
    const implicit = await db('information_schema.statistics').whereRaw('table_schema = database()').where('index_name', 'like', 'fk\\_%').pluck('index_name')
    expect(implicit).toEqual([])
  })

  it('compares text without padding, and codes, e-mails and hashes byte by byte', async () => {
    const columns = await db('information_schema.columns').whereRaw('table_schema = database()').whereNotNull('collation_name')
      .where('table_name', 'not like', 'schema\\_migrations%').distinct('collation_name').pluck('collation_name')
    expect(new Set(columns)).toEqual(new Set(['utf8mb4_uca1400_nopad_ai_ci', 'utf8mb4_nopad_bin', 'ascii_bin', 'utf8mb4_bin']))
    const exact = await db('information_schema.columns').whereRaw('table_schema = database()')
      .where(query => query.where('column_name', 'like', '%email%').orWhere('column_name', 'like', '%hash%').orWhere('column_name', 'like', '%uid%'))
      .whereNotNull('collation_name').where('collation_name', 'like', '%_ci').select('table_name', 'column_name')
    expect(exact).toEqual([])
  })
})
