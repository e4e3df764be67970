import type { Knex } from 'knex'

/** A class of the registry with the least net that the lists take on a day. Lengths in sixteenths of an inch. */
export interface ClassInForce {
  readonly id: number
  readonly code: string
  readonly species: string
  readonly scientificName: string
  readonly offered: boolean
  /** Null where the class is not offered or has no minimum in the term. */
  readonly min16: number | null
}

/** All classes in the lists' order, with the minimum of the term in force on `today` (`YYYY-MM-DD`, the registry's day). */
export async function classesInForce(db: Knex, today: string): Promise<ClassInForce[]> {
  const term = await db('minimums_terms').where('from_on', '<=', today).where(open => open.whereNull('to_on').orWhere('to_on', '>=', today))
    .orderBy('from_on', 'desc').first('id')
  const rows = await db('classes as c').join('species as s', 's.id', 'c.species_id')
    .leftJoin('minimums as m', join => join.on('m.class_id', 'c.id').andOnVal('m.term_id', term?.id ?? 0))
    .orderBy([{ column: 'c.sort' }, { column: 'c.id' }])
    .select('c.id', 'c.code', 'c.offered', 's.code as species', 's.scientific_name', 'm.min16')
  return rows.map(row => ({
    id: row.id,
    code: row.code,
    species: row.species,
    scientificName: row.scientific_name,
    offered: row.offered === 1,
    min16: row.offered === 1 ? row.min16 ?? null : null,
  }))
}

/** The rank that a net would take in a class's list of the whole region over all methods: one more than stand above it. */
export async function rankOf(db: Knex, classId: number, net16: number): Promise<number> {
  const row = await db('list_counts').where({ class_id: classId, district_id: 0, method: '' }).where('net16', '>', net16).sum({ above: 'n' }).first()
  return 1 + Number(row?.above ?? 0)
}
