import type { Knex } from 'knex'
import { parseSqlTime, sqlTime } from '../../db/time'
import { inTransaction } from '../../db/transaction'

/** Tables whose rows are work: waiting until `run_at`, taken by one worker at a time until `claimed_until`. */
export type WorkTable = 'notices' | 'jobs' | 'payment_commands'

export interface Lease {
  readonly table: WorkTable
  readonly id: number
  /** As the database wrote it; who still holds the lease finds it unchanged. */
  readonly claimedUntil: string
  /** This one included, from 1. */
  readonly attempt: number
}

/**
 * Takes up to `limit` due rows in one short transaction. A row that is taken is due again when its lease runs out,
 * so work of a process that was killed comes back by itself, and a claimed row is not even looked at before.
 *
 * @param leaseMs how long the work may take before somebody else may begin it again
 */
export async function claimDue(db: Knex, table: WorkTable, now: Date, leaseMs: number, limit: number): Promise<Lease[]> {
  const until = sqlTime(new Date(now.getTime() + leaseMs))
  return inTransaction(db, async (trx) => {
    const due: { id: number, attempts: number }[] = await trx(table)
      .select('id', 'attempts')
      .where({ state: 'waiting' })
      .where('run_at', '<=', sqlTime(now))
      .orderBy([{ column: 'run_at' }, { column: 'id' }])
      .limit(limit)
      .forUpdate()
      .skipLocked()
    if (due.length === 0) return []
    await trx(table).whereIn('id', due.map(row => row.id)).update({ run_at: until, claimed_until: until, attempts: trx.raw('attempts + 1') })
    return due.map(({ id, attempts }) => ({ table, id, claimedUntil: until, attempt: attempts + 1 }))
  })
}

/**
 * Says how claimed work ended. False when the lease was lost meanwhile, so that the end of somebody else's
 * attempt is never overwritten.
 */
export async function settle(db: Knex, lease: Lease, changes: Readonly<Record<string, unknown>>): Promise<boolean> {
  const changed = await db(lease.table).where({ id: lease.id, state: 'waiting', claimed_until: lease.claimedUntil }).update(changes)
  return changed === 1
}

/** Work that failed for now is due again at `at`. */
export async function putBack(db: Knex, lease: Lease, at: Date, error: string): Promise<boolean> {
  return settle(db, lease, { run_at: sqlTime(at), claimed_until: null, last_error: error.slice(0, 1000) })
}

/** Work that was taken but not begun: due at once for somebody else, and the attempt does not count. */
export async function giveBack(db: Knex, lease: Lease, now: Date): Promise<boolean> {
  return settle(db, lease, { run_at: sqlTime(now), claimed_until: null, attempts: lease.attempt - 1 })
}

/** Holds on to work that takes long. Null when the lease was lost. */
export async function extendLease(db: Knex, lease: Lease, now: Date, leaseMs: number): Promise<Lease | null> {
  const until = sqlTime(new Date(Math.max(now.getTime() + leaseMs, parseSqlTime(lease.claimedUntil).getTime() + 1)))
  const held = await settle(db, lease, { run_at: until, claimed_until: until })
  return held ? { ...lease, claimedUntil: until } : null
}
