import { foldedWords } from '../../../shared/domain/fold'
import { DomainError, type FieldError } from '../../../shared/errors'
import type { RecordFilters } from '../../../shared/schemas/records'
import type { Registry } from '../../composition'
import type { ListScope } from '../../read-models/records/list'
import { classCodes, districtNames } from '../../read-models/records/names'

/**
 * Looks the codes of the filters up.
 *
 * @throws DomainError `invalid_input` with the field whose code nobody knows
 */
export async function scopeOf(registry: Registry, filters: RecordFilters): Promise<ListScope> {
  const [classes, districts] = await Promise.all([classCodes(registry.db), districtNames(registry.db)])
  const fields: FieldError[] = []
  const unknown = (path: string) => fields.push({ path, code: 'unknown_code' })
  const district = districts.find(one => one.code === filters.district)
  if (filters.district && !district) unknown('district')
  if (filters.category && !classes.some(one => one.code === filters.category)) unknown('category')
  if (filters.species && !classes.some(one => one.species === filters.species)) unknown('species')
  if (filters.from !== undefined && filters.to !== undefined && filters.from > filters.to) fields.push({ path: 'to', code: 'before_start' })
  if (fields.length > 0) throw new DomainError('invalid_input', { fields })
  const chosen = classes.filter(one => (!filters.category || one.code === filters.category) && (!filters.species || one.species === filters.species))
  return {
    classIds: filters.category || filters.species ? chosen.map(one => one.id) : null,
    districtId: district?.id ?? null,
    districts: districts.map(one => ({ id: one.id, words: foldedWords(one.name) })),
    filters,
  }
}
