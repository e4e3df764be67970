export const ENTRY_VOTES = ['accept', 'return', 'decline', 'stand_aside'] as const
export const RECORD_VOTES = ['uphold', 'strike', 'stand_aside'] as const
export type EntryVote = (typeof ENTRY_VOTES)[number]
export type RecordVote = (typeof RECORD_VOTES)[number]
export type Vote = EntryVote | RecordVote

/** What the panel has before it: an entry to accept, or a record to uphold. */
export const MATTERS = ['entry', 'record'] as const
export type Matter = (typeof MATTERS)[number]

export const OUTCOMES = ['accept', 'return', 'decline', 'uphold', 'strike'] as const
export type Outcome = (typeof OUTCOMES)[number]

export interface Tally {
  readonly voting: number
  readonly standingAside: number
  /** null without a quorum: the item is carried over */
  readonly outcome: Outcome | null
}

/** True where the vote is one that may be cast on the matter. */
export function isVoteOn(matter: Matter, vote: string): vote is Vote {
  return ((matter === 'entry' ? ENTRY_VOTES : RECORD_VOTES) as readonly string[]).includes(vote)
}

/** Accepting needs no reason; everything else does. */
export function needsReason(vote: Vote): boolean {
  return vote !== 'accept'
}

/** A ground of the eligibility list goes with what takes an animal out of the lists. */
export function needsGround(vote: Vote): boolean {
  return vote === 'decline' || vote === 'strike'
}

/**
 * The panel's decision. A quorum of voting judges, then more than half of the votes cast without those standing aside; anything
 * else returns an entry and upholds a record.
 */
export function tally(matter: Matter, votes: readonly Vote[], quorum: number): Tally {
  const cast = votes.filter(vote => vote !== 'stand_aside')
  const counted = { voting: cast.length, standingAside: votes.length - cast.length }
  if (cast.length < quorum) return { ...counted, outcome: null }
  const won = OUTCOMES.find(outcome => 2 * cast.filter(vote => vote === outcome).length > cast.length)
  return { ...counted, outcome: won ?? (matter === 'entry' ? 'return' : 'uphold') }
}

/** The ground that most ballots for the outcome name; the one that was named first where several share the most. */
export function leadingGround<Ground extends string>(grounds: readonly (Ground | null)[]): Ground | null {
  const named = grounds.filter((ground): ground is Ground => ground !== null)
  const count = (ground: Ground) => named.filter(one => one === ground).length
  return named.reduce<Ground | null>((best, ground) => best === null || count(ground) > count(best) ? ground : best, null)
}
