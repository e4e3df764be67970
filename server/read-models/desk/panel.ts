import type { Knex } from 'knex'
import type { Day } from '../../../shared/domain/dates'
import { asPile, entryLines, lineColumns, type DeskPile } from './rows'

/** Docket items of a judge's sittings on which they have not voted: to read before the sitting opens, to vote on while it is open. */
export async function docketOf(db: Knex, userId: number): Promise<DeskPile[]> {
  const rows = await entryLines(db)
    .join('docket_items as i', 'i.entry_id', 'e.id')
    .join('sittings as s', 's.id', 'i.sitting_id')
    .join('sitting_judges as j', q => q.on('j.sitting_id', 's.id').andOnVal('j.user_id', userId))
    .leftJoin('ballots as b', q => q.on('b.docket_item_id', 'i.id').andOnVal('b.judge_user_id', userId))
    .leftJoin('file_openings as f', q => q.on('f.entry_id', 'e.id').andOnVal('f.user_id', userId))
    .where('i.state', 'open').whereIn('s.state', ['planned', 'open']).whereNull('b.id')
    .where(q => q.where('s.state', 'open').orWhereNull('f.user_id'))
    .orderBy([{ column: 'i.created_at' }, { column: 'i.id' }])
    .select([...lineColumns(db), 's.uid as sitting_uid', 's.state as sitting_state', 's.held_on', 's.place', 'i.created_at as since',
      db.raw(`(i.second_measuring_due = 1 AND (i.judge_a = ? OR i.judge_b = ?)
        AND NOT EXISTS (SELECT 1 FROM remeasurings r WHERE r.docket_item_id = i.id AND r.state IN ('recorded', 'not_presented'))) as blind`, [userId, userId])])
  // Whoever will measure the head again has not seen its figures, and is not asked to open the file before.
  const seen = rows.filter(row => !row.blind || row.sitting_state === 'open').map(row => ({ ...row, net16: row.blind ? null : row.net16 }))
  const as = (kind: 'vote' | 'read_file', state: string) => asPile(kind, seen.filter(row => row.sitting_state === state))
  return [as('vote', 'open'), as('read_file', 'planned')]
}

/** Second measurings that a judge of the pair has to make or to sign. */
export async function secondMeasuringsOf(db: Knex, userId: number): Promise<DeskPile> {
  const rows = await entryLines(db).join('remeasurings as r', 'r.entry_id', 'e.id')
    .whereIn('r.state', ['ordered', 'measuring'])
    .where(q => q.where('r.judge_a', userId).orWhere('r.judge_b', userId))
    .orderBy('r.ordered_at')
    .select([...lineColumns(db), 'r.ordered_at as since', 'r.place', db.raw('DATE(r.at) as held_on')])
  // The pair measures blind: no figure of the entry stands on their desk.
  return asPile('second_measuring', rows.map(row => ({ ...row, net16: null })))
}

/** Sittings that their chair has to open or to close; `today` in the registry's zone. */
export async function sittingsOfChair(db: Knex, userId: number, today: Day): Promise<DeskPile[]> {
  const rows = await db('sittings as s').where('s.chair_user_id', userId)
    .where(q => q.where('s.state', 'open').orWhere(p => p.where('s.state', 'planned').where('s.held_on', '<=', today)))
    .orderBy('s.held_on')
    .select(['s.uid', 's.uid as sitting_uid', 's.state as sitting_state', 's.place', 's.held_on',
      db.raw('COALESCE(s.opened_at, TIMESTAMP(s.held_on)) as since'),
      db.raw('(SELECT COUNT(*) FROM docket_items i WHERE i.sitting_id = s.id AND i.state = \'open\') as count')])
  const as = (kind: 'open_sitting' | 'close_sitting', state: string) => asPile(kind, rows.filter(row => row.sitting_state === state)
    .map(row => ({ ...row, state: null, count: Number(row.count) })))
  return [as('open_sitting', 'planned'), as('close_sitting', 'open')]
}

/** Docket items that no sitting has yet, as one line for whoever may plan one. */
export async function itemsWithoutSitting(db: Knex): Promise<DeskPile> {
  const row = await db('docket_items as i').where('i.state', 'open').whereNull('i.sitting_id')
    .select(db.raw('COUNT(*) as count'), db.raw('MIN(i.created_at) as since'), db.raw('MIN(i.uid) as uid')).first()
  const count = Number(row?.count ?? 0)
  return asPile('plan_sitting', count === 0 ? [] : [{ uid: row.uid, since: row.since, count }])
}
