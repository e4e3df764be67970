import type { Knex } from 'knex'

export async function classCodes(db: Knex): Promise<{ id: number, code: string, species: string }[]> {
  return db('classes as c').join('species as s', 's.id', 'c.species_id').orderBy('c.sort').select('c.id', 'c.code', 's.code as species')
}

export async function districtNames(db: Knex): Promise<{ id: number, code: string, name: string }[]> {
  return db('districts').orderBy('sort').select('id', 'code', 'name')
}

/** Grows with every change of the lists. */
export async function listsVersion(db: Knex): Promise<number> {
  const row = await db('counters').where({ name: 'lists_version' }).first('value')
  return Number(row?.value ?? 0)
}
