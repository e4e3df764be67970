import type { Knex } from 'knex'
import type { Tables } from 'knex/types/tables'

/** Most rows that one transaction may touch. */
const MOST_ROWS = 5_000
/** Placeholders of one statement: well under the protocol's 65,535. */
const MOST_VALUES = 20_000

type Value = string | number | boolean | null | undefined
type RowOf<T extends keyof Tables> = Partial<Record<keyof Tables[T]['base'], Value>>

/** Rows by the columns they give, so that each statement gives one set of columns. */
function byShape<Row extends object>(rows: readonly Row[]): Row[][] {
  const shapes = new Map<string, Row[]>()
  for (const row of rows) {
    const shape = Object.keys(row).join()
    const some = shapes.get(shape)
    if (some) some.push(row)
    else shapes.set(shape, [row])
  }
  return [...shapes.values()]
}

/**
 * Puts many rows into a table: statements of many rows, no transaction over five thousand. Rows that give other columns
 * go in statements of their own. Returns how many there were.
 */
export async function insertMany<T extends keyof Tables & string>(db: Knex, table: T, rows: readonly RowOf<T>[]): Promise<number> {
  for (let from = 0; from < rows.length; from += MOST_ROWS) {
    await db.transaction(async (trx) => {
      for (const some of byShape(rows.slice(from, from + MOST_ROWS))) await insertAlike(trx, table, some)
    })
  }
  return rows.length
}

async function insertAlike<T extends keyof Tables & string>(trx: Knex, table: T, rows: readonly RowOf<T>[]): Promise<void> {
  const columns = Object.keys(rows[0]!) as (keyof RowOf<T> & string)[]
  const perStatement = Math.max(1, Math.floor(MOST_VALUES / columns.length))
  const tuple = `(${columns.map(() => '?').join(',')})`
  const names = columns.map(column => `\`${column}\``).join(',')
  for (let at = 0; at < rows.length; at += perStatement) {
    const some = rows.slice(at, at + perStatement)
    const values = some.flatMap(row => columns.map(column => row[column] ?? null))
    await trx.raw(`INSERT INTO \`${table}\` (${names}) VALUES ${some.map(() => tuple).join(',')}`, values as Knex.RawBinding[])
  }
}

/** The id that the next row of a table would get, for rows whose ids are given out beforehand. */
export async function nextId(db: Knex, table: keyof Tables & string): Promise<number> {
  const row = await db(table).max({ last: 'id' }).first() as { last: number | null } | undefined
  return (row?.last ?? 0) + 1
}
