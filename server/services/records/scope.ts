import { DomainError, type FieldError } from '../../../shared/errors'
import type { RecordFilters } from '../../../shared/schemas/records'
import type { Registry } from '../../composition'
import type { ListScope } from '../../read-models/records/list'
import { readNames, type Names } from '../../read-models/records/names'

/** A class that no record has: for filters that exclude each other. */
const NO_CLASS = 0

/**
 * Looks the codes of the filters up.
 *
 * @throws DomainError `invalid_input` with the field whose code nobody knows
 */
export async function scopeOf(registry: Registry, filters: RecordFilters): Promise<{ scope: ListScope, names: Names }> {
  const names = await readNames(registry.db)
  const [classes, districts] = [[...names.classes.values()], [...names.districts.values()]]
  const district = districts.find(one => one.code === filters.district)
  const category = classes.find(one => one.code === filters.category)
  const speciesId = classes.find(one => one.species === filters.species)?.speciesId
  const fields: FieldError[] = []
  const unknown = (path: string) => fields.push({ path, code: 'unknown_code' })
  if (filters.district && !district) unknown('district')
  if (filters.category && !category) unknown('category')
  if (filters.species && speciesId === undefined) unknown('species')
  if (filters.from !== undefined && filters.to !== undefined && filters.from > filters.to) fields.push({ path: 'to', code: 'before_start' })
  if (fields.length > 0) throw new DomainError('invalid_input', { fields })
  const classId = !category ? null : filters.species && category.speciesId !== speciesId ? NO_CLASS : category.id
  return {
    scope: { classId, speciesId: classId === null ? speciesId ?? null : null, districtId: district?.id ?? null, districts, filters },
    names,
  }
}
