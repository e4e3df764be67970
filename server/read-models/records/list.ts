import type { Knex } from 'knex'
import { foldedWords } from '../../../shared/domain/fold'
import { searchTokens } from '../../../shared/domain/lists'
import type { Step } from '../../../shared/domain/measuring/index'
import type { RecordFilters, RecordSort, RecordSortField } from '../../../shared/schemas/records'
import { beyond, reversed, type KeyValue, type OrderColumn } from '../keyset'

/** Filters with their codes looked up. */
export interface ListScope {
  /** Classes that the filters leave, by id; null for every class. */
  readonly classIds: readonly number[] | null
  readonly districtId: number | null
  /** Every district by the folded words of its name, for the search. */
  readonly districts: readonly { readonly id: number, readonly words: readonly string[] }[]
  readonly filters: RecordFilters
}

/** A row of the list as the database has it. */
export interface ListRow {
  readonly id: number
  readonly record_no: number
  readonly former_no: string | null
  readonly class_id: number
  readonly category: string
  readonly definition: string
  readonly step: Step
  readonly species: string
  readonly district_id: number
  readonly district: string
  readonly method: string | null
  readonly origin: string
  readonly original_origin: string | null
  readonly sex: string | null
  readonly net16: number
  readonly gross16: number
  readonly taken_first_on: string
  readonly taken_precision: string
  readonly taken_public: string
  readonly hunter_shown: string
  readonly hunter_sort: string
  readonly accepted_on: string
  readonly status: 'accepted' | 'challenged'
  readonly source: 'certified' | 'taken_over'
  readonly key_figures: string
}

const asc = (column: string): OrderColumn => ({ column, order: 'asc' })
const desc = (column: string): OrderColumn => ({ column, order: 'desc' })

/**
 * Each order falls on an index (docs/performance.md names them); the other way round it is the same index read from its
 * end. Districts stand in the order in which the registry keeps them.
 */
const ORDERS: Readonly<Record<RecordSortField, readonly OrderColumn[]>> = {
  net: reversed([desc('r.net16'), asc('r.taken_first_on'), asc('r.id')]),
  gross: reversed([desc('r.gross16'), asc('r.id')]),
  takenOn: [asc('r.taken_first_on'), asc('r.id')],
  acceptedOn: reversed([desc('r.accepted_on'), asc('r.id')]),
  hunter: [asc('r.hunter_sort'), asc('r.id')],
  district: [asc('r.district_id'), desc('r.net16'), asc('r.taken_first_on'), asc('r.id')],
}

export function orderOf(sort: RecordSort): readonly OrderColumn[] {
  return sort.startsWith('-') ? reversed(ORDERS[sort.slice(1) as RecordSortField]) : ORDERS[sort as RecordSortField]
}

/** A row's place in an order, as a cursor keeps it. */
export function placeOf(row: ListRow, order: readonly OrderColumn[]): KeyValue[] {
  return order.map(({ column }) => row[column.slice(2) as keyof ListRow] as KeyValue)
}

/** Records that stand in the lists, with the filters. A search without a letter or digit finds nothing. */
export function listed(db: Knex, { classIds, districtId, districts, filters }: ListScope): Knex.QueryBuilder {
  const query = db('records as r').whereIn('r.status', ['accepted', 'challenged'])
  if (classIds?.length === 1) query.where('r.class_id', classIds[0]!)
  else if (classIds) query.whereIn('r.class_id', [...classIds])
  if (districtId !== null) query.where('r.district_id', districtId)
  if (filters.method) query.where('r.method', filters.method)
  if (filters.sex) query.where('r.sex', filters.sex)
  if (filters.minNet !== undefined) query.where('r.net16', '>=', Math.ceil(filters.minNet * 16))
  if (filters.from !== undefined || filters.to !== undefined) {
    query.whereNot('r.taken_precision', 'unknown')
    if (filters.from !== undefined) query.where('r.taken_first_on', '>=', `${filters.from}-01-01`)
    if (filters.to !== undefined) query.where('r.taken_first_on', '<=', `${filters.to}-12-31`)
  }
  if (filters.q !== undefined) {
    const words = foldedWords(filters.q)
    if (words.length === 0) query.whereRaw('1 = 0')
    for (const word of words.slice(0, 8)) {
      const named = districts.filter(district => district.words.some(one => one.startsWith(word))).map(district => district.id)
      query.where((found) => {
        found.whereExists(token => token.from('record_tokens as t').select(db.raw('1')).whereRaw('t.record_id = r.id').where('t.token', searchTokens(word)[0]!))
        if (named.length > 0) found.orWhereIn('r.district_id', named)
      })
    }
  }
  return query
}

const COLUMNS = [
  'r.id', 'r.record_no', 'r.former_no', 'r.class_id', 'c.code as category', 'c.definition', 'c.step', 's.code as species', 'r.district_id',
  'd.name as district', 'r.method', 'r.origin', 'r.original_origin', 'r.sex', 'r.net16', 'r.gross16', 'r.taken_first_on', 'r.taken_precision',
  'r.taken_public', 'r.hunter_shown', 'r.hunter_sort', 'r.accepted_on', 'r.status', 'r.source', 'r.key_figures',
] as const

/** One page, one row more than asked for when there are more that way; always in list order. */
export async function listPage(db: Knex, scope: ListScope, sort: RecordSort, limit: number, place: { readonly values: readonly KeyValue[], readonly way: 'next' | 'prev' } | null): Promise<ListRow[]> {
  const order = place?.way === 'prev' ? reversed(orderOf(sort)) : orderOf(sort)
  const ids = listed(db, scope).select('r.id').orderBy([...order]).limit(limit + 1)
  if (place) beyond(ids, order, place.values)
  // The page is found in the index alone; only its rows are read whole.
  const rows: ListRow[] = await withNames(db.from(ids.as('page')).join('records as r', 'r.id', 'page.id')).orderBy([...order])
  return place?.way === 'prev' ? rows.reverse() : rows
}

function withNames(query: Knex.QueryBuilder): Knex.QueryBuilder {
  return query.join('classes as c', 'c.id', 'r.class_id').join('species as s', 's.id', 'r.species_id').join('districts as d', 'd.id', 'r.district_id').select(...COLUMNS)
}

/** One record that stands in the lists. */
export async function listedByNo(db: Knex, recordNo: number): Promise<ListRow & { readonly sheet_id: number | null, readonly entry_id: number } | undefined> {
  return withNames(db('records as r')).select('r.sheet_id', 'r.entry_id').where('r.record_no', recordNo).whereIn('r.status', ['accepted', 'challenged']).first()
}

/** The `count` records on one side of a place in a class's list by net. */
export function besideInClass(db: Knex, row: ListRow, side: 'above' | 'below', count: number): Promise<ListRow[]> {
  const scope: ListScope = { classIds: [row.class_id], districtId: null, districts: [], filters: {} as RecordFilters }
  return listPage(db, scope, '-net', count - 1, { values: placeOf(row, orderOf('-net')), way: side === 'above' ? 'prev' : 'next' })
}
