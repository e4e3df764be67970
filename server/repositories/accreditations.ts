import type { Knex } from 'knex'
import type { AccreditationsInsert } from '../../db/tables'

export async function lockAccreditation(trx: Knex, uid: string) {
  return await trx('accreditations').where({ uid }).forUpdate().first() ?? null
}

export async function insertAccreditation(trx: Knex, row: AccreditationsInsert): Promise<number> {
  const [id] = await trx('accreditations').insert(row)
  return Number(id)
}

export async function updateAccreditation(trx: Knex, id: number, changes: Partial<AccreditationsInsert>): Promise<void> {
  await trx('accreditations').where({ id }).update(changes)
}

export async function replaceSpecies(trx: Knex, accreditationId: number, speciesIds: readonly number[]): Promise<void> {
  await trx('accreditation_species').where({ accreditation_id: accreditationId }).delete()
  await trx('accreditation_species').insert(speciesIds.map(species_id => ({ accreditation_id: accreditationId, species_id })))
}

/** Ids of species by their codes; fewer rows than codes when one is unknown. */
export async function speciesByCode(db: Knex, codes: readonly string[]): Promise<{ id: number, code: string }[]> {
  return db('species').whereIn('code', [...codes]).select('id', 'code')
}
