import type { Knex } from 'knex'
import type { EntriesRow } from '../../../db/tables'
import { parseInexactDate } from '../../../shared/domain/dates'
import { DomainError, type FieldError } from '../../../shared/errors'
import type { EntryFactsInput } from '../../../shared/schemas/entries'
import { findClass, findDistrict, type ClassRecord } from '../../repositories/catalogue'
import type { EntryPatch } from '../../repositories/entries'
import type { Moment } from '../moment'

export interface FactRow {
  readonly patch: EntryPatch
  /** the class, where the facts name one */
  readonly category: ClassRecord | undefined
  /** names of the facts that are given */
  readonly given: readonly string[]
}

function datesOf(takenOn: string, today: string, fields: FieldError[]): EntryPatch {
  const date = parseInexactDate(takenOn)
  if (!date) {
    fields.push({ path: 'takenOn', code: 'date' })
    return {}
  }
  if (date.precision !== 'unknown' && date.first > today) fields.push({ path: 'takenOn', code: 'in_future' })
  return { taken_first_on: date.first, taken_last_on: date.last, taken_precision: date.precision }
}

/**
 * Facts of an animal as columns of its entry, their codes looked up.
 *
 * @throws DomainError `invalid_input` with every fact that cannot be taken
 */
export async function factRow(db: Knex, facts: EntryFactsInput, moment: Moment, before?: Pick<EntriesRow, 'facts' | 'origin'>): Promise<FactRow> {
  const fields: FieldError[] = []
  const category = facts.category === undefined ? undefined : await findClass(db, facts.category)
  if (facts.category !== undefined && !category) fields.push({ path: 'category', code: 'unknown_code' })
  const district = facts.district ? await findDistrict(db, facts.district) : undefined
  if (facts.district && !district) fields.push({ path: 'district', code: 'unknown_code' })
  if (facts.driedSince && facts.driedSince > moment.today) fields.push({ path: 'driedSince', code: 'in_future' })
  const origin = facts.origin ?? before?.origin
  const patch: EntryPatch = {
    ...facts.takenOn === undefined ? {} : datesOf(facts.takenOn, moment.today, fields),
    ...category ? { class_id: category.id } : {},
    ...facts.origin === undefined ? {} : { origin: facts.origin, ...facts.origin === 'inherited' ? {} : { original_origin: null } },
    ...facts.originalOrigin === undefined || origin !== 'inherited' ? {} : { original_origin: facts.originalOrigin },
    ...facts.district === undefined ? {} : { district_id: district?.id ?? null, ...facts.districtSide === undefined ? { district_side: null } : {} },
    ...facts.districtSide === undefined ? {} : { district_side: facts.districtSide || null },
    ...facts.method === undefined ? {} : { method: facts.method },
    ...facts.sex === undefined ? {} : { sex: facts.sex },
    ...facts.guided === undefined ? {} : { guided: facts.guided === null ? null : facts.guided ? 1 as const : 0 as const },
    ...facts.hunterPrintedAs === undefined ? {} : { hunter_printed_as: facts.hunterPrintedAs },
    ...facts.monthPublic === undefined ? {} : { month_public: facts.monthPublic ? 1 as const : 0 as const },
    ...facts.driedSince === undefined ? {} : { dried_since: facts.driedSince },
    ...facts.driedFrom === undefined ? {} : { dried_from: facts.driedFrom },
    ...facts.guardianChoseName === undefined ? {} : { facts: JSON.stringify({ ...JSON.parse(before?.facts ?? '{}') as object, guardianChoseName: facts.guardianChoseName }) },
  }
  if (fields.length > 0) throw new DomainError('invalid_input', { fields })
  return { patch, category, given: Object.keys(facts) }
}
