import type { ActiveActor } from '../access/roles'
import type { PersonKeys, Stake, StakeFacts } from '../access/stakes'
import type { Day } from '../dates'
import type { ClassLineAnswer, Ground } from './eligibility'
import type { AnimalFacts, DocumentKind, SignerPart } from './origins'
import type { Vote } from './panel'
import type { State } from './states'

/** Who performs a transition. Only a person has an account, a name and stakes. */
export type Performer
  = | { readonly kind: 'person', readonly actor: ActiveActor, readonly keys: PersonKeys }
    | { readonly kind: 'panel' }
    | { readonly kind: 'clock' }
    | { readonly kind: 'system' }

export interface Accreditation {
  readonly validFrom: Day
  readonly validTo: Day
  /** first day on which it no longer holds; null while it does */
  readonly suspendedOn: Day | null
  readonly species: readonly string[]
}

/** A measurer whom somebody names for the animal. */
export interface MeasurerCandidate {
  readonly userId: number
  readonly accreditations: readonly Accreditation[]
  readonly stakes: readonly Stake[]
}

/** The open entry sheet, as scored by its own definition. */
export interface SheetFacts {
  readonly ofClass: boolean
  readonly missing: readonly string[]
  /** codes of slips that bar certifying, dryness and missing lines apart */
  readonly blockingSlips: readonly string[]
  readonly driedSince: Day | null
  readonly measuredOn: Day | null
}

export interface Fee {
  /** integer minor units */
  readonly due: number
  readonly settled: number
  readonly waived: boolean
}

/** The class that a reviewer would move the entry to. */
export interface OtherClass {
  readonly sameLines: boolean
  readonly consented: boolean
  readonly net16: number
  readonly minimum16: number | null
  readonly feeDue: number
}

export interface SecondMeasuring {
  readonly due: boolean
  readonly done: boolean
  /** judges who asked for one */
  readonly askedBy: number
  readonly pair: readonly [number, number] | null
  /** stakes of either judge of the pair, each of which bars them */
  readonly pairStakes: readonly Stake[]
  /** judges of the pair who opened the file, so that they would not measure blind */
  readonly pairOpened: number
  readonly day: Day | null
  readonly jointSignatures: number
  readonly notPresented: boolean
}

/** What the ballots of the open docket item come to. */
export interface Decision {
  readonly votes: readonly Vote[]
  readonly ground: Ground | null
  readonly reason: string
  readonly requests: readonly string[]
}

/** Everything that guards look at, loaded under the lock of the entry row. */
export interface EntryFacts {
  /** null before the entry begins */
  readonly state: State | null
  /** the state that asked for a new certificate or a second measuring, or that lapsed */
  readonly returnTo: State | null
  /** last day of the term that runs in this state, in the registry's zone; null where none runs */
  readonly dueOn: Day | null
  readonly ownerUserId: number | null
  readonly measurerUserId: number | null
  /** chair of the sitting that has the entry; without one, the chairs of all sittings that are planned or open */
  readonly chairUserIds: readonly number[]
  readonly onHold: boolean
  readonly species: string
  readonly animal: AnimalFacts
  readonly classLine: ClassLineAnswer
  readonly stakes: StakeFacts
  readonly hasReadings: boolean
  readonly sheet: SheetFacts | null
  /** accreditations of the assigned measurer */
  readonly accreditations: readonly Accreditation[]
  readonly missingPapers: readonly DocumentKind[]
  readonly statementBy: readonly SignerPart[]
  readonly fee: Fee
  readonly spreadCounts: boolean
  /** standing net, in sixteenths of an inch */
  readonly net16: number | null
  /** minimum of the pinned term, or of the term in force before one is pinned; null where the class has none */
  readonly minimum16: number | null
  readonly openRequests: number
  readonly unansweredRequests: number
  readonly uncheckedCodes: readonly string[]
  readonly likelyDoubles: number
  readonly revived: boolean
  readonly appealed: boolean
  readonly second: SecondMeasuring
  readonly decision: Decision | null
  readonly reportChecked: boolean
  readonly challengeAnswered: boolean
  /** another entry of the animal that is open */
  readonly otherOpenEntry: boolean
  /** another entry of the animal that stands in the lists and that this one cannot replace */
  readonly otherRecord: boolean
  readonly actedOnSince: boolean
  readonly withdrawalAsked: boolean
}

/** What comes with the request, as far as it was sent, and what the service found for it. */
export interface ActInput {
  readonly transition: string
  readonly comment?: string
  readonly confirm?: boolean
  readonly place?: string
  /** day of an appointment in the registry's zone */
  readonly onDay?: Day
  readonly ground?: Ground
  readonly reason?: string
  readonly text?: string
  /** names of the facts that an amendment changes */
  readonly changes?: readonly string[]
  /** whether the person's password was verified for this act */
  readonly passwordVerified?: boolean
  readonly candidate?: MeasurerCandidate | null
  readonly otherClass?: OtherClass | null
}

/** Accredited for the species on the day, and not suspended then. */
export function isAccredited(accreditations: readonly Accreditation[], species: string, day: Day): boolean {
  return accreditations.some(one => one.species.includes(species) && one.validFrom <= day && day <= one.validTo
    && (one.suspendedOn === null || day < one.suspendedOn))
}
