import { randomBytes } from 'node:crypto'
import type { Knex } from 'knex'
import { sqlTime } from '../../../db/time'
import { uuidv7 } from '../../../shared/uuid'
import type { JobKind, JobPayloads } from './kinds'

/**
 * Leaves work for the worker, in the transaction of what makes it necessary.
 *
 * @param runAt not before; at once when unset
 * @returns the job's public id
 */
export async function enqueueJob<K extends JobKind>(trx: Knex, now: Date, kind: K, payload: JobPayloads[K], options: { runAt?: Date, createdBy?: number } = {}): Promise<string> {
  const uid = uuidv7(now.getTime(), randomBytes(16))
  await trx('jobs').insert({
    uid,
    kind,
    payload: JSON.stringify(payload),
    run_at: sqlTime(options.runAt ?? now),
    created_at: sqlTime(now),
    created_by: options.createdBy ?? null,
  })
  return uid
}
