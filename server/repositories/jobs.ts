import type { Knex } from 'knex'
import { sqlTime } from '../../db/time'
import type { Lease } from './leases'

export interface JobWork {
  readonly kind: string
  readonly payload: unknown
  readonly cancelled: boolean
}

export async function readJob(db: Knex, id: number): Promise<JobWork | null> {
  const row = await db('jobs').where({ id }).first('kind', 'payload', 'cancel_at')
  return row ? { kind: row.kind, payload: JSON.parse(row.payload), cancelled: row.cancel_at !== null } : null
}

/** @param percent 0 to 100 */
export async function noteProgress(db: Knex, lease: Lease, percent: number, now: Date): Promise<void> {
  await db('jobs').where({ id: lease.id, claimed_until: lease.claimedUntil }).update({ progress: Math.round(percent), heartbeat_at: sqlTime(now) })
}
