import { METHODS } from '../../../shared/domain/workflow/origins'
import type { FacetsAnswer, RecordFilters } from '../../../shared/schemas/records'
import type { Registry } from '../../composition'
import { writeLength } from '../../presenters/records'
import { classesInForce } from '../../read-models/classStandings'
import { readBest, readFacets, type FacetCell } from '../../read-models/records/counts'
import { dayIn } from '../../clock'
import { scopeOf } from './scope'

type Dimension = 'class' | 'district' | 'method'

/**
 * How many records stand under each choice of class, district and method, each under the other filters, and the years
 * that the chosen records span. Sex, least net and search are not counted.
 */
export async function listFacets(registry: Registry, filters: RecordFilters, version: number): Promise<FacetsAnswer> {
  const { db } = registry
  const { timeZone, societyName, regionName } = await registry.settings()
  const [{ scope, names }, cells, best, inForce] = await Promise.all([
    scopeOf(registry, filters), readFacets(db, version, filters), readBest(db, version), classesInForce(db, dayIn(timeZone, registry.clock.now())),
  ])
  const offered = new Set(inForce.filter(one => one.offered).map(one => one.id))
  const speciesOf = (classId: number) => names.classes.get(classId)?.speciesId
  const fits = (cell: FacetCell, but?: Dimension) =>
    (but === 'class' || ((scope.classId === null || cell.classId === scope.classId) && (scope.speciesId === null || speciesOf(cell.classId) === scope.speciesId)))
    && (but === 'district' || scope.districtId === null || cell.districtId === scope.districtId)
    && (but === 'method' || !filters.method || cell.method === filters.method)

  const [byClass, byDistrict, byMethod] = [new Map<number, number>(), new Map<number, number>(), new Map<string, number>()]
  const add = <K>(counts: Map<K, number>, key: K, n: number) => counts.set(key, (counts.get(key) ?? 0) + n)
  let [first, last]: [number | null, number | null] = [null, null]
  for (const cell of cells) {
    if (fits(cell, 'class')) add(byClass, cell.classId, cell.n)
    if (fits(cell, 'district')) add(byDistrict, cell.districtId, cell.n)
    if (fits(cell, 'method')) add(byMethod, cell.method, cell.n)
    if (!fits(cell)) continue
    if (cell.first !== null && (first === null || cell.first < first)) first = cell.first
    if (cell.last !== null && (last === null || cell.last > last)) last = cell.last
  }
  return {
    society: { name: societyName, region: regionName },
    categories: [...names.classes.values()].filter(one => offered.has(one.id) || best.has(one.id)).map((one) => {
      const top = best.get(one.id)
      return {
        category: one.code, species: one.species, count: byClass.get(one.id) ?? 0,
        best: top ? writeLength(top.net16, one.step) : null, bestRecordNo: top?.recordNo ?? null,
      }
    }),
    districts: [...names.districts.values()].map(({ id, code, name }) => ({ code, name, count: byDistrict.get(id) ?? 0 })),
    methods: METHODS.map(method => ({ method, count: byMethod.get(method) ?? 0 })),
    years: { first, last },
  }
}
