import { isCategory, currentDefinition } from '../../../shared/domain/measuring/index'
import { METHODS } from '../../../shared/domain/workflow/origins'
import type { FacetsAnswer, RecordFilters } from '../../../shared/schemas/records'
import type { Registry } from '../../composition'
import { writeLength } from '../../presenters/records'
import { classCounts, districtCounts, methodCounts, yearSpan } from '../../read-models/records/counts'
import { bestOfClasses } from '../../read-models/records/best'
import { scopeOf } from './scope'

/** How many records stand under each choice of class, district and method, and the years they span. */
export async function listFacets(registry: Registry, filters: RecordFilters): Promise<FacetsAnswer> {
  const { db } = registry
  const scope = await scopeOf(registry, filters)
  const facet = { classIds: scope.classIds, districtId: scope.districtId, method: filters.method }
  const [classes, districts, methods, years, best] = await Promise.all([
    classCounts(db), districtCounts(db, facet), methodCounts(db, facet), yearSpan(db, facet), bestOfClasses(db),
  ])
  return {
    categories: classes.map(one => ({
      category: one.category, species: one.species, count: one.n,
      best: one.best16 === null || !isCategory(one.category) ? null : writeLength(one.best16, currentDefinition(one.category).step),
      bestRecordNo: best.get(one.id) ?? null,
    })),
    districts,
    methods: METHODS.map(method => ({ method, count: methods.get(method) ?? 0 })),
    years,
  }
}
