import type { Knex } from 'knex'
import type { EntriesRow, EntryPeopleRow, RecordsInsert, RecordsRow } from '../../../db/tables'
import { facetYear, listsOf, recordTokens, shownName, sortName, type PrintedAs } from '../../../shared/domain/lists'
import { addToFacetCounts, addToListCounts, deleteTokens, findRecordOfEntry, insertRecord, insertTokens, takeNumber, updateRecord } from '../../repositories/records'
import { findSheetById } from '../../repositories/sheets'
import type { EntryContext } from '../entries/context'
import type { Moment } from '../moment'
import { recordRow } from '../records/recordRow'
import { readSheet } from '../sheets/read'

type Listed = Pick<RecordsRow, 'class_id' | 'district_id' | 'method' | 'net16' | 'taken_first_on' | 'taken_precision' | 'record_no' | 'former_no' | 'hunter_shown'>

const listed = (record: RecordsInsert): Listed =>
  ({ ...record, method: record.method ?? null, former_no: record.former_no ?? null, hunter_shown: record.hunter_shown ?? '' })

/** Parts of whom one stands for the animal in the lists, the first that an entry has. */
const STANDS_FOR = ['hunter', 'finder', 'owner', 'club'] as const

/** The name that the lists print for an entry, and how: a minor stands as initials unless the guardian chose otherwise. */
export function printedName(entry: Pick<EntriesRow, 'hunter_printed_as' | 'facts'>, people: readonly Pick<EntryPeopleRow, 'part' | 'name' | 'is_minor'>[]): { name: string, printedAs: PrintedAs } {
  const person = STANDS_FOR.map(part => people.find(one => one.part === part)).find(one => one !== undefined)
  const { guardianChoseName } = JSON.parse(entry.facts) as { guardianChoseName?: boolean }
  const hidden = person?.is_minor === 1 && guardianChoseName !== true && entry.hunter_printed_as === 'full'
  return { name: person?.name ?? '', printedAs: hidden ? 'initials' : entry.hunter_printed_as }
}

async function count(trx: Knex.Transaction, record: Listed, by: 1 | -1): Promise<void> {
  const lists = listsOf({ classId: record.class_id, districtId: record.district_id, method: record.method })
  await addToListCounts(trx, lists.map(list => ({ class_id: list.classId, district_id: list.districtId, method: list.method, net16: record.net16 })), by)
  await addToFacetCounts(trx, {
    class_id: record.class_id, district_id: record.district_id, method: record.method ?? '',
    year: facetYear({ firstOn: record.taken_first_on, precision: record.taken_precision }),
  }, by)
}

async function makeFindable(trx: Knex.Transaction, record: Listed, recordId: number): Promise<void> {
  const tokens = recordTokens({ recordNo: record.record_no, formerNo: record.former_no, hunterShown: record.hunter_shown })
  await insertTokens(trx, tokens.map(token => ({ token, class_id: record.class_id, net16: record.net16, record_id: recordId })))
}

async function enter(trx: Knex.Transaction, record: Listed, recordId: number): Promise<void> {
  await makeFindable(trx, record, recordId)
  await count(trx, record, 1)
  await takeNumber(trx, 'lists_version')
}

/** Puts an accepted entry into the lists, in the accepting transaction. Returns its record number. */
export async function publishEntry(trx: Knex.Transaction, context: EntryContext, moment: Moment, formerNo: string | null = null): Promise<number> {
  const { entry, category, people } = context
  const standing = entry.standing_sheet_id === null ? null : readSheet((await findSheetById(trx, entry.standing_sheet_id))!)
  const { name, printedAs } = printedName(entry, people)
  const recordNo = await takeNumber(trx, 'record_no')
  const record = recordRow({
    entry_id: entry.id, animal_id: entry.animal_id, class_id: entry.class_id, species_id: category.species_id, district_id: entry.district_id!,
    method: entry.method, origin: entry.origin, original_origin: entry.original_origin, sex: entry.sex, net16: entry.net16!, gross16: entry.gross16!,
    taken_first_on: entry.taken_first_on, taken_last_on: entry.taken_last_on, taken_precision: entry.taken_precision, source: entry.source,
    recordNo, formerNo, monthPublic: entry.month_public === 1, printedName: name, printedAs, acceptedOn: moment.today, acceptedAt: moment.now,
    sheet: standing && { id: standing.row.id, definition: standing.definition, measurements: standing.measurements },
  })
  await enter(trx, listed(record), await insertRecord(trx, record))
  return recordNo
}

/** Marks a record as challenged, or takes the mark away. It keeps its place and rank. */
export async function markRecord(trx: Knex.Transaction, entryId: number, status: 'accepted' | 'challenged'): Promise<void> {
  const record = await findRecordOfEntry(trx, entryId)
  await updateRecord(trx, record!.id, { status })
  await takeNumber(trx, 'lists_version')
}

/** Takes a record out of the lists; ranks close up. Does nothing for an entry that does not stand in them. */
export async function unlistEntry(trx: Knex.Transaction, entryId: number, status: 'struck' | 'withdrawn'): Promise<void> {
  const record = await findRecordOfEntry(trx, entryId)
  if (!record || record.status === 'struck' || record.status === 'withdrawn') return
  await updateRecord(trx, record.id, { status })
  await deleteTokens(trx, record.id)
  await count(trx, record, -1)
  await takeNumber(trx, 'lists_version')
}

/** Puts a struck record back under its old number. */
export async function relistEntry(trx: Knex.Transaction, entryId: number): Promise<void> {
  const record = (await findRecordOfEntry(trx, entryId))!
  await updateRecord(trx, record.id, { status: 'accepted' })
  await enter(trx, record, record.id)
}

/** Makes a listed record follow its entry after facts, people or the standing net changed. */
export async function refreshRecord(trx: Knex.Transaction, { entry, people }: EntryContext): Promise<void> {
  const before = await findRecordOfEntry(trx, entry.id)
  if (!before || before.status === 'struck' || before.status === 'withdrawn') return
  const { name, printedAs } = printedName(entry, people)
  const shown = shownName(name, printedAs)
  const patch = {
    district_id: entry.district_id!, method: entry.method, sex: entry.sex, net16: entry.net16!, gross16: entry.gross16!,
    taken_first_on: entry.taken_first_on, taken_last_on: entry.taken_last_on, taken_precision: entry.taken_precision,
    taken_public: entry.month_public === 1 && (entry.taken_precision === 'day' || entry.taken_precision === 'month') ? 'month' as const : 'year' as const,
    hunter_shown: shown, hunter_sort: sortName(shown), sheet_id: entry.standing_sheet_id,
  }
  await deleteTokens(trx, before.id)
  await count(trx, before, -1)
  await updateRecord(trx, before.id, patch)
  await enter(trx, { ...before, ...patch }, before.id)
}
