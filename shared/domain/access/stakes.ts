/** The parts a person can have in an entry. */
export const PARTS = ['hunter', 'finder', 'owner', 'club', 'guide', 'guardian', 'heir', 'witness'] as const
export type Part = (typeof PARTS)[number]

/** Parts that are a stake in the animal. A witness has none, and a club is nobody's account. */
export const STAKE_PARTS = ['hunter', 'finder', 'owner', 'guide', 'guardian', 'heir'] as const satisfies readonly Part[]

/** Acts from which a stake bars. */
export const STAKE_ACTS = ['certify', 'review', 'remeasure', 'vote', 'chair', 'amend', 'challenge'] as const
export type StakeAct = (typeof STAKE_ACTS)[number]

export interface EntryPerson {
  readonly part: Part
  readonly userId: number | null
  readonly nameKey: string
  readonly addressKey: string | null
}

/** A person's account with the keys under which names and addresses are compared. */
export interface PersonKeys {
  readonly userId: number
  readonly nameKey: string
  readonly addressKey: string | null
}

export const LIKENESSES = ['name', 'address'] as const
export type Likeness = (typeof LIKENESSES)[number]

/** A word, with a reason, that two people of one name or address are not the same or not close. */
export interface StakeClearance {
  readonly userId: number
  readonly kind: Likeness
  readonly nameKey: string
  readonly addressKey: string | null
}

/** What of an entry decides about stakes. */
export interface StakeFacts {
  /** account that the entry belongs to */
  readonly ownerUserId: number | null
  readonly people: readonly EntryPerson[]
  /** accounts that measured the animal for an entry sheet; sheets of the panel are not among them */
  readonly measuredBy: readonly number[]
  /** accounts that declared that their own shop handles this head, or another stake */
  readonly declaredBy: readonly number[]
  /** accounts that reported the record */
  readonly reportedBy: readonly number[]
  readonly clearances: readonly StakeClearance[]
  /** what the entry is before people for: an appeal or a challenge bars those who decided before, a return does not */
  readonly matter: 'entry' | 'appeal' | 'challenge'
  /** accounts that voted on, refused or reviewed the decision that is appealed or challenged */
  readonly decidedBy: readonly number[]
}

export type Stake
  = | { readonly kind: 'part', readonly part: Part }
    | { readonly kind: 'owner' | 'measured' | 'declared' | 'reporter' | 'decided_before' }
    | { readonly kind: 'same_name' | 'same_address', readonly part: Part }

/** True for a stake that a person with the right may clear with a reason; the others bar for good. */
export function canBeCleared(stake: Stake): boolean {
  return stake.kind === 'same_name' || stake.kind === 'same_address'
}

function isStakePart(part: Part): boolean {
  return (STAKE_PARTS as readonly Part[]).includes(part)
}

function partStakes(facts: StakeFacts, person: PersonKeys): Stake[] {
  return facts.people
    .filter(one => one.userId === person.userId && isStakePart(one.part))
    .map(one => ({ kind: 'part', part: one.part }))
}

function isCleared(facts: StakeFacts, person: PersonKeys, kind: Likeness, other: EntryPerson): boolean {
  return facts.clearances.some(clearance => clearance.userId === person.userId && clearance.kind === kind
    && (kind === 'name' ? clearance.nameKey === other.nameKey : clearance.addressKey === other.addressKey))
}

function likenessStakes(facts: StakeFacts, person: PersonKeys): Stake[] {
  return facts.people.filter(other => other.userId !== person.userId).flatMap((other) => {
    const stakes: Stake[] = []
    const sameName = person.nameKey !== '' && person.nameKey === other.nameKey
    if (sameName && !isCleared(facts, person, 'name', other)) stakes.push({ kind: 'same_name', part: other.part })
    const sameAddress = person.addressKey !== null && person.addressKey === other.addressKey
    if (sameAddress && !isCleared(facts, person, 'address', other)) stakes.push({ kind: 'same_address', part: other.part })
    return stakes
  })
}

/**
 * Every stake that bars a person from an act on an entry; empty when the act is open to them.
 * Having measured the animal is no stake when certifying it, since a new version is the same measurer's to sign.
 */
export function stakesOf(facts: StakeFacts, person: PersonKeys, act: StakeAct): Stake[] {
  const stakes: Stake[] = []
  if (facts.ownerUserId === person.userId) stakes.push({ kind: 'owner' })
  stakes.push(...partStakes(facts, person))
  if (act !== 'certify' && facts.measuredBy.includes(person.userId)) stakes.push({ kind: 'measured' })
  if (facts.declaredBy.includes(person.userId)) stakes.push({ kind: 'declared' })
  if (facts.reportedBy.includes(person.userId)) stakes.push({ kind: 'reporter' })
  if (act !== 'certify' && act !== 'amend' && facts.matter !== 'entry' && facts.decidedBy.includes(person.userId)) stakes.push({ kind: 'decided_before' })
  return [...stakes, ...likenessStakes(facts, person)]
}
