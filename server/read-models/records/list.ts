import type { Knex } from 'knex'
import type { RecordsRow } from '../../../db/tables'
import { foldedWords } from '../../../shared/domain/fold'
import { searchTokens } from '../../../shared/domain/lists'
import type { RecordFilters, RecordSort, RecordSortField } from '../../../shared/schemas/records'
import { beyond, reversed, type KeyValue, type OrderColumn } from '../keyset'
import type { DistrictName } from './names'

/** Filters with their codes looked up. */
export interface ListScope {
  /** Null for every class; 0 where the filters leave none. */
  readonly classId: number | null
  /** Given where every class of the species is meant. */
  readonly speciesId: number | null
  readonly districtId: number | null
  /** The registry's districts, for the search by their names. */
  readonly districts: readonly DistrictName[]
  readonly filters: RecordFilters
}

const COLUMNS = [
  'id', 'record_no', 'former_no', 'class_id', 'district_id', 'method', 'origin', 'original_origin', 'sex', 'net16', 'gross16', 'taken_first_on',
  'taken_precision', 'taken_year', 'taken_public', 'hunter_shown', 'hunter_sort', 'accepted_on', 'status', 'source', 'key_figures',
] as const satisfies readonly (keyof RecordsRow)[]

/** A row of the list as the database has it. */
export type ListRow = Pick<RecordsRow, Exclude<(typeof COLUMNS)[number], 'status'>> & { readonly status: 'accepted' | 'challenged' }

const asc = (column: string): OrderColumn => ({ column, order: 'asc' })
const desc = (column: string): OrderColumn => ({ column, order: 'desc' })

/**
 * Each order falls on an index; the other way round it is the same index read from its end. Taking is sorted by the year
 * alone: an order by the day would tell the day. Districts stand in the order in which they were made.
 */
const ORDERS: Readonly<Record<RecordSortField, readonly OrderColumn[]>> = {
  net: reversed([desc('r.net16'), asc('r.taken_first_on'), asc('r.id')]),
  gross: reversed([desc('r.gross16'), asc('r.id')]),
  takenOn: [asc('r.taken_year'), asc('r.id')],
  acceptedOn: reversed([desc('r.accepted_on'), asc('r.id')]),
  hunter: [asc('r.hunter_sort'), asc('r.id')],
  district: [asc('r.district_id'), desc('r.net16'), asc('r.taken_first_on'), asc('r.id')],
}

const fieldOf = (sort: RecordSort) => (sort.startsWith('-') ? sort.slice(1) : sort) as RecordSortField

export function orderOf(sort: RecordSort): readonly OrderColumn[] {
  return sort.startsWith('-') ? reversed(ORDERS[fieldOf(sort)]) : ORDERS[fieldOf(sort)]
}

/** A row's place in an order, as a cursor keeps it. */
export function placeOf(row: ListRow, order: readonly OrderColumn[]): KeyValue[] {
  return order.map(({ column }) => row[column.slice(2) as keyof ListRow] as KeyValue)
}

/**
 * The index that holds a list in its order. It is named in the statement: MariaDB sometimes prefers to sort a whole class.
 * Null where a filter may leave few rows of many, so that the server may weigh.
 */
export function indexFor({ classId, speciesId, districtId, filters }: ListScope, sort: RecordSort): string | null {
  if ((filters.q ?? filters.from ?? filters.to ?? filters.sex) !== undefined) return null
  const inside = classId !== null ? 'class' : speciesId !== null ? 'species' : null
  const named = (...parts: (string | null)[]) => ['ix_records', ...parts.filter(part => part !== null)].join('_')
  switch (fieldOf(sort)) {
    case 'net':
      if (inside === 'class' && districtId !== null) return named('class_district_net')
      if (inside === 'class' && filters.method) return named('class_method_net')
      return inside === null && districtId !== null ? named('district_net') : named(inside, 'net')
    case 'district': return inside === 'class' ? named('class_district_net') : named('district_net')
    case 'acceptedOn': return inside === null && districtId !== null ? named('district_accepted') : named(inside, 'accepted')
    case 'takenOn': return named(inside, 'year')
    case 'gross': return named(inside, 'gross')
    case 'hunter': return named(inside, 'hunter')
  }
}

/** Records that stand in the lists, with the filters. A search without a letter or digit finds nothing. */
export function listed(db: Knex, scope: ListScope, index: string | null = null): Knex.QueryBuilder {
  const { classId, speciesId, districtId, filters } = scope
  const query = db.from(db.raw(index === null ? 'records AS r' : 'records AS r FORCE INDEX (??)', index === null ? [] : [index]))
    .whereIn('r.status', ['accepted', 'challenged'])
  if (classId !== null) query.where('r.class_id', classId)
  if (speciesId !== null) query.where('r.species_id', speciesId)
  if (districtId !== null) query.where('r.district_id', districtId)
  if (filters.method) query.where('r.method', filters.method)
  if (filters.sex) query.where('r.sex', filters.sex)
  if (filters.minNet !== undefined) query.where('r.net16', '>=', Math.ceil(filters.minNet * 16))
  if (filters.from !== undefined || filters.to !== undefined) query.where('r.taken_year', '>=', Math.max(1, filters.from ?? 1))
  if (filters.to !== undefined) query.where('r.taken_year', '<=', filters.to)
  if (filters.q !== undefined) found(db, query, filters.q, scope.districts)
  return query
}

/** Words of one search that are looked at. */
const MOST_WORDS = 8

/** Every word has to be the beginning of a word of the record, or of its district's name. */
function found(db: Knex, query: Knex.QueryBuilder, q: string, districts: readonly DistrictName[]): void {
  const words = foldedWords(q)
  if (words.length === 0) query.whereRaw('1 = 0')
  for (const word of words.slice(0, MOST_WORDS)) {
    const named = districts.filter(district => district.words.some(one => one.startsWith(word))).map(district => district.id)
    query.where((either) => {
      either.whereExists(token => token.from('record_tokens as t').select(db.raw('1')).whereRaw('t.record_id = r.id').where('t.token', searchTokens(word)[0]!))
      if (named.length > 0) either.orWhereIn('r.district_id', named)
    })
  }
}

/** One page, one row more than asked for when there are more that way; always in list order. */
export async function listPage(db: Knex, scope: ListScope, sort: RecordSort, limit: number, place: { readonly values: readonly KeyValue[], readonly way: 'next' | 'prev' } | null): Promise<ListRow[]> {
  const order = place?.way === 'prev' ? reversed(orderOf(sort)) : orderOf(sort)
  const query = listed(db, scope, indexFor(scope, sort)).select(COLUMNS.map(column => `r.${column}`)).orderBy([...order]).limit(limit + 1)
  if (place) beyond(query, order, place.values)
  const rows: ListRow[] = await query
  return place?.way === 'prev' ? rows.reverse() : rows
}

/** One record that stands in the lists. */
export async function listedByNo(db: Knex, recordNo: number): Promise<ListRow & Pick<RecordsRow, 'sheet_id' | 'entry_id'> | undefined> {
  return db('records').where('record_no', recordNo).whereIn('status', ['accepted', 'challenged']).first(...COLUMNS, 'sheet_id', 'entry_id') as never
}

/** The `count` records on one side of a place in a class's list by net. */
export function besideInClass(db: Knex, row: ListRow, side: 'above' | 'below', count: number): Promise<ListRow[]> {
  const scope: ListScope = { classId: row.class_id, speciesId: null, districtId: null, districts: [], filters: {} }
  return listPage(db, scope, '-net', count - 1, { values: placeOf(row, orderOf('-net')), way: side === 'above' ? 'prev' : 'next' })
}
