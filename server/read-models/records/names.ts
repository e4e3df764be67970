import type { Knex } from 'knex'
import { foldedWords } from '../../../shared/domain/fold'
import type { Step } from '../../../shared/domain/measuring/index'

export interface ClassName {
  readonly id: number
  readonly code: string
  readonly step: Step
  readonly speciesId: number
  readonly species: string
  readonly scientificName: string
}

export interface DistrictName {
  readonly id: number
  readonly code: string
  readonly name: string
  /** Folded words of the name, for the search. */
  readonly words: readonly string[]
}

/** Classes and districts by id, in the registry's order. */
export interface Names {
  readonly classes: ReadonlyMap<number, ClassName>
  readonly districts: ReadonlyMap<number, DistrictName>
}

/** A registrar's change of a name is seen after this at the latest. */
const KEPT_MS = 2_000
const keptOf = new WeakMap<Knex, { readonly at: number, readonly names: Promise<Names> }>()

export function readNames(db: Knex): Promise<Names> {
  const now = performance.now()
  const kept = keptOf.get(db)
  if (kept && now - kept.at < KEPT_MS) return kept.names
  const names = namesOf(db)
  keptOf.set(db, { at: now, names })
  names.catch(() => keptOf.delete(db))
  return names
}

async function namesOf(db: Knex): Promise<Names> {
  const [classes, districts] = await Promise.all([
    db('classes as c').join('species as s', 's.id', 'c.species_id').orderBy([{ column: 'c.sort' }, { column: 'c.id' }])
      .select('c.id', 'c.code', 'c.step', 'c.species_id', 's.code as species', 's.scientific_name'),
    db('districts').orderBy([{ column: 'sort' }, { column: 'id' }]).select('id', 'code', 'name'),
  ])
  return {
    classes: new Map(classes.map(row => [row.id, { id: row.id, code: row.code, step: row.step, speciesId: row.species_id, species: row.species, scientificName: row.scientific_name }])),
    districts: new Map(districts.map(row => [row.id, { id: row.id, code: row.code, name: row.name, words: foldedWords(row.name) }])),
  }
}

/** Grows with every change of the lists. */
export async function listsVersion(db: Knex): Promise<number> {
  const row = await db('counters').where({ name: 'lists_version' }).first('value')
  return Number(row?.value ?? 0)
}
