/** The states of an entry, in the order in which an animal usually passes them. */
export const STATES = [
  'draft', 'measuring', 'certified', 'in_review', 'returned', 'at_panel', 'remeasuring',
  'accepted', 'declined', 'lapsed', 'withdrawn', 'challenged', 'struck',
] as const
export type State = (typeof STATES)[number]

export const TURNS = ['entrant', 'measurer', 'reviewer', 'panel', 'nobody'] as const
export type Turn = (typeof TURNS)[number]

/** Who has to act for an entry to go on. */
export const WHOSE_TURN: Readonly<Record<State, Turn>> = {
  draft: 'entrant',
  measuring: 'measurer',
  certified: 'entrant',
  in_review: 'reviewer',
  returned: 'entrant',
  at_panel: 'panel',
  remeasuring: 'panel',
  accepted: 'nobody',
  declined: 'entrant',
  lapsed: 'entrant',
  withdrawn: 'nobody',
  challenged: 'panel',
  struck: 'nobody',
}

/** States in which the animal stands in the public lists. */
export const LISTED_STATES = ['accepted', 'challenged'] as const satisfies readonly State[]

/** States in which an entry is the one live entry of its animal. */
export const LIVE_STATES = [
  'draft', 'measuring', 'certified', 'in_review', 'returned', 'at_panel', 'remeasuring', 'accepted', 'challenged',
] as const satisfies readonly State[]

/** States in which the facts are still the entrant's to write. */
export const OPEN_FACTS_STATES = ['draft', 'measuring', 'certified'] as const satisfies readonly State[]

export function isState(value: unknown): value is State {
  return typeof value === 'string' && (STATES as readonly string[]).includes(value)
}

export function isListed(state: State): boolean {
  return (LISTED_STATES as readonly State[]).includes(state)
}

export function isLive(state: State): boolean {
  return (LIVE_STATES as readonly State[]).includes(state)
}

/**
 * Whether an entry's facts are still its entrant's to change.
 *
 * @param returnTo where the entry goes back to; one that is only measured again, after it was submitted, keeps its facts
 */
export function hasOpenFacts(state: State, returnTo: State | null = null): boolean {
  return returnTo === null && (OPEN_FACTS_STATES as readonly State[]).includes(state)
}
