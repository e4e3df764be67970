import type { Knex } from 'knex'

type Value = string | number | null
export type SeedRow = Readonly<Record<string, Value>>

const BATCH = 500

/** Canonical text of what was seeded, so that two seedings of the same values compare equal. */
function written(row: SeedRow): string {
  return JSON.stringify(Object.fromEntries(Object.entries(row).sort(([a], [b]) => (a < b ? -1 : 1))))
}

export interface Kept {
  inserted: number
  updated: number
  /** rows left alone because somebody edited them */
  edited: number
}

/**
 * Puts reference rows into `table`: inserts what is missing and changes only rows that still equal what was seeded,
 * so that an edit made in the registry survives every start. What was seeded stands in the column `seeded`.
 *
 * @param key columns that tell rows apart
 * @param seedsOnce columns that are only given at the first insert and belong to the registry afterwards
 */
export async function keepSeeded(
  db: Knex, table: string, key: readonly string[], rows: readonly SeedRow[], seedsOnce: SeedRow = {},
): Promise<Kept> {
  const name = (row: Readonly<Record<string, unknown>>) => JSON.stringify(key.map(column => row[column]))
  const standing = new Map<string, Record<string, Value>>()
  for (const row of await db(table).select<Record<string, Value>[]>('*')) standing.set(name(row), row)

  const missing: Record<string, Value>[] = []
  const kept: Kept = { inserted: 0, updated: 0, edited: 0 }
  for (const row of rows) {
    const seeded = written(row)
    const now = standing.get(name(row))
    if (!now) {
      missing.push({ ...seedsOnce, ...row, seeded })
      continue
    }
    const before = now.seeded === null ? null : JSON.parse(String(now.seeded)) as SeedRow
    if (before === null || Object.entries(before).some(([column, value]) => now[column] !== value)) {
      kept.edited++
      continue
    }
    if (written(before) === seeded) continue
    await db(table).where(Object.fromEntries(key.map(column => [column, row[column]!]))).update({ ...row, seeded })
    kept.updated++
  }
  if (missing.length > 0) await db.batchInsert(table, missing, BATCH)
  kept.inserted = missing.length
  return kept
}

/** The same rule for `settings`: a value somebody changed stays. */
export async function keepSettings(db: Knex, values: Readonly<Record<string, unknown>>): Promise<Kept> {
  const standing = new Map((await db('settings').select('name', 'value', 'seeded_value')).map(row => [row.name, row]))
  const kept: Kept = { inserted: 0, updated: 0, edited: 0 }
  for (const [name, value] of Object.entries(values)) {
    const text = JSON.stringify(value)
    const now = standing.get(name)
    if (!now) {
      await db('settings').insert({ name, value: text, seeded_value: text })
      kept.inserted++
    }
    else if (now.value !== now.seeded_value) {
      kept.edited++
    }
    else if (now.value !== text) {
      await db('settings').where({ name }).update({ value: text, seeded_value: text })
      kept.updated++
    }
  }
  return kept
}
