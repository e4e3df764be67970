import type { Knex } from 'knex'

export async function hasBegun(db: Knex, task: string, period: string): Promise<boolean> {
  return await db('schedules').where({ task, period }).first('task') !== undefined
}

export async function noteBegun(db: Knex, task: string, period: string, at: string): Promise<void> {
  await db('schedules').insert({ task, period, run_at: at })
}
