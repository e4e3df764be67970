import type { PrintedAs } from '#shared/domain/lists'
import type { Part } from '#shared/domain/access/stakes'
import { address, personName, surname } from './names'
import type { DemoPerson, People } from './people'
import type { PlannedRecord } from './plan'
import type { Random } from './random'
import { DISTRICTS } from './society'

/** One person of an entry, as the generator knows them. */
export interface EntryPerson {
  readonly part: Part
  readonly name: string
  readonly address: string | null
  readonly email: string | null
  readonly userId: number | null
  readonly bornOn: string | null
  readonly diedOn: string | null
  readonly minor: boolean
}

export interface Cast {
  /** whose entry it is; null for what was taken over from paper */
  readonly owner: DemoPerson | null
  readonly people: readonly EntryPerson[]
  /** whose name the lists print; empty where nobody hunted or found it */
  readonly printedName: string
  readonly printedAs: PrintedAs
  /** who signs the statement */
  readonly signer: EntryPerson
}

const CLUBS = ['Coldiron Valley Club', 'Larkmoor Sportsmen', 'Reach & Cliff Club', 'Flats Field Club'] as const

const person = (part: Part, name: string, rest: Partial<EntryPerson> = {}): EntryPerson =>
  ({ part, name, address: null, email: null, userId: null, bornOn: null, diedOn: null, minor: false, ...rest })

const ofAccount = (part: Part, one: DemoPerson): EntryPerson =>
  person(part, one.name, { address: one.address, email: one.email, userId: one.userId })

/** Who is in it: old lists name a hunter and little more, entries of today have accounts, owners, guides, guardians. */
export function castFor(plan: PlannedRecord, owner: DemoPerson | null, random: Random): Cast {
  const printedAs = random.weighted<PrintedAs>({ full: 93, initials: 4, withheld: 3 })
  if (!owner) {
    const hunter = person(plan.origin === 'hunted' || plan.originalOrigin === 'hunted' ? 'hunter' : 'finder', personName(random))
    const people = plan.origin === 'inherited' ? [hunter, person('owner', personName(random))] : [hunter]
    return { owner, people, printedName: hunter.name, printedAs, signer: people.at(-1)! }
  }
  switch (plan.origin) {
    case 'hunted': return hunted(owner, plan, printedAs, random)
    case 'inherited': {
      const hunter = person('hunter', `${personName(random).split(' ')[0]!} ${owner.name.split(' ').at(-1)!}`, { diedOn: `${1960 + random.whole(0, 50)}-01-01` })
      const heir = ofAccount('owner', owner)
      const people = plan.originalOrigin === 'hunted' ? [hunter, heir] : [heir]
      return { owner, people, printedName: people[0]!.name, printedAs, signer: heir }
    }
    case 'agency': {
      const agency = person('club', random.pick(CLUBS), { email: owner.email })
      return { owner, people: [agency, ofAccount('witness', owner)], printedName: agency.name, printedAs: 'full', signer: agency }
    }
    default: {
      const finder = ofAccount('finder', owner)
      return { owner, people: [finder], printedName: finder.name, printedAs, signer: finder }
    }
  }
}

function hunted(owner: DemoPerson, plan: PlannedRecord, printedAs: PrintedAs, random: Random): Cast {
  const people: EntryPerson[] = []
  const minor = random.chance(0.04)
  const guardian = ofAccount('guardian', owner)
  const hunter = minor
    ? person('hunter', `${personName(random).split(' ')[0]!} ${owner.name.split(' ').at(-1)!}`, {
        address: owner.address, bornOn: `${Number(plan.taken.first.slice(0, 4)) - random.whole(12, 16)}-04-01`, minor: true,
      })
    : ofAccount('hunter', owner)
  people.push(hunter)
  if (minor) people.push(guardian)
  if (random.chance(0.12)) people.push(person('guide', personName(random), { address: address(random, random.pick(DISTRICTS).name) }))
  if (random.chance(0.02)) people.push(person('club', `${surname(random)} Camp`))
  return { owner, people, printedName: hunter.name, printedAs: minor ? 'initials' : printedAs, signer: minor ? guardian : hunter }
}

/** Somebody who enters an animal: a new person, or one who has entered before. */
export function ownerFor(plan: PlannedRecord, before: DemoPerson[], people: People, createdAt: Date, random: Random): DemoPerson {
  const again = before.length > 20 && random.chance(0.28) ? random.pick(before) : undefined
  if (again) return again
  const owner = people.add(plan.district, createdAt)
  before.push(owner)
  return owner
}
