import type { Json } from '#shared/domain/canonical'
import type { Day } from '#shared/domain/dates'
import { addressKey, nameKey } from '#shared/domain/fold'
import { recordTokens } from '#shared/domain/lists'
import { checkMeasurements, type Measurements, score, type Score, type SheetDefinition, STEPS_PER_INCH } from '#shared/domain/measuring/index'
import { sqlTime } from '../../db/time'
import { recordRow } from '../../server/services/records/recordRow'
import { sheetHash } from '../../server/services/sheets/sheetHash'
import type { Head } from './heads'
import type { Cast } from './persons'
import type { PlannedRecord } from './plan'
import { type Random, uidAt } from './random'
import type { Row, Rows } from './rows'
import { ON_THE_LINE } from './society'
import type { SocietyIds } from './society-data'

/** What the lists use of a head, in sixteenths of an inch, and the sheet where there is one. */
export interface Figures {
  readonly net16: number
  readonly gross16: number
  readonly sheet: { readonly definition: SheetDefinition, readonly measurements: Measurements } | null
}

/** A sheet with its score in the steps of its definition, and its figures in sixteenths of an inch. */
export interface ScoredSheet extends Figures {
  readonly sheet: { readonly definition: SheetDefinition, readonly measurements: Measurements }
  readonly score: Score
}

export function scoredSheet(definition: SheetDefinition, head: Head): ScoredSheet {
  const measurements = checkMeasurements(definition, head)
  const result = score(definition, measurements)
  const in16 = 16 / STEPS_PER_INCH[definition.step]
  return { sheet: { definition, measurements }, score: result, net16: result.net * in16, gross16: result.grossAll * in16 }
}

/** One planned record with its numbers and its people. */
export interface Subject {
  readonly plan: PlannedRecord
  readonly animalId: number
  readonly entryId: number
  readonly entryUid: string
  readonly recordId: number
  readonly recordNo: number
  readonly cast: Cast
  /** whether the month of taking may be public */
  readonly monthPublic: boolean
  readonly random: Random
}

export interface Place {
  readonly rows: Rows
  readonly ids: SocietyIds
  readonly workflowVersion: number
}

/** Whether the animal comes from a district that a class line cuts. */
export const isOnTheLine = (plan: Pick<PlannedRecord, 'category' | 'district'>) =>
  plan.category.startsWith(ON_THE_LINE.species) && ON_THE_LINE.districts.includes(plan.district)

/** The animal and its entry, as a draft: what makes it more needs a sheet, and a sheet needs the entry. */
export function addEntry(subject: Subject, place: Place, begunAt: Date, rest: Row<'entries'> = {}): void {
  const { plan, cast, random } = subject
  const { rows, ids } = place
  const at = sqlTime(begunAt)
  const category = ids.category.get(plan.category)!
  rows.add('animals', { id: subject.animalId, uid: uidAt(begunAt, random), species_id: category.speciesId, created_at: at })
  rows.add('entries', {
    id: subject.entryId,
    uid: subject.entryUid,
    animal_id: subject.animalId,
    class_id: category.id,
    origin: plan.origin,
    original_origin: plan.originalOrigin,
    source: plan.way === 'certified' ? 'certified' : 'taken_over',
    workflow_version_id: place.workflowVersion,
    state: 'draft',
    state_since: at,
    owner_user_id: cast.owner?.userId ?? null,
    begun_by_user_id: cast.owner?.userId ?? null,
    measurer_user_id: null,
    reviewer_user_id: null,
    district_id: ids.district[plan.district],
    district_side: isOnTheLine(plan) ? ON_THE_LINE.side : null,
    taken_first_on: plan.taken.first,
    taken_last_on: plan.taken.last,
    taken_precision: plan.taken.precision,
    method: plan.bare ? null : plan.method,
    sex: plan.bare ? null : plan.sex,
    guided: plan.bare ? null : plan.origin === 'hunted' ? (cast.people.some(person => person.part === 'guide') ? 1 : 0) : null,
    hunter_printed_as: cast.printedAs,
    month_public: subject.monthPublic ? 1 : 0,
    dried_since: null,
    dried_from: null,
    term_id: null,
    fee_version: null,
    submitted_at: null,
    begun_at: at,
    created_at: at,
    ...rest,
  })
}

export function addPeople({ cast, entryId, random }: Subject, { rows }: Place, at: Date): void {
  for (const person of cast.people) {
    rows.add('entry_people', {
      uid: uidAt(at, random),
      entry_id: entryId,
      part: person.part,
      user_id: person.userId,
      name: person.name,
      name_key: nameKey(person.name),
      address: person.address,
      address_key: addressKey(person.address),
      email: person.email,
      born_on: person.bornOn,
      died_on: person.diedOn,
      is_minor: person.minor ? 1 : 0,
      created_at: sqlTime(at),
    })
  }
}

/** The record and the tokens under which it is found. */
export function addRecord(subject: Subject, place: Place, standing: Figures, acceptedAt: Date, sheetId: number | null, formerNo: string | null): void {
  const { plan, cast } = subject
  const category = place.ids.category.get(plan.category)!
  const row = recordRow({
    entry_id: subject.entryId,
    animal_id: subject.animalId,
    class_id: category.id,
    species_id: category.speciesId,
    district_id: place.ids.district[plan.district],
    method: plan.method,
    origin: plan.origin,
    original_origin: plan.originalOrigin,
    sex: plan.sex,
    net16: standing.net16,
    gross16: standing.gross16,
    taken_first_on: plan.taken.first,
    taken_last_on: plan.taken.last,
    taken_precision: plan.taken.precision,
    source: plan.way === 'certified' ? 'certified' : 'taken_over',
    recordNo: subject.recordNo,
    formerNo,
    monthPublic: subject.monthPublic,
    printedName: cast.printedName,
    printedAs: cast.printedAs,
    acceptedOn: plan.acceptedOn,
    acceptedAt,
    sheet: sheetId === null || !standing.sheet ? null : { id: sheetId, ...standing.sheet },
  })
  place.rows.add('records', { id: subject.recordId, ...row } as Row<'records'>)
  for (const token of recordTokens({ recordNo: subject.recordNo, formerNo, hunterShown: row.hunter_shown! as string })) {
    place.rows.add('record_tokens', { token, class_id: category.id, net16: standing.net16, record_id: subject.recordId })
  }
}

/** What a measurer says beside the readings: the skull plate is whole, and there was no slip to explain. */
export const SLIP_ANSWERS = { wholeSkull: true, reasons: {} } as const

/** A signed sheet of an entry. */
export function addSheet(subject: Subject, { rows }: Place, sheet: ScoredSheet, signed: {
  readonly id: number
  readonly kind: 'entry' | 'panel_a' | 'panel_b' | 'panel_joint'
  readonly measuredOn: Day
  readonly driedSince: Day | null
  readonly signedAt: Date
  readonly measurer: { readonly userId: number, readonly uid: string } | { readonly name: string }
}): void {
  const { definition, measurements } = sheet.sheet
  const { measurer } = signed
  rows.add('sheets', {
    id: signed.id,
    uid: uidAt(signed.signedAt, subject.random),
    entry_id: subject.entryId,
    kind: signed.kind,
    number: 1,
    definition: definition.id,
    measurements: JSON.stringify(measurements),
    gross: sheet.score.gross,
    gross_all: sheet.score.grossAll,
    net: sheet.score.net,
    net16: sheet.net16,
    gross16: sheet.gross16,
    measured_on: signed.measuredOn,
    measurer_user_id: 'userId' in measurer ? measurer.userId : null,
    measurer_name: 'name' in measurer ? measurer.name : null,
    dried_since: signed.driedSince,
    state: 'signed',
    signed_at: sqlTime(signed.signedAt),
    hash: sheetHash({
      entry: subject.entryUid,
      kind: signed.kind,
      number: 1,
      definition: definition.id,
      measurements: measurements as unknown as Json,
      measuredOn: signed.measuredOn,
      driedSince: signed.driedSince,
      measurer: 'userId' in measurer ? measurer.uid : measurer.name,
      signedAt: signed.signedAt.toISOString(),
      slipAnswers: SLIP_ANSWERS,
    }),
    slip_answers: JSON.stringify(SLIP_ANSWERS),
    created_at: sqlTime(signed.signedAt),
  })
}
