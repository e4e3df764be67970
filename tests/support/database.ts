import { afterAll, beforeAll, inject } from 'vitest'
import type { Knex } from 'knex'
import mysql, { type Connection, type RowDataPacket } from 'mysql2/promise'
import { openDatabase } from '../../db/connection'

/** More than workers will ever run at once; a database is made when it is first taken. */
const MOST_DATABASES = 64

export interface TestDatabase {
  readonly name: string
  /** as in DATABASE_URL */
  readonly url: string
  readonly db: Knex
}

/**
 * A database of its own for the tests of one file, equal to the migrated and seeded base when the file begins.
 * Read its fields inside tests and hooks only: it is taken in a `beforeAll`.
 */
export function useDatabase(): TestDatabase {
  let taken: Taken | undefined
  const get = () => {
    if (!taken) throw new Error('The database is there from beforeAll on')
    return taken
  }
  beforeAll(async () => {
    taken = await takeDatabase()
  })
  afterAll(async () => {
    await taken?.release()
  })
  return {
    get name() { return get().name },
    get url() { return get().url },
    get db() { return get().db },
  }
}

/** An empty database for one file, for trying migrations themselves. It is dropped at the end. */
export function useEmptyDatabase(): TestDatabase {
  let state: { name: string, url: string, db: Knex, admin: Connection } | undefined
  const get = () => {
    if (!state) throw new Error('The database is there from beforeAll on')
    return state
  }
  beforeAll(async () => {
    const admin = await connectTo('')
    const name = `empty_${process.pid}_${Math.random().toString(36).slice(2, 8)}`
    await admin.query(`CREATE DATABASE ${quote(name)} CHARACTER SET utf8mb4 COLLATE utf8mb4_uca1400_nopad_ai_ci`)
    const url = urlOf(name)
    state = { name, url, db: openDatabase(url), admin }
  })
  afterAll(async () => {
    if (!state) return
    await state.db.destroy()
    await state.admin.query(`DROP DATABASE ${quote(state.name)}`)
    await state.admin.end()
  })
  return {
    get name() { return get().name },
    get url() { return get().url },
    get db() { return get().db },
  }
}

interface Taken extends TestDatabase {
  release(): Promise<void>
}

/** Takes a free database of the test server, held by a named lock so that no two files ever share one. */
export async function takeDatabase(): Promise<Taken> {
  const admin = await connectTo('')
  try {
    for (let number = 1; number <= MOST_DATABASES; number++) {
      const name = `test_${number}`
      const [row] = await rows<{ got: number }>(admin, `SELECT GET_LOCK('${name}', 0) AS got`)
      if (row?.got !== 1) continue
      await admin.query('SET SESSION foreign_key_checks = 0, sql_mode = \'\'')
      if (!await bringBack(admin, name)) await copyBase(admin, name)
      const url = urlOf(name)
      const db = openDatabase(url)
      return {
        name,
        url,
        db,
        release: async () => {
          await db.destroy()
          await admin.end()
        },
      }
    }
    throw new Error('No database is free; a test file may not be giving its own back')
  }
  catch (error) {
    admin.destroy()
    throw error
  }
}

interface TableRow extends RowDataPacket { name: string }

/** Base tables of a database by name. */
async function tablesOf(admin: Connection, database: string): Promise<string[]> {
  const found = await rows<TableRow>(admin, 'SELECT table_name AS name FROM information_schema.tables WHERE table_schema = ? AND table_type = \'BASE TABLE\' ORDER BY 1', [database])
  return found.map(row => row.name)
}

/** Columns that can be inserted into, generated ones left out. */
async function columnsOf(admin: Connection, table: string): Promise<string> {
  const found = await rows<TableRow>(admin, 'SELECT column_name AS name FROM information_schema.columns WHERE table_schema = ? AND table_name = ? AND generation_expression IS NULL ORDER BY ordinal_position', [baseName(), table])
  return found.map(row => quote(row.name)).join(', ')
}

async function copyBase(admin: Connection, name: string): Promise<void> {
  const base = baseName()
  await admin.query(`DROP DATABASE IF EXISTS ${quote(name)}`)
  await admin.query(`CREATE DATABASE ${quote(name)} CHARACTER SET utf8mb4 COLLATE utf8mb4_uca1400_nopad_ai_ci`)
  for (const table of await tablesOf(admin, base)) {
    const [made] = await rows<RowDataPacket & Record<'Create Table', string>>(admin, `SHOW CREATE TABLE ${quote(base)}.${quote(table)}`)
    await admin.query(`USE ${quote(name)}`)
    await admin.query(made!['Create Table'])
    await copyRows(admin, name, table)
  }
  const triggers = await rows<RowDataPacket & { Trigger: string }>(admin, `SHOW TRIGGERS FROM ${quote(base)}`)
  for (const { Trigger: trigger } of triggers) {
    const [made] = await rows<RowDataPacket & { 'SQL Original Statement': string, sql_mode: string }>(admin, `SHOW CREATE TRIGGER ${quote(base)}.${quote(trigger)}`)
    await admin.query('SET SESSION sql_mode = ?', [made!.sql_mode])
    await admin.query(made!['SQL Original Statement'])
  }
}

async function copyRows(admin: Connection, name: string, table: string): Promise<void> {
  const columns = await columnsOf(admin, table)
  await admin.query(`INSERT INTO ${quote(name)}.${quote(table)} (${columns}) SELECT ${columns} FROM ${quote(baseName())}.${quote(table)}`)
}

/**
 * Makes a database that an earlier file used equal to the base again. TRUNCATE, since the tables that are only
 * ever added to refuse DELETE by trigger. False when there is none, or one of another shape.
 */
async function bringBack(admin: Connection, name: string): Promise<boolean> {
  const base = baseName()
  const [inBase, inCopy] = [await tablesOf(admin, base), await tablesOf(admin, name)]
  if (inBase.join() !== inCopy.join()) return false
  const sums = await rows<RowDataPacket & { Table: string, Checksum: number | null }>(admin,
    `CHECKSUM TABLE ${inBase.flatMap(table => [`${quote(base)}.${quote(table)}`, `${quote(name)}.${quote(table)}`]).join(', ')}`)
  const sum = new Map(sums.map(row => [row.Table, row.Checksum]))
  for (const table of inBase) {
    const wanted = sum.get(`${base}.${table}`)
    if (wanted === sum.get(`${name}.${table}`)) continue
    await admin.query(`TRUNCATE TABLE ${quote(name)}.${quote(table)}`)
    if (wanted !== 0) await copyRows(admin, name, table)
  }
  return true
}

function quote(name: string): string {
  return `\`${name.replaceAll('`', '``')}\``
}

function baseName(): string {
  return new URL(inject('databaseUrl')).pathname.slice(1)
}

function urlOf(name: string): string {
  const url = new URL(inject('databaseUrl'))
  url.pathname = `/${name}`
  return url.href
}

async function connectTo(database: string): Promise<Connection> {
  const url = new URL(inject('databaseUrl'))
  return mysql.createConnection({
    host: url.hostname,
    port: Number(url.port),
    user: decodeURIComponent(url.username),
    password: decodeURIComponent(url.password),
    ...(database ? { database } : {}),
  })
}

async function rows<Row>(connection: Connection, sql: string, values: unknown[] = []): Promise<Row[]> {
  const [found] = await connection.query(sql, values)
  return found as Row[]
}
