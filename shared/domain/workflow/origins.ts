import type { Part } from '../access/stakes'
import type { DatePrecision } from '../dates'

/** How the animal came to whoever enters it. */
export const ORIGINS = ['hunted', 'found', 'road_killed', 'agency', 'inherited'] as const
export type Origin = (typeof ORIGINS)[number]

export const METHODS = ['rifle', 'muzzleloader', 'shotgun', 'handgun', 'compound_bow', 'recurve_longbow', 'crossbow'] as const
export type Method = (typeof METHODS)[number]

export const SEXES = ['male', 'female', 'unknown'] as const
export type Sex = (typeof SEXES)[number]

/** Kinds of paper and photograph that an entry can hold. */
export const DOCUMENT_KINDS = [
  'photo_front', 'photo_left', 'photo_right', 'photo_field', 'tag_or_licence', 'proof_of_possession', 'account',
  'genetic_proof', 'condition', 'letter', 'other',
] as const
export type DocumentKind = (typeof DOCUMENT_KINDS)[number]

const THREE_PHOTOGRAPHS = ['photo_front', 'photo_left', 'photo_right'] as const satisfies readonly DocumentKind[]
const FOUND = [...THREE_PHOTOGRAPHS, 'proof_of_possession', 'account'] as const satisfies readonly DocumentKind[]

/** Papers that an entry needs before it can be submitted, the sheet and the signed statement apart. */
export const PAPERS: Readonly<Record<Origin, readonly DocumentKind[]>> = {
  hunted: [...THREE_PHOTOGRAPHS, 'photo_field', 'tag_or_licence'],
  found: FOUND,
  road_killed: FOUND,
  agency: FOUND,
  inherited: [...THREE_PHOTOGRAPHS, 'account'],
}

/** Papers that are still missing, in the order in which they are asked for. */
export function missingPapers(origin: Origin, have: Iterable<DocumentKind>, onTheLine: boolean): DocumentKind[] {
  const present = new Set(have)
  const wanted: readonly DocumentKind[] = onTheLine ? [...PAPERS[origin], 'genetic_proof'] : PAPERS[origin]
  return wanted.filter(kind => !present.has(kind))
}

export interface PersonOfEntry {
  readonly part: Part
  readonly minor: boolean
  readonly died: boolean
}

/** The facts that every class asks for, as far as they are given. */
export interface AnimalFacts {
  readonly origin: Origin
  readonly districtKnown: boolean
  readonly takenPrecision: DatePrecision
  readonly method: Method | null
  readonly sex: Sex | null
  readonly guided: boolean | null
  readonly people: readonly PersonOfEntry[]
}

export const ANIMAL_FACTS = [
  'district', 'takenOn', 'method', 'sex', 'guided', 'hunter', 'finder', 'owner', 'guide', 'guardian', 'heir',
] as const
export type AnimalFact = (typeof ANIMAL_FACTS)[number]

const WHO: Readonly<Record<Origin, readonly Part[]>> = {
  hunted: ['hunter'],
  found: ['finder'],
  road_killed: ['finder'],
  agency: ['owner', 'club'],
  inherited: ['owner', 'club'],
}

function has(facts: AnimalFacts, part: Part): boolean {
  return facts.people.some(person => person.part === part)
}

function missingPeople(facts: AnimalFacts): AnimalFact[] {
  const missing: AnimalFact[] = []
  const who = WHO[facts.origin]
  if (!who.some(part => has(facts, part))) missing.push(who[0] as AnimalFact)
  if (facts.people.some(person => person.minor && person.part !== 'guide') && !has(facts, 'guardian')) missing.push('guardian')
  if (facts.origin === 'hunted' && facts.people.some(person => person.part === 'hunter' && person.died) && !has(facts, 'heir')) missing.push('heir')
  if (facts.guided === true && !has(facts, 'guide')) missing.push('guide')
  return missing
}

/**
 * Facts that the origin asks for and that are not given. A hunted animal needs its day, method and sex and whether there was a
 * guide; a found one the date it was found (a month or a year is not enough); an inherited one a date as far as it is known.
 */
export function missingFacts(facts: AnimalFacts): AnimalFact[] {
  const missing: AnimalFact[] = []
  if (!facts.districtKnown) missing.push('district')
  if (facts.origin !== 'inherited' && facts.takenPrecision !== 'day') missing.push('takenOn')
  if (facts.origin === 'hunted') {
    if (facts.method === null) missing.push('method')
    if (facts.sex === null) missing.push('sex')
    if (facts.guided === null) missing.push('guided')
  }
  return [...missing, ...missingPeople(facts)]
}

/** True where a method of taking may stand: found, road-killed and confiscated animals have none. */
export function mayHaveMethod(origin: Origin, originalOrigin: Origin | null): boolean {
  return origin === 'hunted' || (origin === 'inherited' && originalOrigin === 'hunted')
}

/** Parts of whom one signs the statement. */
export type SignerPart = Exclude<Part, 'guide' | 'witness'>

/**
 * Who signs the statement: the hunter, the finder or the owner; the heir or executor of a hunter who has died; the guardian of
 * a minor.
 */
export function statementSigners(facts: Pick<AnimalFacts, 'origin' | 'people'>): SignerPart[] {
  const principal = WHO[facts.origin] as readonly SignerPart[]
  const person = facts.people.find(one => (principal as readonly Part[]).includes(one.part))
  if (person?.died) return ['heir']
  if (person?.minor) return ['guardian']
  return [...principal]
}
