import type { Knex } from 'knex'
import { sqlTime } from '../../db/time'

/** Says that a worker lives. @param name host and process, one row each */
export async function noteHeartbeat(db: Knex, name: string, startedAt: Date, now: Date): Promise<void> {
  await db('worker_heartbeats')
    .insert({ name, started_at: sqlTime(startedAt), seen_at: sqlTime(now) })
    .onConflict('name')
    .merge(['started_at', 'seen_at'])
}

/** A worker that ends in order takes its row with it. */
export async function dropHeartbeat(db: Knex, name: string): Promise<void> {
  await db('worker_heartbeats').where({ name }).delete()
}
