import type { Knex } from 'knex'
import { sqlTime } from '../../db/time'

/** No transaction touches more rows than this. */
const ROWS = 1_000
const HOUR = 3_600_000
const DAY = 24 * HOUR

/** What is kept only for a while: table, its time column, and for how long after that time. */
const SPENT: readonly { readonly table: string, readonly at: string, readonly keptMs: number }[] = [
  { table: 'idempotency_keys', at: 'created_at', keptMs: 72 * HOUR },
  { table: 'user_tokens', at: 'expires_at', keptMs: 7 * DAY },
  { table: 'schedules', at: 'run_at', keptMs: 30 * DAY },
  { table: 'worker_heartbeats', at: 'seen_at', keptMs: DAY },
]

/**
 * Deletes rows whose use is over, a thousand at a time.
 *
 * @returns rows deleted by table
 */
export async function forgetSpent(db: Knex, now: Date): Promise<Record<string, number>> {
  const deleted: Record<string, number> = {}
  for (const { table, at, keptMs } of SPENT) {
    const before = sqlTime(new Date(now.getTime() - keptMs))
    let rows: number
    do {
      rows = await db(table).where(at, '<', before).limit(ROWS).delete()
      deleted[table] = (deleted[table] ?? 0) + rows
    } while (rows === ROWS)
  }
  return deleted
}
