import type { Knex } from 'knex'

export interface LimitRow {
  readonly key: string
  readonly points: number
  /** milliseconds since the epoch from which the row counts no more */
  readonly expire: number
}

/** Locks the rows of all keys, in one order for everybody, making those that are missing. Needs a transaction. */
export async function lockLimits(trx: Knex, keys: readonly string[]): Promise<LimitRow[]> {
  const sorted = [...new Set(keys)].sort()
  for (const key of sorted) {
    await trx.raw('INSERT INTO rate_limits (`key`, points, expire) VALUES (?, 0, 0) ON DUPLICATE KEY UPDATE points = points', [key])
  }
  const rows = await trx('rate_limits').whereIn('key', sorted).orderBy('key').forUpdate()
  return rows.map(row => ({ key: row.key, points: Number(row.points), expire: Number(row.expire ?? 0) }))
}

export async function writeLimit(trx: Knex, row: LimitRow): Promise<void> {
  await trx('rate_limits').where({ key: row.key }).update({ points: row.points, expire: row.expire })
}

export async function removeLimits(db: Knex, keys: readonly string[]): Promise<void> {
  if (keys.length > 0) await db('rate_limits').whereIn('key', [...keys]).delete()
}

/** Takes one try back. */
export async function lessenLimits(db: Knex, keys: readonly string[]): Promise<void> {
  if (keys.length > 0) await db('rate_limits').whereIn('key', [...keys]).where('points', '>', 0).decrement('points', 1)
}
