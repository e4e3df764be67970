import type { Knex } from 'knex'
import type { NetCount } from '../../../shared/domain/ranking'
import { listed, type ListScope } from './list'

/** Counting by reading rows stops here; behind it a list says "at least". */
export const COUNTED_UP_TO = 10_000

/** The counts by net that one list is kept as; district 0 is the region, an empty method all methods. */
export async function netCounts(db: Knex, classId: number, districtId: number, method: string, from16: number): Promise<NetCount[]> {
  const rows: { net16: number, n: number }[] = await db('list_counts').where({ class_id: classId, district_id: districtId, method }).where('net16', '>=', from16).select('net16', 'n')
  return rows.map(row => ({ net16: Number(row.net16), n: Number(row.n) }))
}

/** The kept counts answer for class, district, method and year; anything else is counted by reading, up to a bound. */
export async function totalOf(db: Knex, scope: ListScope): Promise<{ total: number | null, totalAtLeast: number }> {
  const { filters } = scope
  if (filters.sex === undefined && filters.minNet === undefined && filters.q === undefined) {
    const query = db('facet_counts')
    if (scope.classIds) query.whereIn('class_id', [...scope.classIds])
    if (scope.districtId !== null) query.where('district_id', scope.districtId)
    if (filters.method) query.where('method', filters.method)
    if (filters.from !== undefined || filters.to !== undefined) query.where('year', '>=', Math.max(1, filters.from ?? 1))
    if (filters.to !== undefined) query.where('year', '<=', filters.to)
    const row = await query.sum({ n: 'n' }).first()
    const total = Number(row?.n ?? 0)
    return { total, totalAtLeast: total }
  }
  const row = await db.from(listed(db, scope).select(db.raw('1 as one')).limit(COUNTED_UP_TO + 1).as('some')).count({ n: '*' }).first()
  const counted = Number((row as { n: number } | undefined)?.n ?? 0)
  return counted > COUNTED_UP_TO ? { total: null, totalAtLeast: COUNTED_UP_TO } : { total: counted, totalAtLeast: counted }
}

/** Number of records by class, with the best net of each. */
export async function classCounts(db: Knex) {
  const rows = await db('classes as c').join('species as s', 's.id', 'c.species_id')
    .leftJoin('list_counts as l', join => join.on('l.class_id', 'c.id').andOnVal('l.district_id', 0).andOnVal('l.method', ''))
    .groupBy('c.id', 'c.code', 'c.step', 'c.sort', 'c.offered', 's.code')
    .havingRaw('c.offered = 1 OR SUM(l.n) > 0').orderBy([{ column: 'c.sort' }, { column: 'c.id' }])
    .select('c.id', 'c.code', 'c.step', 's.code as species', db.raw('COALESCE(SUM(l.n), 0) as n'), db.raw('MAX(l.net16) as best16'))
  return rows.map((row: Record<string, unknown>) => ({
    id: Number(row.id), category: String(row.code), step: String(row.step), species: String(row.species), n: Number(row.n),
    best16: row.best16 === null ? null : Number(row.best16),
  }))
}

interface FacetScope { readonly classIds: readonly number[] | null, readonly districtId: number | null, readonly method: string | undefined }

function facets(db: Knex, scope: Partial<FacetScope>): Knex.QueryBuilder {
  const query = db('facet_counts as f')
  if (scope.classIds) query.whereIn('f.class_id', [...scope.classIds])
  if (scope.districtId) query.where('f.district_id', scope.districtId)
  if (scope.method) query.where('f.method', scope.method)
  return query
}

/** Records by district under the other filters; districts without one are in it with 0. */
export async function districtCounts(db: Knex, scope: FacetScope) {
  const counted = facets(db, { ...scope, districtId: null }).groupBy('f.district_id').select('f.district_id').sum({ n: 'f.n' })
  const rows = await db('districts as d').leftJoin(counted.as('k'), 'k.district_id', 'd.id').orderBy([{ column: 'd.sort' }, { column: 'd.id' }]).select('d.code', 'd.name', 'k.n')
  return rows.map((row: { code: string, name: string, n: number | null }) => ({ code: row.code, name: row.name, count: Number(row.n ?? 0) }))
}

/** Records by method under the other filters; those without a method are left out. */
export async function methodCounts(db: Knex, scope: FacetScope) {
  const rows = await facets(db, { ...scope, method: undefined }).whereNot('f.method', '').groupBy('f.method').select('f.method').sum({ n: 'f.n' })
  return new Map<string, number>(rows.map((row: { method: string, n: number }) => [row.method, Number(row.n)]))
}

/** First and last year that the records under the filters were taken in. */
export async function yearSpan(db: Knex, scope: FacetScope): Promise<{ first: number | null, last: number | null }> {
  const row = await facets(db, scope).where('f.year', '>', 0).min({ first: 'f.year' }).max({ last: 'f.year' }).first() as { first: number | null, last: number | null } | undefined
  return { first: row?.first ?? null, last: row?.last ?? null }
}
