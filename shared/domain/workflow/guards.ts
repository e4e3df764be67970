import type { StakeAct } from '../access/stakes'
import { stakesOf } from '../access/stakes'
import type { Day } from '../dates'
import { firstMeasuringDay, isOver } from '../dates'
import { groundFits } from './eligibility'
import type { ActInput, EntryFacts, Performer } from './facts'
import { isAccredited } from './facts'
import type { WorkflowLimits } from './limits'
import { missingFacts, statementSigners } from './origins'
import type { Outcome } from './panel'
import { tally } from './panel'
import type { Party } from './rows'
import type { State } from './states'

/** Conditions that a transition can name. Each is one small function below. */
export const GUARDS = [
  'animal_facts_complete', 'class_allowed', 'measurer_fit', 'measurer_without_stake', 'walk_in_measurable', 'no_readings_yet',
  'sheet_complete', 'sheet_of_class', 'no_blocking_slip', 'dried_long_enough', 'accredited_when_measured',
  'no_stake', 'signed_by_password',
  'papers_complete', 'statement_signed', 'fee_settled', 'net_at_minimum',
  'open_request', 'every_request_answered', 'no_open_request', 'untouched_long_enough', 'not_revived_before',
  'own_turn', 'entrant_consents', 'same_lines', 'other_minimum', 'other_fee', 'every_check_ticked', 'no_likely_double',
  'place_and_day', 'second_measuring_called_for', 'pair_named', 'joint_sheet_signed_by_both', 'day_has_passed',
  'quorum', 'panel_says_accept', 'panel_says_return', 'panel_says_decline', 'panel_says_uphold', 'panel_says_strike',
  'second_measuring_done', 'standing_net_at_minimum', 'one_live_record', 'no_other_open_entry',
  'ground_and_reason', 'ground_fits', 'reason_given', 'requests_named',
  'within_appeal_days', 'not_appealed_before', 'text_given', 'confirmed', 'withdrawal_agreed',
  'report_checked', 'answered_or_time_over', 'facts_only', 'not_acted_on_since', 'on_hold', 'not_on_hold',
] as const
export type GuardName = (typeof GUARDS)[number]

export function isGuard(value: unknown): value is GuardName {
  return typeof value === 'string' && (GUARDS as readonly string[]).includes(value)
}

/** Guards for stake, signature and quorum: no version of the workflow may drop them from where they belong. */
export const PROTECTED_GUARDS = [
  'no_stake', 'measurer_without_stake', 'walk_in_measurable', 'pair_named', 'signed_by_password', 'joint_sheet_signed_by_both', 'quorum',
] as const satisfies readonly GuardName[]

/** Guards that look at what comes with the request, so that nothing can be said about them before it is sent. */
export const INPUT_GUARDS = [
  'measurer_fit', 'measurer_without_stake', 'walk_in_measurable', 'signed_by_password', 'entrant_consents', 'same_lines', 'other_minimum',
  'other_fee', 'place_and_day', 'text_given', 'confirmed', 'facts_only',
] as const satisfies readonly GuardName[]

export interface GuardFailure {
  readonly guard: GuardName | 'comment_given'
  /** what is missing or in the way, as codes */
  readonly items?: readonly string[]
  readonly params?: Readonly<Record<string, string | number>>
}

export interface GuardContext {
  readonly facts: EntryFacts
  readonly input: ActInput
  readonly performer: Performer
  /** parties of the transition that the performer is */
  readonly parties: ReadonlySet<Party>
  readonly to: State | null
  readonly today: Day
  readonly limits: WorkflowLimits
}

type Details = Omit<GuardFailure, 'guard'>
type Guard = (context: GuardContext) => true | Details | readonly GuardFailure[]

const NO: Details = {}
const unless = (holds: boolean, details: Details = NO) => holds || details
const none = (items: readonly string[]) => unless(items.length === 0, { items })
const isText = (text: string | undefined | null): text is string => typeof text === 'string' && text.trim() !== ''

/** The act that a stake would bar from, by the party in whose right somebody acts. */
const STAKE_ACT_OF: Readonly<Partial<Record<Party, StakeAct>>> = {
  assigned_measurer: 'certify',
  reviewer: 'review',
  chair: 'chair',
  judge_pair: 'remeasure',
  registrar: 'amend',
}

function stakesOfPerformer({ facts, performer, parties }: GuardContext) {
  if (performer.kind !== 'person') return []
  // somebody acts in one right at a time: it is enough to be free of stakes in one of them
  const byAct = [...parties].map((party) => {
    const act = STAKE_ACT_OF[party]
    return act ? stakesOf(facts.stakes, performer.keys, act) : []
  })
  return byAct.find(stakes => stakes.length === 0) ?? byAct[0] ?? []
}

function atMinimum({ net16, minimum16 }: { net16: number | null, minimum16: number | null }) {
  if (minimum16 === null) return true
  return unless(net16 !== null && net16 >= minimum16, { params: { net16: net16 ?? 0, minimum16 } })
}

function panelSays(outcome: Outcome): Guard {
  return ({ facts, limits }) => {
    const matter = outcome === 'uphold' || outcome === 'strike' ? 'record' : 'entry'
    return unless(facts.decision !== null && tally(matter, facts.decision.votes, limits.quorum).outcome === outcome)
  }
}

function groundAndReason({ facts, input, performer }: GuardContext) {
  return performer.kind === 'panel'
    ? { ground: facts.decision?.ground ?? null, reason: facts.decision?.reason }
    : { ground: input.ground ?? null, reason: input.reason }
}

/** Facts that may be amended on an accepted record. Never a score, a sheet or a class. */
export const AMENDABLE_FACTS = [
  'hunterName', 'hunterPrintedAs', 'finderName', 'ownerName', 'guideName', 'takenOn', 'monthPublic', 'district', 'method', 'sex',
] as const

const CHECKS: Readonly<Record<GuardName, Guard>> = {
  animal_facts_complete: ({ facts }) => none(missingFacts(facts.animal)),
  class_allowed: ({ facts }) => unless(facts.classLine === 'allowed', { items: [facts.classLine] }),
  measurer_fit: ({ facts, input, today }) =>
    unless(!!input.candidate && isAccredited(input.candidate.accreditations, facts.species, today)),
  measurer_without_stake: ({ input }) => input.candidate ? none(input.candidate.stakes.map(stake => stake.kind)) : true,
  walk_in_measurable: (context) => {
    const { input, performer } = context
    if (!input.candidate) return true
    if (performer.kind !== 'person' || performer.actor.userId !== input.candidate.userId) return NO
    return runGuards(['animal_facts_complete', 'class_allowed', 'measurer_fit', 'measurer_without_stake'], context)
  },
  no_readings_yet: ({ facts, performer }) =>
    unless(!facts.hasReadings || (performer.kind === 'person' && performer.actor.userId !== facts.ownerUserId)),

  sheet_complete: ({ facts }) => facts.sheet === null ? { items: ['sheet'] } : none(facts.sheet.missing),
  sheet_of_class: ({ facts }) => unless(facts.sheet?.ofClass === true),
  no_blocking_slip: ({ facts }) => none(facts.sheet?.blockingSlips ?? []),
  dried_long_enough: ({ facts, limits, today }) => {
    const { driedSince, measuredOn } = facts.sheet ?? { driedSince: null, measuredOn: null }
    if (driedSince === null) return { items: ['driedSince'] }
    const first = firstMeasuringDay(driedSince, limits.dryingDays)
    return unless(measuredOn !== null && first <= measuredOn && measuredOn <= today, { params: { first } })
  },
  accredited_when_measured: ({ facts }) =>
    unless(facts.sheet !== null && facts.sheet.measuredOn !== null && isAccredited(facts.accreditations, facts.species, facts.sheet.measuredOn)),
  no_stake: context => none(stakesOfPerformer(context).map(stake => 'part' in stake ? `${stake.kind}.${stake.part}` : stake.kind)),
  signed_by_password: ({ input }) => unless(input.passwordVerified === true),

  papers_complete: ({ facts }) => none(facts.missingPapers),
  statement_signed: ({ facts }) => {
    const signers = statementSigners(facts.animal)
    return unless(signers.some(part => facts.statementBy.includes(part)), { items: signers })
  },
  fee_settled: ({ facts: { fee } }) => unless(fee.waived || fee.settled >= fee.due, { params: { due: fee.due, settled: fee.settled } }),
  net_at_minimum: ({ facts }) => atMinimum(facts),

  open_request: ({ facts }) => unless(facts.openRequests > 0),
  every_request_answered: ({ facts }) => unless(facts.unansweredRequests === 0, { params: { count: facts.unansweredRequests } }),
  no_open_request: ({ facts }) => unless(facts.openRequests === 0, { params: { count: facts.openRequests } }),
  untouched_long_enough: ({ facts, today }) => unless(facts.dueOn !== null && isOver(facts.dueOn, today)),
  not_revived_before: ({ facts }) => unless(!facts.revived),

  own_turn: ({ facts, parties }) => unless(facts.state === 'in_review' ? parties.has('reviewer') : parties.has('chair')),
  entrant_consents: ({ input }) => unless(input.otherClass?.consented === true),
  same_lines: ({ input }) => unless(input.otherClass?.sameLines === true),
  other_minimum: ({ input }) => input.otherClass ? atMinimum(input.otherClass) : NO,
  other_fee: ({ facts: { fee }, input }) => unless(!!input.otherClass && (fee.waived || fee.settled >= input.otherClass.feeDue),
    { params: { due: input.otherClass?.feeDue ?? 0, settled: fee.settled } }),
  every_check_ticked: ({ facts }) => none(facts.uncheckedCodes),
  no_likely_double: ({ facts }) => unless(facts.likelyDoubles === 0, { params: { count: facts.likelyDoubles } }),

  place_and_day: ({ input, today }) => none([
    ...(isText(input.place) ? [] : ['place']),
    ...(input.onDay !== undefined && input.onDay >= today ? [] : ['at']),
  ]),
  second_measuring_called_for: ({ facts }) => unless(facts.state === 'challenged' || facts.second.due || facts.second.askedBy >= 2),
  pair_named: ({ facts: { second } }) => {
    if (second.pair === null) return { items: ['pair'] }
    return none([...second.pairStakes.map(stake => stake.kind), ...(second.pairOpened > 0 ? ['opened'] : [])])
  },
  joint_sheet_signed_by_both: ({ facts }) => unless(facts.second.jointSignatures >= 2, { params: { count: facts.second.jointSignatures } }),
  day_has_passed: ({ facts, today }) => unless(facts.second.day !== null && isOver(facts.second.day, today)),

  quorum: ({ facts, limits }) => {
    const voting = facts.decision?.votes.filter(vote => vote !== 'stand_aside').length ?? 0
    return unless(voting >= limits.quorum, { params: { voting, quorum: limits.quorum } })
  },
  panel_says_accept: panelSays('accept'),
  panel_says_return: panelSays('return'),
  panel_says_decline: panelSays('decline'),
  panel_says_uphold: panelSays('uphold'),
  panel_says_strike: panelSays('strike'),
  second_measuring_done: ({ facts: { second } }) => unless(!second.due || second.done),
  standing_net_at_minimum: ({ facts }) => atMinimum(facts),
  one_live_record: ({ facts }) => unless(!facts.otherRecord),
  no_other_open_entry: ({ facts }) => unless(!facts.otherOpenEntry),

  ground_and_reason: (context) => {
    const { ground, reason } = groundAndReason(context)
    return none([...(ground === null ? ['ground'] : []), ...(isText(reason) ? [] : ['reason'])])
  },
  ground_fits: (context) => {
    const { ground } = groundAndReason(context)
    if (ground === null) return true
    const { spreadCounts, net16, minimum16, second } = context.facts
    return unless(groundFits(ground, { spreadCounts, net16, minimum16, notPresented: second.notPresented }), { items: [ground] })
  },
  reason_given: context => unless(isText(groundAndReason(context).reason)),
  requests_named: ({ facts }) => unless((facts.decision?.requests.length ?? 0) > 0),

  within_appeal_days: ({ facts, today }) => unless(facts.dueOn !== null && !isOver(facts.dueOn, today), { params: { dueOn: facts.dueOn ?? '' } }),
  not_appealed_before: ({ facts }) => unless(!facts.appealed),
  text_given: ({ input }) => unless(isText(input.text), { items: ['text'] }),
  confirmed: ({ input }) => unless(input.confirm === true),
  withdrawal_agreed: ({ facts, parties }) => {
    const needsChair = facts.onHold || facts.state === 'challenged'
    return unless(needsChair ? parties.has('chair') && !parties.has('entrant') && facts.withdrawalAsked : parties.has('entrant'))
  },

  report_checked: ({ facts }) => unless(facts.reportChecked),
  answered_or_time_over: ({ facts, today }) => unless(facts.challengeAnswered || (facts.dueOn !== null && isOver(facts.dueOn, today))),
  facts_only: ({ input }) => {
    const changes = input.changes ?? []
    const foreign = changes.filter(name => !(AMENDABLE_FACTS as readonly string[]).includes(name))
    return changes.length === 0 ? { items: ['changes'] } : none(foreign)
  },
  not_acted_on_since: ({ facts }) => unless(!facts.actedOnSince),
  on_hold: ({ facts }) => unless(facts.onHold),
  not_on_hold: ({ facts }) => unless(!facts.onHold),
}

/** Runs the named guards and returns every one that fails, in their order. */
export function runGuards(guards: readonly GuardName[], context: GuardContext): GuardFailure[] {
  return guards.flatMap((guard) => {
    const answer = CHECKS[guard](context)
    if (answer === true) return []
    return Array.isArray(answer) ? answer as GuardFailure[] : [{ guard, ...answer as Details }]
  })
}
