import type { Role } from '../access/roles'
import { hasRole } from '../access/roles'
import type { Day } from '../dates'
import { lastDayOfTerm } from '../dates'
import type { EffectName } from './effects'
import type { ActInput, EntryFacts, Performer } from './facts'
import type { GuardContext, GuardFailure, GuardName } from './guards'
import { INPUT_GUARDS, runGuards } from './guards'
import type { WorkflowLimits } from './limits'
import type { Party, TransitionRow } from './rows'
import type { State } from './states'

export type Refusal
  = | { readonly kind: 'unknown_transition' }
  /** none of the parties that may perform it */
    | { readonly kind: 'forbidden' }
    | { readonly kind: 'wrong_state', readonly state: State | null, readonly from: readonly State[] }
    | { readonly kind: 'stake', readonly stakes: readonly string[] }
    | { readonly kind: 'guards', readonly failed: readonly GuardFailure[] }

export interface Move {
  readonly ok: true
  readonly row: TransitionRow
  readonly from: State | null
  readonly to: State
  /** the state to come back to after this move; null where none is remembered */
  readonly returnTo: State | null
  /** last day of the term that begins with this move; null where none runs; unchanged where the entry stays in its state */
  readonly dueOn: Day | null
  readonly effects: readonly EffectName[]
}

export type Verdict = Move | { readonly ok: false, readonly refusal: Refusal }

type PersonPerformer = Extract<Performer, { kind: 'person' }>

const byRole = (role: Role) => (performer: PersonPerformer) => hasRole(performer.actor, role)

const PERSON_IS: Readonly<Record<Exclude<Party, 'panel' | 'clock' | 'system'>, (performer: PersonPerformer, facts: EntryFacts) => boolean>> = {
  // everybody who signs up is an entrant, and before an entry begins it can become anybody's
  entrant: ({ actor }, facts) => facts.state === null ? hasRole(actor, 'entrant') : facts.ownerUserId === actor.userId,
  shop: byRole('shop'),
  measurer: byRole('measurer'),
  assigned_measurer: ({ actor }, facts) => hasRole(actor, 'measurer') && facts.measurerUserId === actor.userId,
  reviewer: byRole('reviewer'),
  chair: ({ actor }, facts) => hasRole(actor, 'judge') && facts.chairUserIds.includes(actor.userId),
  judge_pair: ({ actor }, facts) => hasRole(actor, 'judge') && facts.second.pair !== null && facts.second.pair.includes(actor.userId),
  registrar: byRole('registrar'),
}

/** True when the performer is the party for this entry now. */
export function isParty(party: Party, performer: Performer, facts: EntryFacts): boolean {
  if (party === 'panel' || party === 'clock' || party === 'system') return performer.kind === party
  return performer.kind === 'person' && PERSON_IS[party](performer, facts)
}

function leaves(row: TransitionRow, state: State | null): boolean {
  return state === null ? row.from.length === 0 : row.from.includes(state)
}

function target(row: TransitionRow, facts: EntryFacts, input: ActInput): State | null {
  if (row.effects.includes('go_back') && facts.returnTo !== null) return facts.returnTo
  if (row.effects.includes('to_bench_when_named') && input.candidate) return 'measuring'
  return row.to ?? facts.state
}

function returnAfter(row: TransitionRow, facts: EntryFacts): State | null {
  if (row.effects.includes('remember_from')) return facts.state
  return row.effects.includes('go_back') ? null : facts.returnTo
}

/** Last day of the term that begins when an entry comes into a state; null for a state in which no clock runs. */
export function termOf(state: State, today: Day, limits: WorkflowLimits): Day | null {
  switch (state) {
    case 'certified':
    case 'returned': return lastDayOfTerm(today, limits.lapseDays)
    case 'declined':
    case 'struck': return lastDayOfTerm(today, limits.appealDays)
    case 'challenged': return lastDayOfTerm(today, limits.answerDays)
    default: return null
  }
}

export interface Surroundings {
  readonly today: Day
  readonly limits: WorkflowLimits
}

function contextOf(row: TransitionRow, facts: EntryFacts, performer: Performer, input: ActInput, around: Surroundings): GuardContext {
  const parties = new Set(row.parties.filter(party => isParty(party, performer, facts)))
  return { facts, input, performer, parties, to: target(row, facts, input), ...around }
}

function commentFailure(row: TransitionRow, input: ActInput): GuardFailure[] {
  return row.commentRequired && (input.comment ?? '').trim() === '' ? [{ guard: 'comment_given' }] : []
}

/**
 * What a transition would do to an entry: the next state and the effects, or a typed refusal with every guard that failed.
 * The order of refusals: not your right (403), not from this state (409), a stake (403), guards (422).
 */
export function transition(rows: readonly TransitionRow[], facts: EntryFacts, performer: Performer, input: ActInput, around: Surroundings): Verdict {
  const row = rows.find(one => one.code === input.transition)
  if (!row) return { ok: false, refusal: { kind: 'unknown_transition' } }
  const context = contextOf(row, facts, performer, input, around)
  if (context.parties.size === 0) return { ok: false, refusal: { kind: 'forbidden' } }
  if (!leaves(row, facts.state)) return { ok: false, refusal: { kind: 'wrong_state', state: facts.state, from: row.from } }
  const failed = [...commentFailure(row, input), ...runGuards(row.guards, context)]
  const stake = failed.find(failure => failure.guard === 'no_stake')
  if (stake) return { ok: false, refusal: { kind: 'stake', stakes: stake.items ?? [] } }
  if (failed.some(failure => failure.guard === 'own_turn')) return { ok: false, refusal: { kind: 'forbidden' } }
  if (failed.length > 0) return { ok: false, refusal: { kind: 'guards', failed } }
  const to = context.to!
  return {
    ok: true,
    row,
    from: facts.state,
    to,
    returnTo: returnAfter(row, facts),
    dueOn: to === facts.state ? facts.dueOn : termOf(to, around.today, around.limits),
    effects: row.effects,
  }
}

/** One thing that somebody may do next, or would but for what stands in the way. */
export interface NextAct {
  readonly transition: string
  readonly to: State | null
  /** guards of the stored facts that fail now; empty when the act is open */
  readonly failed: readonly GuardFailure[]
  readonly stakes: readonly string[]
  /** guards that the request itself has to satisfy */
  readonly asks: readonly (GuardName | 'comment_given')[]
}

const isInputGuard = (guard: GuardName) => (INPUT_GUARDS as readonly GuardName[]).includes(guard)

function nextAct(row: TransitionRow, context: GuardContext): NextAct {
  const failed = runGuards(row.guards.filter(guard => !isInputGuard(guard) && !asksPersonFor(guard, context)), context)
  return {
    transition: row.code,
    to: context.to,
    failed: failed.filter(failure => failure.guard !== 'no_stake'),
    stakes: failed.find(failure => failure.guard === 'no_stake')?.items ?? [],
    asks: [...(row.commentRequired ? ['comment_given' as const] : []), ...row.guards.filter(guard => isInputGuard(guard) || asksPersonFor(guard, context))],
  }
}

/** A ground and a reason come from a person's request, and from the ballots where the panel decides. */
function asksPersonFor(guard: GuardName, { performer }: GuardContext): boolean {
  return performer.kind === 'person' && (guard === 'ground_and_reason' || guard === 'ground_fits' || guard === 'reason_given')
}

/** Where one of these fails there is nothing to wait for: the act belongs to another turn, or to an entry on hold. */
const NOT_THIS_TIME: readonly (GuardName | 'comment_given')[] = ['own_turn', 'withdrawal_agreed', 'on_hold']

/** What a performer may do with an entry in its state, with the reason where something stands in the way. */
export function nextActs(rows: readonly TransitionRow[], facts: EntryFacts, performer: Performer, around: Surroundings): NextAct[] {
  return rows.filter(row => leaves(row, facts.state)).flatMap((row) => {
    const context = contextOf(row, facts, performer, { transition: row.code }, around)
    if (context.parties.size === 0) return []
    const act = nextAct(row, context)
    return act.failed.some(failure => NOT_THIS_TIME.includes(failure.guard)) ? [] : [act]
  })
}

const SAYS: Readonly<Record<string, GuardName>> = {
  accept: 'panel_says_accept',
  return: 'panel_says_return',
  decline: 'panel_says_decline',
  uphold: 'panel_says_uphold',
  strike: 'panel_says_strike',
}

/** The transition by which a decision of the panel is applied from a state; undefined where the decision leaves the state as it is. */
export function rowForOutcome(rows: readonly TransitionRow[], state: State, outcome: keyof typeof SAYS): TransitionRow | undefined {
  return rows.find(row => row.parties.includes('panel') && row.from.includes(state) && row.guards.includes(SAYS[outcome]!))
}
