import type { Knex } from 'knex'
import { isoTime } from '../../../db/time'
import type { Step } from '../../../shared/domain/measuring/units'
import type { State } from '../../../shared/domain/workflow/states'
import { NAMED_AFTER } from '../desk/rows'

export interface DocketRow {
  readonly id: number
  readonly uid: string
  readonly entry_id: number
  readonly entry_uid: string
  readonly kind: 'entry' | 'appeal' | 'challenge'
  readonly position: number
  readonly state: 'open' | 'decided' | 'carried' | 'applied' | 'removed'
  readonly entry_state: State
  readonly category: string
  readonly step: Step
  readonly district: string | null
  readonly person: string | null
  readonly net16: number | null
  readonly second_measuring_due: 0 | 1
  readonly judge_a: number | null
  readonly judge_b: number | null
  readonly outcome: string | null
  readonly ground: string | null
  readonly reason: string | null
  readonly hold_at: string | null
  readonly since: string
  /** the pair has measured, or the animal was not brought */
  readonly measured_again: 0 | 1
}

function items(db: Knex) {
  return db('docket_items as i').join('entries as e', 'e.id', 'i.entry_id').join('classes as c', 'c.id', 'e.class_id').leftJoin('districts as d', 'd.id', 'e.district_id')
    .select('i.id', 'i.uid', 'i.entry_id', 'e.uid as entry_uid', 'i.kind', 'i.position', 'i.state', 'e.state as entry_state', 'c.code as category', 'c.step',
      'd.name as district', 'e.net16', 'i.second_measuring_due', 'i.judge_a', 'i.judge_b', 'i.outcome', 'i.ground', 'i.reason', 'e.hold_at', 'i.created_at as since',
      db.raw(`${NAMED_AFTER} as person`),
      db.raw('EXISTS (SELECT 1 FROM remeasurings r WHERE r.docket_item_id = i.id AND r.state IN (\'recorded\', \'not_presented\')) as measured_again'))
}

const withTimes = (rows: DocketRow[]): DocketRow[] => rows.map(row => ({ ...row, since: isoTime(row.since) }))

/** The docket of a sitting, in its order. */
export async function docketOf(db: Knex, sittingId: number): Promise<DocketRow[]> {
  return withTimes(await items(db).where('i.sitting_id', sittingId).whereNot('i.state', 'removed').orderBy('i.position').orderBy('i.id'))
}

/** Items before the panel that no sitting has, the longest wait first. */
export async function itemsWithoutSitting(db: Knex): Promise<DocketRow[]> {
  return withTimes(await items(db).where('i.state', 'open').whereNull('i.sitting_id').orderBy('i.created_at').orderBy('i.id').limit(200))
}

export interface SittingRow {
  readonly uid: string
  readonly held_on: string
  readonly place: string
  readonly state: 'planned' | 'open' | 'closed'
  readonly chair: string
  readonly chair_user_id: number
  readonly is_judge: number
  readonly items: number
  readonly to_vote: number
}

/** Sittings that a person may look at: a judge sees their own, whoever plans sees all. The next one first, then the past ones. */
export async function sittingsFor(db: Knex, userId: number, all: boolean, limit: number): Promise<SittingRow[]> {
  const q = db('sittings as s').join('users as u', 'u.id', 's.chair_user_id')
  if (!all) q.where(p => p.where('s.chair_user_id', userId).orWhereExists(j => j.from('sitting_judges as sj').whereRaw('sj.sitting_id = s.id').where('sj.user_id', userId)))
  return q.orderByRaw('s.state = \'closed\', CASE WHEN s.state = \'closed\' THEN NULL ELSE s.held_on END, s.held_on DESC, s.id DESC').limit(limit)
    .select('s.uid', 's.held_on', 's.place', 's.state', 'u.name as chair', 's.chair_user_id',
      db.raw('EXISTS (SELECT 1 FROM sitting_judges sj WHERE sj.sitting_id = s.id AND sj.user_id = ?) as is_judge', [userId]),
      db.raw('(SELECT COUNT(*) FROM docket_items i WHERE i.sitting_id = s.id AND i.state <> \'removed\') as items'),
      db.raw(`(SELECT COUNT(*) FROM docket_items i WHERE i.sitting_id = s.id AND i.state = 'open'
        AND NOT EXISTS (SELECT 1 FROM ballots b WHERE b.docket_item_id = i.id AND b.judge_user_id = ?)) as to_vote`, [userId]))
}

/** Accounts that are judges at an instant. */
export async function judgesNow(db: Knex, at: string): Promise<{ uid: string, name: string }[]> {
  return db('user_roles as r').join('users as u', 'u.id', 'r.user_id').where('r.role', 'judge').where('r.from_at', '<=', at)
    .where(q => q.whereNull('r.to_at').orWhere('r.to_at', '>', at)).whereNull('u.disabled_at').whereNull('u.erased_at').distinct('u.uid', 'u.name').orderBy('u.name')
}
