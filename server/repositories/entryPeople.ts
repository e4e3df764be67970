import type { Knex } from 'knex'
import type { EntryPeopleInsert, EntryPeopleRow } from '../../db/tables'

export async function listPeople(db: Knex, entryId: number): Promise<EntryPeopleRow[]> {
  return db('entry_people').where({ entry_id: entryId }).orderBy('id')
}

export async function insertPerson(trx: Knex, row: EntryPeopleInsert): Promise<void> {
  await trx('entry_people').insert(row)
}

export async function updatePerson(trx: Knex, id: number, patch: Partial<EntryPeopleInsert>): Promise<void> {
  await trx('entry_people').where({ id }).update(patch)
}

/** Takes a person off an entry, with the clearances that were about them. */
export async function deletePerson(trx: Knex, id: number): Promise<void> {
  await trx('stake_clearances').where({ entry_person_id: id }).del()
  await trx('entry_people').where({ id }).del()
}
