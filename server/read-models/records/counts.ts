import type { Knex } from 'knex'
import { EVERY_DISTRICT, EVERY_METHOD } from '../../../shared/domain/lists'
import { standingsOf, type NetCount, type Standings } from '../../../shared/domain/ranking'
import { keptWithLists } from './kept'
import { indexFor, listed, type ListScope } from './list'

/** Counting by reading rows stops here; behind it a list says "at least". */
export const COUNTED_UP_TO = 10_000

/** One of the lists of a class; district 0 is the region, an empty method all methods. */
export interface ListKey {
  readonly classId: number
  readonly districtId: number
  readonly method: string
}

/** Where every net of a list stands. */
export function readStandings(db: Knex, version: number, { classId, districtId, method }: ListKey): Promise<Standings> {
  return keptWithLists(db, version, `standings ${classId} ${districtId} ${method}`, async () => {
    const counts: NetCount[] = await db('list_counts').where({ class_id: classId, district_id: districtId, method }).select('net16', 'n')
    return standingsOf(counts)
  })
}

/** How many records of a class were taken in a district by a method (empty: by none), and between which years. */
export interface FacetCell {
  readonly classId: number
  readonly districtId: number
  readonly method: string
  readonly n: number
  readonly first: number | null
  readonly last: number | null
}

export interface Years {
  readonly from?: number
  readonly to?: number
}

/** The kept counts of the whole registry, within years where they are given. */
export function readFacets(db: Knex, version: number, { from, to }: Years): Promise<FacetCell[]> {
  return keptWithLists(db, version, `facets ${from ?? ''} ${to ?? ''}`, async () => {
    const query: Knex.QueryBuilder = db.from('facet_counts').groupBy('class_id', 'district_id', 'method')
      .select('class_id', 'district_id', 'method', db.raw('SUM(n) AS n'), db.raw('MIN(NULLIF(year, 0)) AS first'), db.raw('MAX(NULLIF(year, 0)) AS last'))
    if (from !== undefined || to !== undefined) query.where('year', '>=', Math.max(1, from ?? 1))
    if (to !== undefined) query.where('year', '<=', to)
    const rows: { class_id: number, district_id: number, method: string, n: number | string, first: number | null, last: number | null }[] = await query
    return rows.map(row => ({ classId: row.class_id, districtId: row.district_id, method: row.method, n: Number(row.n), first: row.first, last: row.last }))
  })
}

export interface Best {
  readonly net16: number
  readonly recordNo: number
}

/** The first record of the list of each class that has one. */
export function readBest(db: Knex, version: number): Promise<ReadonlyMap<number, Best>> {
  return keptWithLists(db, version, 'best', async () => {
    const classes: { class_id: number }[] = await db('facet_counts').distinct('class_id')
    const firsts = await Promise.all(classes.map(async ({ class_id: classId }) => {
      const row = await db('records').where('class_id', classId).whereIn('status', ['accepted', 'challenged'])
        .orderBy([{ column: 'net16', order: 'desc' }, { column: 'taken_first_on' }, { column: 'id' }]).first('record_no', 'net16')
      return row && [classId, { net16: row.net16, recordNo: row.record_no }] as const
    }))
    return new Map(firsts.filter(pair => pair !== undefined))
  })
}

export interface Counted {
  readonly total: number | null
  readonly totalAtLeast: number
}

const exactly = (total: number): Counted => ({ total, totalAtLeast: total })

/**
 * How many records a list holds. The kept counts answer for class, district, method and years, or for a class, district,
 * method and least net; anything else is counted by reading, up to a bound.
 */
export async function totalOf(db: Knex, version: number, scope: ListScope, speciesOf: (classId: number) => number | undefined): Promise<Counted> {
  const { filters, classId, speciesId, districtId } = scope
  const { method = EVERY_METHOD, minNet, from, to } = filters
  if ((filters.sex ?? filters.q) === undefined) {
    if (minNet === undefined) {
      const cells = await readFacets(db, version, { from, to })
      return exactly(cells.reduce((sum, cell) => sum + ((classId === null || cell.classId === classId) && (speciesId === null || speciesOf(cell.classId) === speciesId)
        && (districtId === null || cell.districtId === districtId) && (method === EVERY_METHOD || cell.method === method)
        ? cell.n
        : 0), 0))
    }
    if (classId !== null && from === undefined && to === undefined) {
      const standings = await readStandings(db, version, { classId, districtId: districtId ?? EVERY_DISTRICT, method })
      return exactly(standings.atLeast(Math.ceil(minNet * 16)))
    }
  }
  const some = listed(db, scope, indexFor(scope, '-net')).select(db.raw('1 AS one')).limit(COUNTED_UP_TO + 1)
  const row = await db.from(some.as('some')).count({ n: '*' }).first() as { n: number } | undefined
  const counted = Number(row?.n ?? 0)
  return counted > COUNTED_UP_TO ? { total: null, totalAtLeast: COUNTED_UP_TO } : exactly(counted)
}
