import type { Knex } from 'knex'

/** Takes the right to send one reminder, once for ever; false when it was taken before. */
export async function takeReminder(trx: Knex, task: string, period: string, at: string): Promise<boolean> {
  const standing = await trx('schedules').where({ task, period }).first('task')
  if (standing) return false
  await trx('schedules').insert({ task, period, run_at: at })
  return true
}

export interface EndingAccreditation { readonly id: number, readonly user_id: number, readonly valid_to: string }

/** Accreditations that end between two days and are not suspended. */
export async function listEndingAccreditations(db: Knex, from: string, to: string): Promise<EndingAccreditation[]> {
  return db('accreditations').whereBetween('valid_to', [from, to]).whereNull('suspended_at').orderBy('id').select('id', 'user_id', 'valid_to')
}

export interface ComingSitting { readonly id: number, readonly uid: string, readonly held_on: string, readonly place: string }

export async function listComingSittings(db: Knex, from: string, to: string): Promise<ComingSitting[]> {
  return db('sittings').where({ state: 'planned' }).whereBetween('held_on', [from, to]).orderBy('id').select('id', 'uid', 'held_on', 'place')
}
