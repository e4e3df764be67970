import type { Knex } from 'knex'
import { isoTime } from '../../../db/time'
import { formatInexactDate } from '../../../shared/domain/dates'
import { formatSteps, fromSixteenths, type Step } from '../../../shared/domain/measuring/index'
import { WHOSE_TURN, type State } from '../../../shared/domain/workflow/states'

export interface MyEntry {
  readonly id: string
  readonly state: State
  readonly turn: string
  readonly since: string
  readonly dueOn: string | null
  readonly category: string
  readonly district: string | null
  readonly takenOn: string
  readonly net: string | null
  readonly recordNo: number | null
  /** whether it is one's own, or begun for somebody who has not claimed it yet */
  readonly own: boolean
}

const MOST = 500

/** Entries of an account, and those it began for others that nobody has claimed, newest first. */
export async function entriesOf(db: Knex, userId: number): Promise<MyEntry[]> {
  const rows = await db('entries as e').join('classes as c', 'c.id', 'e.class_id').leftJoin('districts as d', 'd.id', 'e.district_id')
    .leftJoin('records as r', join => join.on('r.entry_id', 'e.id').andOnIn('r.status', ['accepted', 'challenged']))
    .where(mine => mine.where('e.owner_user_id', userId).orWhere(begun => begun.whereNull('e.owner_user_id').where('e.begun_by_user_id', userId).where('e.source', 'certified')))
    .orderBy('e.state_since', 'desc').limit(MOST)
    .select('e.uid', 'e.state', 'e.state_since', 'e.due_on', 'e.net16', 'e.taken_first_on', 'e.taken_last_on', 'e.taken_precision', 'e.owner_user_id', 'c.code', 'c.step', 'd.name as district', 'r.record_no')
  return rows.map(row => ({
    id: row.uid, state: row.state as State, turn: WHOSE_TURN[row.state as State], since: isoTime(row.state_since), dueOn: row.due_on, category: row.code, district: row.district,
    takenOn: formatInexactDate({ first: row.taken_first_on, last: row.taken_last_on, precision: row.taken_precision }),
    net: row.net16 === null ? null : formatSteps(fromSixteenths(row.net16, row.step as Step), row.step as Step), recordNo: row.record_no, own: row.owner_user_id === userId,
  }))
}
