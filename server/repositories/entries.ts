import type { Knex } from 'knex'
import type { EntriesInsert, EntriesRow } from '../../db/tables'

export type EntryPatch = Partial<EntriesInsert>

/** Locks an entry row: the lock for every fact under it. Undefined when there is none. */
export async function lockEntry(trx: Knex.Transaction, uid: string): Promise<EntriesRow | undefined> {
  return trx('entries').where({ uid }).forUpdate().first()
}

export async function lockEntryById(trx: Knex.Transaction, id: number): Promise<EntriesRow | undefined> {
  return trx('entries').where({ id }).forUpdate().first()
}

export async function findEntry(db: Knex, uid: string): Promise<EntriesRow | undefined> {
  return db('entries').where({ uid }).first()
}

export async function insertEntry(trx: Knex, row: EntriesInsert): Promise<number> {
  const [id] = await trx('entries').insert(row)
  return id!
}

/** Writes an entry under its lock; its version grows by one. */
export async function updateEntry(trx: Knex.Transaction, id: number, patch: EntryPatch): Promise<void> {
  await trx('entries').where({ id }).update({ ...patch, version: trx.raw('version + 1') })
}

export async function insertAnimal(trx: Knex, row: { uid: string, species_id: number, created_at: string }): Promise<number> {
  const [id] = await trx('animals').insert(row)
  return id!
}

export async function setLiveEntry(trx: Knex, animalId: number, entryId: number): Promise<void> {
  await trx('animals').where({ id: animalId }).update({ live_entry_id: entryId })
}

export async function clearLiveEntry(trx: Knex, animalId: number, entryId: number): Promise<void> {
  await trx('animals').where({ id: animalId, live_entry_id: entryId }).update({ live_entry_id: null })
}

export type SiblingEntry = Pick<EntriesRow, 'id' | 'uid' | 'class_id' | 'state' | 'owner_user_id'>

/** Other entries of the same animal. */
export async function listSiblings(db: Knex, animalId: number, entryId: number): Promise<SiblingEntry[]> {
  return db('entries').where({ animal_id: animalId }).whereNot({ id: entryId }).select('id', 'uid', 'class_id', 'state', 'owner_user_id')
}

/** Entries whose term ended before a day, in states that the clock moves. A hold stops the clock. */
export async function listOverdue(db: Knex, today: string, limit: number): Promise<{ uid: string, state: string }[]> {
  return db('entries').whereIn('state', ['returned', 'certified']).where('due_on', '<', today).whereNull('hold_at')
    .orderBy('due_on').limit(limit).select('uid', 'state')
}

export type DueEntry = Pick<EntriesRow, 'id' | 'uid' | 'state' | 'due_on' | 'owner_user_id' | 'appealed_at' | 'workflow_version_id'>

/** Entries with a running term that somebody may have to be reminded of. */
export async function listRunningTerms(db: Knex, today: string, afterId: number, limit: number): Promise<DueEntry[]> {
  return db('entries').whereIn('state', ['returned', 'certified', 'declined']).where('due_on', '>=', today).whereNull('hold_at')
    .whereNotNull('owner_user_id').where('id', '>', afterId).orderBy('id').limit(limit)
    .select('id', 'uid', 'state', 'due_on', 'owner_user_id', 'appealed_at', 'workflow_version_id')
}
