import type { Knex } from 'knex'
import { isoTime } from '../../../db/time'
import type { DeskKind } from '../../../shared/domain/desk'
import type { Role } from '../../../shared/domain/access/roles'
import type { State } from '../../../shared/domain/workflow/states'

/** One thing that waits, as the database has it. Figures in sixteenths, times ISO 8601 in UTC. */
export interface DeskRow {
  readonly kind: DeskKind
  readonly uid: string
  readonly sitting_uid?: string | null
  readonly state?: State | null
  readonly category?: string | null
  readonly step?: '1/8' | '1/16'
  readonly district?: string | null
  readonly person?: string | null
  readonly role?: Role | null
  readonly net16?: number | null
  readonly place?: string | null
  readonly held_on?: string | null
  readonly count?: number | null
  readonly hold_at?: string | null
  readonly since: string
  readonly due_on?: string | null
}

/** What waits of one kind: the oldest lines and how many there are in all. */
export interface DeskPile {
  readonly rows: readonly DeskRow[]
  readonly total: number
}

/** How many lines of one kind the desk shows; the queues show the others. */
export const MOST_LINES = 40

/** Entries with what a line says of them. Ask for `LINE_COLUMNS` of it. */
export function entryLines(db: Knex) {
  return db('entries as e')
    .join('classes as c', 'c.id', 'e.class_id')
    .leftJoin('districts as d', 'd.id', 'e.district_id')
}

/** Hunter, finder, owner or club: whoever the file is named after. */
export const NAMED_AFTER = `(SELECT p.name FROM entry_people p WHERE p.entry_id = e.id AND p.part IN ('hunter', 'finder', 'owner', 'club')
  ORDER BY FIELD(p.part, 'hunter', 'finder', 'owner', 'club'), p.id LIMIT 1)`

export function lineColumns(db: Knex) {
  return [
    'e.uid', 'e.state', 'c.code as category', 'c.step', 'd.name as district', 'e.net16', 'e.hold_at', 'e.state_since as since', 'e.due_on',
    db.raw(`${NAMED_AFTER} as person`),
  ]
}

/** Rows of a query as lines of one kind. */
export function asRows(kind: DeskKind, rows: readonly Omit<DeskRow, 'kind'>[]): DeskRow[] {
  return rows.map(row => ({ ...row, kind, since: isoTime(row.since) }))
}

/** Rows of a query as a pile of one kind; the query had no limit. */
export function asPile(kind: DeskKind, rows: readonly Omit<DeskRow, 'kind'>[]): DeskPile {
  return { rows: asRows(kind, rows.slice(0, MOST_LINES)), total: rows.length }
}

/** The oldest lines of a query over `entryLines` and how many it has. */
export async function pileOf(db: Knex, kind: DeskKind, query: Knex.QueryBuilder, sinceColumn = 'e.state_since'): Promise<DeskPile> {
  const [rows, counted] = await Promise.all([
    query.clone().select(lineColumns(db)).orderBy([{ column: sinceColumn }, { column: 'e.id' }]).limit(MOST_LINES),
    query.clone().count({ n: '*' }).first(),
  ])
  return { rows: asRows(kind, rows), total: Number(counted?.n ?? 0) }
}

/** Leaves out entries in which an account has a part, that it measured, or in which it declared a stake. */
export function withoutStakeOf(query: Knex.QueryBuilder, userId: number): Knex.QueryBuilder {
  return query
    .where(q => q.whereNull('e.owner_user_id').orWhereNot('e.owner_user_id', userId))
    .whereNotExists(q => q.from('entry_people as sp').whereRaw('sp.entry_id = e.id').where('sp.user_id', userId).whereNotIn('sp.part', ['witness', 'club']))
    .whereNotExists(q => q.from('sheets as ss').whereRaw('ss.entry_id = e.id').where('ss.measurer_user_id', userId).where('ss.kind', 'entry').whereNotNull('ss.signed_at'))
    .whereNotExists(q => q.from('stake_declarations as sd').whereRaw('sd.entry_id = e.id').where('sd.user_id', userId))
}
