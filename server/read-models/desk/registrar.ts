import type { Knex } from 'knex'
import { asPile, type DeskPile } from './rows'

/** Staff roles that another registrar proposed and that wait for this one's word. */
export async function proposalsFor(db: Knex, userId: number): Promise<DeskPile> {
  const rows = await db('role_proposals as r').join('users as u', 'u.id', 'r.user_id')
    .whereNull('r.decision').whereNot('r.proposed_by', userId).whereNot('r.user_id', userId)
    .orderBy('r.proposed_at').select('r.uid', 'r.role', 'u.name as person', 'r.proposed_at as since')
  return asPile('role_proposal', rows)
}

/** Reports on listed records that the office has not checked. */
export async function reportsToCheck(db: Knex): Promise<DeskPile> {
  const rows = await db('challenges as h').join('entries as e', 'e.id', 'h.entry_id').join('classes as c', 'c.id', 'e.class_id')
    .leftJoin('districts as d', 'd.id', 'e.district_id').where('h.state', 'reported').orderBy('h.reported_at')
    .select('e.uid', 'e.state', 'c.code as category', 'c.step', 'd.name as district', 'e.net16', 'e.hold_at', 'h.reported_at as since')
  return asPile('check_report', rows)
}
