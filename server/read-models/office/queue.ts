import type { Knex } from 'knex'
import { isoTime } from '../../../db/time'
import { foldedWords } from '../../../shared/domain/fold'
import { OFFICE_STATES, type QueueQuestion } from '../../../shared/domain/desk'
import type { Step } from '../../../shared/domain/measuring/units'
import type { Origin } from '../../../shared/domain/workflow/origins'
import type { State } from '../../../shared/domain/workflow/states'
import { NAMED_AFTER } from '../desk/rows'

/** Where a page of the queue goes on: the sort's value and the entry's id of the last line. */
export interface QueuePlace {
  readonly value: string | number
  readonly id: number
}

/** States in which somebody still has to act. */
const OPEN = ['in_review', 'returned', 'at_panel', 'remeasuring', 'challenged'] as const

function chosen(db: Knex, query: QueueQuestion, userId: number): Knex.QueryBuilder {
  const q = db('entries as e').join('classes as c', 'c.id', 'e.class_id').leftJoin('districts as d', 'd.id', 'e.district_id')
    .where('e.source', 'certified')
  if (query.state === 'open') q.whereIn('e.state', OPEN)
  else q.where('e.state', query.state)
  if (query.state === 'lapsed' || query.state === 'withdrawn') q.whereNotNull('e.submitted_at')
  if (query.category) q.where('c.code', query.category)
  if (query.district) q.where('d.code', query.district)
  if (query.keeper === 'me') q.where('e.reviewer_user_id', userId)
  if (query.keeper === 'nobody') q.whereNull('e.reviewer_user_id')
  for (const word of foldedWords(query.q ?? '').slice(0, 5)) {
    q.whereExists(p => p.from('entry_people as sp').whereRaw('sp.entry_id = e.id').where('sp.name_key', 'like', `%${word}%`))
  }
  return q
}

interface QueueRow {
  readonly id: number
  readonly uid: string
  readonly state: State
  readonly state_since: string
  readonly due_on: string | null
  readonly net16: number | null
  readonly origin: Origin
  readonly hold_at: string | null
  readonly appealed_at: string | null
  readonly reviewer_user_id: number | null
  readonly category: string
  readonly step: Step
  readonly district: string | null
  readonly reviewer_name: string
  readonly person: string | null
  readonly open_requests: number
  readonly ticked: number
}

/** One page of the office's queue, one line more than asked for when there is a next page. */
export async function queuePage(db: Knex, query: QueueQuestion, userId: number, after: QueuePlace | null) {
  const column = query.sort.endsWith('age') ? 'e.state_since' : 'e.net16'
  const descending = query.sort.startsWith('-')
  const q = chosen(db, query, userId)
  if (after) {
    const beyond = descending ? '<' : '>'
    q.where(p => p.where(column, beyond, after.value).orWhere(r => r.where(column, after.value).where('e.id', '>', after.id)))
  }
  const rows: QueueRow[] = await q.leftJoin('users as u', 'u.id', 'e.reviewer_user_id')
    .orderBy([{ column, order: descending ? 'desc' : 'asc' }, { column: 'e.id', order: 'asc' }]).limit(query.limit + 1)
    .select('e.id', 'e.uid', 'e.state', 'e.state_since', 'e.due_on', 'e.net16', 'e.origin', 'e.hold_at', 'e.appealed_at', 'e.reviewer_user_id',
      'c.code as category', 'c.step', 'd.name as district', 'u.name as reviewer_name',
      db.raw(`${NAMED_AFTER} as person`),
      db.raw('(SELECT COUNT(*) FROM requests r WHERE r.entry_id = e.id AND r.closed_at IS NULL) as open_requests'),
      db.raw('(SELECT COUNT(*) FROM checks k WHERE k.entry_id = e.id) as ticked'))
  return rows.map(row => ({ ...row, since: isoTime(row.state_since), open_requests: Number(row.open_requests), ticked: Number(row.ticked) }))
}

export async function queueTotal(db: Knex, query: QueueQuestion, userId: number): Promise<number> {
  const row = await chosen(db, query, userId).count({ n: '*' }).first()
  return Number((row as { n: number } | undefined)?.n ?? 0)
}

/** How many entries stand in each state that the office sees. */
export async function statesCount(db: Knex): Promise<Record<string, number>> {
  const rows = await db('entries').where('source', 'certified').whereIn('state', OFFICE_STATES)
    .where(q => q.whereNotIn('state', ['lapsed', 'withdrawn']).orWhereNotNull('submitted_at'))
    .groupBy('state').select('state').count({ n: '*' })
  return Object.fromEntries(rows.map(row => [row.state, Number(row.n)]))
}

/** Classes and districts that occur in the chosen state. */
export async function queueChoices(db: Knex, query: QueueQuestion, userId: number) {
  const all = { ...query, category: undefined, district: undefined, q: undefined, keeper: 'anyone' as const }
  const [categories, districts] = await Promise.all([
    chosen(db, all, userId).distinct('c.code', 'c.sort').orderBy('c.sort'),
    chosen(db, all, userId).whereNotNull('d.code').distinct('d.code', 'd.name', 'd.sort').orderBy('d.sort'),
  ])
  return {
    categories: categories.map((row: { code: string }) => row.code),
    districts: districts.map((row: { code: string, name: string }) => ({ code: row.code, name: row.name })),
  }
}
