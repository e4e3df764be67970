import type { Knex } from 'knex'
import type { RequestsInsert, RequestsRow } from '../../db/tables'

export async function listRequests(db: Knex, entryId: number): Promise<RequestsRow[]> {
  return db('requests').where({ entry_id: entryId }).orderBy('asked_at').orderBy('id')
}

export async function findRequest(db: Knex, entryId: number, uid: string): Promise<RequestsRow | undefined> {
  return db('requests').where({ entry_id: entryId, uid }).first()
}

export async function insertRequest(trx: Knex, row: RequestsInsert): Promise<void> {
  await trx('requests').insert(row)
}

export async function updateRequest(trx: Knex, id: number, patch: Partial<RequestsInsert>): Promise<void> {
  await trx('requests').where({ id }).update(patch)
}

export async function deleteRequest(trx: Knex, id: number): Promise<void> {
  await trx('requests').where({ id }).del()
}

export interface CheckRow { readonly code: string, readonly ticked_by: number, readonly ticked_at: string }

export async function listChecks(db: Knex, entryId: number): Promise<CheckRow[]> {
  return db('checks').where({ entry_id: entryId }).select('code', 'ticked_by', 'ticked_at')
}

export async function tickCheck(trx: Knex, row: { entry_id: number, code: string, ticked_by: number, ticked_at: string }): Promise<void> {
  await trx('checks').insert(row).onConflict(['entry_id', 'code']).merge(['ticked_by', 'ticked_at'])
}

export async function untickCheck(trx: Knex, entryId: number, code: string): Promise<void> {
  await trx('checks').where({ entry_id: entryId, code }).del()
}

export async function untickAllChecks(trx: Knex, entryId: number): Promise<void> {
  await trx('checks').where({ entry_id: entryId }).del()
}

/** Kinds of the papers that an entry holds now. */
export async function listDocumentKinds(db: Knex, entryId: number): Promise<string[]> {
  return db('documents').where({ entry_id: entryId }).whereNull('removed_at').whereNot({ scan_state: 'infected' }).distinct().pluck('kind')
}

/** Parts by which the standing statement of an entry is signed. */
export async function listStatementParts(db: Knex, entryId: number): Promise<string[]> {
  return db('statements').where({ entry_id: entryId }).whereNull('voided_at').pluck('part')
}

export async function voidStatements(trx: Knex, entryId: number, at: string): Promise<void> {
  await trx('statements').where({ entry_id: entryId }).whereNull('voided_at').update({ voided_at: at })
}

export interface LikelyDouble { readonly uid: string, readonly state: string, readonly same: 'sheet' | 'animal' }

interface DoubleQuery {
  readonly entryId: number
  readonly animalId: number
  readonly speciesId: number
  readonly districtId: number | null
  readonly takenFirstOn: string
  readonly takenLastOn: string
  readonly hunterKey: string | null
  readonly sheetHash: string | null
  readonly measurements: string | null
}

/**
 * Entries that may be the same animal: the same readings line by line, or the same species, district, day of taking and hunter.
 * Withdrawn ones and those of the same animal are left out.
 */
export async function findLikelyDoubles(db: Knex, query: DoubleQuery): Promise<LikelyDouble[]> {
  const others = () => db('entries as e').join('animals as a', 'a.id', 'e.animal_id').where('a.species_id', query.speciesId)
    .whereNot('e.animal_id', query.animalId).whereNotIn('e.state', ['withdrawn', 'draft']).limit(20)
  const sameSheet = query.measurements === null
    ? []
    : await others().join('sheets as s', 's.id', 'e.signed_sheet_id').whereRaw('s.measurements_hash = SHA2(?, 256)', [query.measurements]).select('e.uid', 'e.state')
  const sameFacts = query.hunterKey === null || query.takenFirstOn !== query.takenLastOn
    ? []
    : await others().join('entry_people as p', 'p.entry_id', 'e.id').where({ 'p.part': 'hunter', 'p.name_key': query.hunterKey, 'e.taken_first_on': query.takenFirstOn })
        .where('e.district_id', query.districtId).select('e.uid', 'e.state')
  const seen = new Set(sameSheet.map(row => row.uid))
  return [
    ...sameSheet.map((row): LikelyDouble => ({ uid: row.uid, state: row.state, same: 'sheet' })),
    ...sameFacts.filter(row => !seen.has(row.uid)).map((row): LikelyDouble => ({ uid: row.uid, state: row.state, same: 'animal' })),
  ]
}
