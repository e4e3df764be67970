import type { Knex } from 'knex'
import type { Json } from '../../../shared/domain/canonical'
import { formatInexactDate, parseInexactDate } from '../../../shared/domain/dates'
import { nameKey } from '../../../shared/domain/fold'
import { mayHaveMethod, METHODS, SEXES } from '../../../shared/domain/workflow/origins'
import { DomainError, type FieldError } from '../../../shared/errors'
import { findDistrict, findDistrictById } from '../../repositories/catalogue'
import type { EntryPatch } from '../../repositories/entries'
import { listPeople, updatePerson } from '../../repositories/entryPeople'
import { refreshRecord } from '../listing/publish'
import type { EntryContext } from './context'
import type { Amendment } from './moveInput'

export interface Amended {
  readonly patch: EntryPatch
  readonly args: Record<string, Json>
  readonly texts: Record<string, string>
}

const NAMES = { hunterName: 'hunter', finderName: 'finder', ownerName: 'owner', guideName: 'guide' } as const

const refuse = (path: string, code = 'invalid'): FieldError => ({ path: `changes.${path}`, code })

async function amendNames(trx: Knex.Transaction, context: EntryContext, changes: Amendment, amended: Amended, faults: FieldError[]): Promise<void> {
  for (const [field, part] of Object.entries(NAMES) as [keyof typeof NAMES, (typeof NAMES)[keyof typeof NAMES]][]) {
    const name = changes[field]?.trim()
    if (name === undefined) continue
    const person = context.people.find(one => one.part === part)
    if (!person || name === '') {
      faults.push(refuse(field, person ? 'required' : 'no_such_person'))
      continue
    }
    await updatePerson(trx, person.id, { name, name_key: nameKey(name) })
    amended.texts[`${field}Before`] = person.name
    amended.texts[`${field}After`] = name
  }
}

async function districtPatch(trx: Knex.Transaction, context: EntryContext, code: string, amended: Amended, faults: FieldError[]): Promise<void> {
  const district = await findDistrict(trx, code)
  if (!district) {
    faults.push(refuse('district', 'unknown'))
    return
  }
  const before = context.entry.district_id === null ? undefined : await findDistrictById(trx, context.entry.district_id)
  amended.patch.district_id = district.id
  note(amended, 'district', before?.code ?? null, district.code)
}

function note(amended: Amended, field: string, before: Json, after: Json): void {
  Object.assign(amended.args.before as object, { [field]: before })
  Object.assign(amended.args.after as object, { [field]: after })
}

function amendFacts({ entry }: EntryContext, changes: Amendment, amended: Amended, faults: FieldError[]): void {
  const { patch } = amended
  if (changes.takenOn !== undefined) {
    const taken = parseInexactDate(changes.takenOn)
    if (!taken) faults.push(refuse('takenOn', 'date'))
    else {
      Object.assign(patch, { taken_first_on: taken.first, taken_last_on: taken.last, taken_precision: taken.precision })
      // the day is nobody's but the office's: the event says that it changed, its words lie apart
      amended.texts.takenOnBefore = formatInexactDate({ first: entry.taken_first_on, last: entry.taken_last_on, precision: entry.taken_precision })
      amended.texts.takenOnAfter = changes.takenOn
    }
  }
  if (changes.hunterPrintedAs !== undefined) {
    patch.hunter_printed_as = changes.hunterPrintedAs
    note(amended, 'hunterPrintedAs', entry.hunter_printed_as, changes.hunterPrintedAs)
  }
  if (changes.monthPublic !== undefined) patch.month_public = changes.monthPublic ? 1 : 0
  if (changes.method !== undefined) {
    const method = METHODS.find(one => one === changes.method)
    if (!method || !mayHaveMethod(entry.origin, entry.original_origin)) faults.push(refuse('method'))
    else {
      patch.method = method
      note(amended, 'method', entry.method, method)
    }
  }
  if (changes.sex !== undefined) {
    const sex = SEXES.find(one => one === changes.sex)
    if (!sex) faults.push(refuse('sex'))
    else {
      patch.sex = sex
      note(amended, 'sex', entry.sex, sex)
    }
  }
}

/** Changes facts of an accepted record: names, dates, district, owner, never a score or a class. The lists follow at once. */
export async function amendEntry(trx: Knex.Transaction, context: EntryContext, changes: Amendment): Promise<Amended> {
  const amended: Amended = { patch: {}, args: { changed: Object.keys(changes).sort(), before: {}, after: {} }, texts: {} }
  const faults: FieldError[] = []
  amendFacts(context, changes, amended, faults)
  if (changes.district !== undefined) await districtPatch(trx, context, changes.district, amended, faults)
  await amendNames(trx, context, changes, amended, faults)
  if (faults.length > 0) throw new DomainError('invalid_input', { fields: faults })
  await refreshRecord(trx, { ...context, entry: { ...context.entry, ...amended.patch } as EntryContext['entry'], people: await listPeople(trx, context.entry.id) })
  return amended
}
