import type { Knex } from 'knex'
import type { SheetsInsert, SheetsRow } from '../../db/tables'

export type SheetKind = SheetsRow['kind']

export async function findOpenSheet(db: Knex, entryId: number, kind: SheetKind): Promise<SheetsRow | undefined> {
  return db('sheets').where({ entry_id: entryId, kind, state: 'open' }).first()
}

export async function lockOpenSheet(trx: Knex.Transaction, entryId: number, kind: SheetKind): Promise<SheetsRow | undefined> {
  return trx('sheets').where({ entry_id: entryId, kind, state: 'open' }).forUpdate().first()
}

export async function findSheetById(db: Knex, id: number): Promise<SheetsRow | undefined> {
  return db('sheets').where({ id }).first()
}

/** Sheets of an entry, newest last; rough ones among them. */
export async function listSheets(db: Knex, entryId: number): Promise<SheetsRow[]> {
  return db('sheets').where({ entry_id: entryId }).orderBy('kind').orderBy('number')
}

/** Number of the next sheet of its kind. The caller holds the entry's lock. */
export async function nextSheetNumber(trx: Knex, entryId: number, kind: SheetKind): Promise<number> {
  const row = await trx('sheets').where({ entry_id: entryId, kind }).max({ most: 'number' }).first() as { most: number | null } | undefined
  return (row?.most ?? 0) + 1
}

export async function insertSheet(trx: Knex, row: SheetsInsert): Promise<number> {
  const [id] = await trx('sheets').insert(row)
  return id!
}

export async function updateSheet(trx: Knex, id: number, patch: Partial<SheetsInsert>): Promise<void> {
  await trx('sheets').where({ id }).update(patch)
}

export async function deleteOpenSheet(trx: Knex, id: number): Promise<void> {
  await trx('sheets').where({ id, state: 'open' }).del()
}

/** Accounts that signed an entry sheet of this entry. */
export async function listMeasuredBy(db: Knex, entryId: number): Promise<number[]> {
  const ids: (number | null)[] = await db('sheets').where({ entry_id: entryId, kind: 'entry' }).whereNot({ state: 'open' }).distinct().pluck('measurer_user_id')
  return ids.filter(id => id !== null)
}
