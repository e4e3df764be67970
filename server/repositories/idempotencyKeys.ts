import type { Knex } from 'knex'
import { isoTime, sqlTime } from '../../db/time'

interface Slot { readonly userId: number, readonly route: string, readonly key: string, readonly bodyHash: string }

const where = (slot: Slot) => ({ user_id: slot.userId, route: slot.route, key: slot.key })

/** Takes the slot; false when somebody has it. */
export async function insert(db: Knex, slot: Slot, now: Date): Promise<boolean> {
  try {
    await db('idempotency_keys').insert({ ...where(slot), body_hash: slot.bodyHash, state: 'running', created_at: sqlTime(now) })
    return true
  }
  catch (error) {
    if ((error as { code?: string }).code === 'ER_DUP_ENTRY') return false
    throw error
  }
}

export async function find(db: Knex, slot: Slot) {
  const row = await db('idempotency_keys').where(where(slot)).first()
  if (!row) return null
  return {
    bodyHash: String(row.body_hash),
    state: row.state as 'running' | 'done',
    status: Number(row.status ?? 200),
    response: typeof row.response === 'string' ? JSON.parse(row.response) as unknown : row.response as unknown,
    createdAt: isoTime(row.created_at),
  }
}

export async function finish(db: Knex, slot: Slot, status: number, response: unknown): Promise<void> {
  await db('idempotency_keys').where(where(slot)).update({ state: 'done', status, response: JSON.stringify(response) })
}

export async function remove(db: Knex, slot: Slot): Promise<void> {
  await db('idempotency_keys').where(where(slot)).delete()
}

/** Frees this key where it is past its time: answered before `doneBefore`, or begun before `runningBefore` and never ended. */
export async function dropOlder(db: Knex, slot: Slot, doneBefore: Date, runningBefore: Date): Promise<void> {
  await db('idempotency_keys').where(where(slot))
    .andWhere(q => q.where('created_at', '<', sqlTime(doneBefore)).orWhere(r => r.where('state', 'running').andWhere('created_at', '<', sqlTime(runningBefore))))
    .delete()
}
