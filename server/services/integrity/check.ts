import type { Knex } from 'knex'
import { recordTokens } from '../../../shared/domain/lists'
import { checkMeasurements, compile, definitionById, type Program, scoreSteps, STEPS_PER_INCH, TOTALS, toSteps } from '../../../shared/domain/measuring/index'
import type { Json } from '../../../shared/domain/canonical'
import { isoTime } from '../../../db/time'
import {
  allEntries, allFiles, allRecords, type CheckedEvent, type CheckedRecord, type CheckedSheet, type CheckedToken, eventsBetween, eventTextsBetween,
  listedWithoutRecord, paidWithoutCharge, recordNumbers, scoredSheets, tokensBetween, wrongFacetCounts, wrongListCounts, wrongRecords,
} from '../../read-models/integrity'
import { chainFaults, type StoredEvent } from '../events/hash'
import { sheetHash } from '../sheets/sheetHash'

/** What can be wrong with a registry's data. */
export const FINDINGS = [
  'sheet_unreadable', 'sheet_score', 'sheet_hash', 'record_figures', 'entry_without_record', 'record_number', 'list_count', 'facet_count', 'record_tokens',
  'event_chain', 'event_state', 'paid_without_charge', 'file_missing', 'file_size',
] as const
export type FindingCode = (typeof FINDINGS)[number]

export interface Finding {
  readonly code: FindingCode
  /** id of the row, or the cell of the counts */
  readonly where: string
  /** what is kept against what should be */
  readonly detail: string
}

/** Tells the size of a stored file in bytes, or null where there is none. */
export type FileSize = (storageKey: string) => Promise<number | null>

/**
 * Goes through the whole registry and tells everything that does not agree: every stored net against the score of its
 * sheet by its definition, lists against counts and tokens, events against their hashes, files against the storage.
 * Reads page by page, so that its memory does not grow with the registry, and one state of the database throughout.
 *
 * @param progress told what is being looked at
 */
export async function* checkRegistry(db: Knex, fileSize: FileSize | null, progress: (what: string) => void = () => {}): AsyncGenerator<Finding> {
  const trx = await db.transaction({ isolationLevel: 'repeatable read' })
  try {
    progress('sheets')
    yield* checkSheets(trx)
    progress('records')
    yield* checkRecords(trx)
    progress('counts')
    yield* checkCounts(trx)
    progress('tokens')
    yield* checkTokens(trx)
    progress('events')
    yield* checkEvents(trx)
    progress('money')
    for (const { uid } of await paidWithoutCharge(trx)) yield { code: 'paid_without_charge', where: uid, detail: '' }
    if (fileSize) {
      progress('files')
      yield* checkFiles(trx, fileSize)
    }
  }
  finally {
    await trx.rollback()
  }
}

const programs = new Map<string, Program>()

async function* checkSheets(db: Knex): AsyncGenerator<Finding> {
  const totals = new Int32Array(Object.keys(TOTALS).length)
  for await (const sheets of scoredSheets(db)) {
    for (const sheet of sheets) {
      const finding = checkSheet(sheet, totals) ?? checkSignature(sheet)
      if (finding) yield finding
    }
  }
}

function checkSheet(sheet: CheckedSheet, totals: Int32Array): Finding | undefined {
  const definition = definitionById(sheet.definition)
  if (!definition) return { code: 'sheet_unreadable', where: sheet.uid, detail: `no definition ${sheet.definition}` }
  let program = programs.get(definition.id)
  if (!program) programs.set(definition.id, program = compile(definition))
  try {
    scoreSteps(program, toSteps(program, checkMeasurements(definition, JSON.parse(sheet.measurements))), totals)
  }
  catch (error) {
    return { code: 'sheet_unreadable', where: sheet.uid, detail: (error as Error).message }
  }
  const in16 = 16 / STEPS_PER_INCH[definition.step]
  const [gross, grossAll, net] = [totals[TOTALS.gross]!, totals[TOTALS.grossAll]!, totals[TOTALS.net]!]
  const scored = [gross, grossAll, net, net * in16, grossAll * in16].join(' ')
  const kept = [sheet.gross, sheet.gross_all, sheet.net, sheet.net16, sheet.gross16].join(' ')
  return kept === scored ? undefined : { code: 'sheet_score', where: sheet.uid, detail: `kept ${kept}, scored ${scored}` }
}

/** A signed sheet says what it said when it was signed. */
function checkSignature(sheet: CheckedSheet): Finding | undefined {
  if (sheet.state === 'open') return undefined
  const hash = sheetHash({
    entry: sheet.entry_uid!, kind: sheet.kind, number: sheet.number, definition: sheet.definition, measurements: JSON.parse(sheet.measurements) as Json,
    measuredOn: sheet.measured_on!, driedSince: sheet.dried_since, measurer: sheet.measurer_uid ?? sheet.measurer_name!,
    signedAt: isoTime(sheet.signed_at!), slipAnswers: JSON.parse(sheet.slip_answers) as Json,
  })
  return hash === sheet.hash ? undefined : { code: 'sheet_hash', where: sheet.uid, detail: 'is not what was signed' }
}

async function* checkRecords(db: Knex): AsyncGenerator<Finding> {
  for (const { record_no, what } of await wrongRecords(db)) yield { code: 'record_figures', where: String(record_no), detail: `differs from its ${what}` }
  for (const { uid, state } of await listedWithoutRecord(db)) yield { code: 'entry_without_record', where: uid, detail: state }
  const { counter, highest } = await recordNumbers(db)
  if (counter < highest) yield { code: 'record_number', where: String(highest), detail: `the counter stands at ${counter}` }
}

async function* checkCounts(db: Knex): AsyncGenerator<Finding> {
  for (const { place, kept, counted } of await wrongListCounts(db)) yield { code: 'list_count', where: place, detail: `kept ${kept}, counted ${counted}` }
  for (const { place, kept, counted } of await wrongFacetCounts(db)) yield { code: 'facet_count', where: place, detail: `kept ${kept}, counted ${counted}` }
}

async function* checkTokens(db: Knex): AsyncGenerator<Finding> {
  for await (const records of allRecords(db)) {
    const kept = groupBy(await tokensBetween(db, records[0]!.id, records.at(-1)!.id), token => token.record_id)
    for (const record of records) {
      const detail = tokenFault(record, kept.get(record.id) ?? [])
      if (detail) yield { code: 'record_tokens', where: String(record.record_no), detail }
    }
  }
}

function groupBy<Row>(rows: readonly Row[], key: (row: Row) => number): Map<number, Row[]> {
  const groups = new Map<number, Row[]>()
  for (const row of rows) {
    const group = groups.get(key(row))
    if (group) group.push(row)
    else groups.set(key(row), [row])
  }
  return groups
}

function tokenFault(record: CheckedRecord, kept: readonly CheckedToken[]): string | undefined {
  const listed = record.status === 'accepted' || record.status === 'challenged'
  const wanted = new Set(listed ? recordTokens({ recordNo: record.record_no, formerNo: record.former_no, hunterShown: record.hunter_shown }) : [])
  const foreign = kept.find(one => !wanted.has(one.token))
  if (foreign) return `"${foreign.token}" does not belong to it`
  if (kept.length < wanted.size) return `${wanted.size - kept.length} are missing`
  return kept.some(one => one.class_id !== record.class_id || one.net16 !== record.net16) ? 'class or net are not the record\'s' : undefined
}

async function* checkEvents(db: Knex): AsyncGenerator<Finding> {
  for await (const entries of allEntries(db)) {
    const [first, last] = [entries[0]!.id, entries.at(-1)!.id]
    const texts = groupBy(await eventTextsBetween(db, first, last), text => text.event_id)
    const events = groupBy(await eventsBetween(db, first, last), event => event.entry_id)
    for (const entry of entries) {
      const own = events.get(entry.id) ?? []
      const faults = chainFaults(own.map(event => storedEvent(entry.uid, event, texts.get(event.id) ?? [])))
      for (const { seq, fault } of faults) yield { code: 'event_chain', where: entry.uid, detail: `event ${seq}: ${fault}` }
      const state = own.findLast(event => event.to_state !== null)?.to_state
      if (state !== entry.state) yield { code: 'event_state', where: entry.uid, detail: `${entry.state}, by its events ${state ?? 'never begun'}` }
    }
  }
}

function storedEvent(entryUid: string, event: CheckedEvent, texts: StoredEvent['texts']): StoredEvent {
  return {
    entry: entryUid,
    seq: event.seq,
    at: isoTime(event.at),
    kind: event.kind,
    from: event.from_state,
    to: event.to_state,
    actor: event.actor_uid,
    args: JSON.parse(event.args) as { [name: string]: Json },
    commitments: JSON.parse(event.commitments) as { [field: string]: string },
    prev: event.prev_hash,
    hash: event.hash,
    texts,
  }
}

async function* checkFiles(db: Knex, fileSize: FileSize): AsyncGenerator<Finding> {
  for await (const files of allFiles(db)) {
    for (const file of files) {
      const size = await fileSize(file.storage_key)
      if (size === null) yield { code: 'file_missing', where: file.storage_key, detail: '' }
      else if (size !== file.size) yield { code: 'file_size', where: file.storage_key, detail: `kept ${file.size}, stored ${size}` }
    }
  }
}
