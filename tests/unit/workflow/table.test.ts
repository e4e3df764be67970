import { describe, expect, test } from 'vitest'
import { WORKFLOW_STATES, WORKFLOW_TRANSITIONS } from '../../../seeds/reference/workflow'
import type { EntryFacts } from '../../../shared/domain/workflow/facts'
import { PARTIES, type Party } from '../../../shared/domain/workflow/rows'
import { STATES, WHOSE_TURN, type State } from '../../../shared/domain/workflow/states'
import { transition } from '../../../shared/domain/workflow/transition'
import { AROUND, FACTS, INPUT, PERFORMERS } from './facts'

/** "-" is before an entry begins. */
type From = State | '-'

interface Expected {
  readonly from: readonly From[]
  readonly who: readonly Party[]
  /** where it leads from a state */
  readonly to: State | ((from: From) => State)
}

const same = (from: From) => from as State
const EVERY_BUT_WITHDRAWN: readonly State[] = [
  'draft', 'measuring', 'certified', 'in_review', 'returned', 'at_panel', 'remeasuring', 'accepted', 'declined', 'lapsed', 'challenged', 'struck',
]

/** The table of transitions, written by hand from the design: who may do what from where, with nothing in the way. */
const TABLE: Readonly<Record<string, Expected>> = {
  begin: { from: ['-'], who: ['entrant', 'shop', 'measurer', 'assigned_measurer', 'reviewer', 'chair', 'judge_pair', 'registrar'], to: 'draft' },
  begin_for: { from: ['-'], who: ['shop', 'measurer', 'assigned_measurer'], to: 'draft' },
  ask_measurer: { from: ['draft'], who: ['entrant'], to: 'measuring' },
  reassign: { from: ['measuring'], who: ['entrant', 'registrar'], to: 'measuring' },
  hand_back: { from: ['measuring'], who: ['assigned_measurer'], to: 'draft' },
  certify: { from: ['measuring'], who: ['assigned_measurer'], to: 'certified' },
  reopen: { from: ['certified'], who: ['entrant'], to: 'draft' },
  submit: { from: ['certified'], who: ['entrant'], to: 'in_review' },
  return: { from: ['in_review'], who: ['reviewer'], to: 'returned' },
  resubmit: { from: ['returned'], who: ['entrant'], to: 'in_review' },
  lapse: { from: ['returned', 'certified'], who: ['clock'], to: 'lapsed' },
  revive: { from: ['lapsed'], who: ['entrant'], to: 'certified' },
  recertify: { from: ['in_review', 'at_panel'], who: ['reviewer', 'chair'], to: 'measuring' },
  reclassify: { from: ['in_review'], who: ['reviewer'], to: 'in_review' },
  put_before_panel: { from: ['in_review'], who: ['reviewer'], to: 'at_panel' },
  order_remeasure: { from: ['at_panel', 'challenged'], who: ['chair'], to: 'remeasuring' },
  record_remeasure: { from: ['remeasuring'], who: ['judge_pair'], to: 'at_panel' },
  not_presented: { from: ['remeasuring'], who: ['chair'], to: 'at_panel' },
  panel_return: { from: ['at_panel'], who: ['panel'], to: 'returned' },
  accept: { from: ['at_panel'], who: ['panel'], to: 'accepted' },
  decline: { from: ['at_panel'], who: ['panel'], to: 'declined' },
  decline_ineligible: { from: ['in_review'], who: ['reviewer'], to: 'declined' },
  appeal: { from: ['declined'], who: ['entrant'], to: 'in_review' },
  appeal_strike: { from: ['struck'], who: ['entrant'], to: 'struck' },
  ask_withdrawal: { from: ['draft', 'measuring', 'certified', 'in_review', 'returned', 'at_panel', 'remeasuring', 'challenged'], who: ['entrant'], to: same },
  withdraw: { from: ['draft', 'measuring', 'certified', 'in_review', 'returned', 'at_panel', 'remeasuring', 'challenged'], who: ['entrant', 'chair'], to: 'withdrawn' },
  challenge: { from: ['accepted'], who: ['chair'], to: 'challenged' },
  uphold: { from: ['challenged'], who: ['panel'], to: 'accepted' },
  strike: { from: ['challenged'], who: ['panel'], to: 'struck' },
  reinstate: { from: ['struck'], who: ['panel'], to: 'accepted' },
  amend: { from: ['accepted'], who: ['registrar'], to: 'accepted' },
  hold: { from: EVERY_BUT_WITHDRAWN, who: ['chair', 'registrar'], to: same },
  lift_hold: { from: EVERY_BUT_WITHDRAWN, who: ['chair', 'registrar'], to: same },
  replace: { from: ['accepted'], who: ['system'], to: 'withdrawn' },
  take_over: { from: ['-'], who: ['system'], to: 'accepted' },
  take_back: { from: ['accepted'], who: ['system'], to: 'withdrawn' },
}

const decision = (vote: 'accept' | 'return' | 'decline' | 'uphold' | 'strike') =>
  ({ votes: [vote, vote, vote], ground: 'altered_parts', reason: 'Filled.', requests: ['A photograph'] }) as const

/** What a transition needs that cannot be true of every entry at once. */
const NEEDS: Readonly<Record<string, Partial<EntryFacts>>> = {
  return: { openRequests: 1 },
  lapse: { dueOn: '2026-03-01' },
  appeal: { dueOn: '2026-03-02' },
  appeal_strike: { dueOn: '2026-03-02' },
  accept: { decision: decision('accept') },
  panel_return: { decision: decision('return') },
  decline: { decision: decision('decline') },
  uphold: { decision: decision('uphold') },
  strike: { decision: decision('strike') },
  reinstate: { decision: decision('uphold') },
  lift_hold: { onHold: true },
}

const ALL_FROM: readonly From[] = ['-', ...STATES]
const kindOf = (code: string, from: From, party: Party) => {
  const facts = { ...FACTS, state: from === '-' ? null : from, ...NEEDS[code] }
  const candidate = code === 'begin_for' ? null : INPUT.candidate
  return transition(WORKFLOW_TRANSITIONS, facts, PERFORMERS[party], { transition: code, ...INPUT, candidate }, AROUND)
}

/** Where a party that may do it in general may not do it from this state: the turn is another's, or a withdrawal takes the chair. */
function isOthersTurn(code: string, from: From, party: Party): boolean {
  if (code === 'recertify') return party === (from === 'in_review' ? 'chair' : 'reviewer')
  if (code === 'withdraw') return from === 'challenged' || party === 'chair'
  return false
}

test('the table has every transition of the seeds and no other', () => {
  expect(WORKFLOW_TRANSITIONS.map(row => row.code).sort()).toEqual(Object.keys(TABLE).sort())
})

test('the seeds have every state with whose turn it is', () => {
  expect(WORKFLOW_STATES.map(state => [state.code, state.turn])).toEqual(Object.entries(WHOSE_TURN))
})

describe.each(Object.entries(TABLE))('%s', (code, expected) => {
  test.each(ALL_FROM)('from %s', (from) => {
    const answers = Object.fromEntries(PARTIES.map((party) => {
      const verdict = kindOf(code, from, party)
      return [party, verdict.ok ? verdict.to : verdict.refusal.kind]
    }))
    const wanted = Object.fromEntries(PARTIES.map((party) => {
      // before an entry begins everybody is an entrant, and nobody is its measurer, chair or owner
      const beginning = from === '-' && code !== 'begin' && code !== 'begin_for'
      if (!expected.who.includes(party)) return [party, beginning && expected.who.includes('entrant') && PERFORMERS[party].kind === 'person' ? 'wrong_state' : 'forbidden']
      if (!expected.from.includes(from)) return [party, from !== '-' && code === 'begin' && party !== 'entrant' ? 'forbidden' : 'wrong_state']
      if (isOthersTurn(code, from, party)) return [party, code === 'recertify' ? 'forbidden' : 'guards']
      return [party, typeof expected.to === 'function' ? expected.to(from) : expected.to]
    }))
    expect(answers).toEqual(wanted)
  })
})
