import type { Knex } from 'knex'
import type { Tables } from 'knex/types/tables'

/** Most rows that one transaction may touch. */
const MOST_ROWS = 5_000
/** Placeholders of one statement: well under the protocol's 65,535. */
const MOST_VALUES = 20_000

type Value = string | number | boolean | null | undefined
type RowOf<T extends keyof Tables> = Partial<Record<keyof Tables[T]['base'], Value>>

/**
 * Puts many rows of one shape into a table: statements of many rows, no transaction over five thousand. The columns are
 * those of the first row. Returns how many there were.
 */
export async function insertMany<T extends keyof Tables & string>(db: Knex, table: T, rows: readonly RowOf<T>[]): Promise<number> {
  if (rows.length === 0) return 0
  const columns = Object.keys(rows[0]!) as (keyof RowOf<T> & string)[]
  const perStatement = Math.max(1, Math.floor(MOST_VALUES / columns.length))
  const tuple = `(${columns.map(() => '?').join(',')})`
  const names = columns.map(column => `\`${column}\``).join(',')
  for (let from = 0; from < rows.length; from += MOST_ROWS) {
    await db.transaction(async (trx) => {
      const part = rows.slice(from, from + MOST_ROWS)
      for (let at = 0; at < part.length; at += perStatement) {
        const some = part.slice(at, at + perStatement)
        const values = some.flatMap(row => columns.map(column => row[column] ?? null))
        await trx.raw(`INSERT INTO \`${table}\` (${names}) VALUES ${some.map(() => tuple).join(',')}`, values as Knex.RawBinding[])
      }
    })
  }
  return rows.length
}

/** The id that the next row of a table would get, for rows whose ids are given out beforehand. */
export async function nextId(db: Knex, table: keyof Tables & string): Promise<number> {
  const row = await db(table).max({ last: 'id' }).first() as { last: number | null } | undefined
  return (row?.last ?? 0) + 1
}
