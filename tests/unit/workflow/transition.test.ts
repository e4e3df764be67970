import { describe, expect, test } from 'vitest'
import { WORKFLOW_TRANSITIONS } from '../../../seeds/reference/workflow'
import { DEFAULT_LIMITS } from '../../../shared/domain/workflow/limits'
import type { TransitionRow } from '../../../shared/domain/workflow/rows'
import { isParty, nextActs, rowForOutcome, termOf, transition } from '../../../shared/domain/workflow/transition'
import { AROUND, CANDIDATE, FACTS, IDS, PERFORMERS, person } from './facts'

const row = (change: Partial<TransitionRow>): TransitionRow =>
  ({ code: 'go', from: ['draft'], to: 'measuring', parties: ['entrant'], guards: [], effects: [], commentRequired: false, sort: 1, ...change })
const go = (change: Partial<TransitionRow>, facts: object = {}, input: object = {}, performer = PERFORMERS.entrant) =>
  transition([row(change)], { ...FACTS, ...facts }, performer, { transition: 'go', ...input }, AROUND)

describe('refusals, in their order', () => {
  test('an unknown name', () => {
    expect(transition([], FACTS, PERFORMERS.entrant, { transition: 'go' }, AROUND)).toEqual({ ok: false, refusal: { kind: 'unknown_transition' } })
  })

  test('the right goes before the state, the state before the guards', () => {
    expect(go({ from: ['struck'], guards: ['on_hold'] }, {}, {}, PERFORMERS.reviewer)).toEqual({ ok: false, refusal: { kind: 'forbidden' } })
    expect(go({ from: ['struck'], guards: ['on_hold'] })).toEqual({ ok: false, refusal: { kind: 'wrong_state', state: 'draft', from: ['struck'] } })
  })

  test('all guards that fail are told, in their order, the comment first', () => {
    expect(go({ guards: ['on_hold', 'not_on_hold', 'text_given'], commentRequired: true }, {}, { comment: '  ' })).toEqual({
      ok: false, refusal: { kind: 'guards', failed: [{ guard: 'comment_given' }, { guard: 'on_hold' }, { guard: 'text_given', items: ['text'] }] },
    })
    expect(go({ commentRequired: true }, {}, { comment: 'Yes' }).ok).toBe(true)
    expect(go({ commentRequired: true })).toMatchObject({ ok: false })
    expect(go({ commentRequired: false }).ok).toBe(true)
  })

  test('a stake goes before other guards; a turn that is another\'s is forbidden', () => {
    const stakes = { ...FACTS.stakes, declaredBy: [IDS.reviewer] }
    expect(go({ parties: ['reviewer'], guards: ['on_hold', 'no_stake'] }, { stakes }, {}, PERFORMERS.reviewer)).toEqual({ ok: false, refusal: { kind: 'stake', stakes: ['declared'] } })
    expect(go({ from: ['at_panel'], parties: ['reviewer'], guards: ['on_hold', 'own_turn'] }, { state: 'at_panel' }, {}, PERFORMERS.reviewer)).toEqual({ ok: false, refusal: { kind: 'forbidden' } })
  })
})

describe('targets', () => {
  test('the row\'s state, or the state it is in', () => {
    expect(go({})).toMatchObject({ ok: true, from: 'draft', to: 'measuring', returnTo: null, effects: [] })
    expect(go({ to: null })).toMatchObject({ to: 'draft' })
  })

  test('back to whoever asked, when somebody did, and the memory is spent', () => {
    expect(go({ effects: ['go_back'] })).toMatchObject({ to: 'measuring', returnTo: null })
    expect(go({ effects: ['go_back'] }, { returnTo: 'at_panel' })).toMatchObject({ to: 'at_panel', returnTo: null })
    expect(go({ effects: ['remember_from'] })).toMatchObject({ to: 'measuring', returnTo: 'draft' })
    expect(go({}, { returnTo: 'in_review' })).toMatchObject({ to: 'measuring', returnTo: 'in_review' })
  })

  test('an entry begun for somebody goes to the bench when its measurer is named', () => {
    const begin = { from: [], to: 'draft', parties: ['measurer'], effects: ['to_bench_when_named'] } as const
    expect(go(begin, { state: null }, { candidate: CANDIDATE }, PERFORMERS.measurer)).toMatchObject({ from: null, to: 'measuring' })
    expect(go(begin, { state: null }, { candidate: null }, PERFORMERS.measurer)).toMatchObject({ from: null, to: 'draft' })
    expect(go({ ...begin, effects: [] }, { state: null }, { candidate: CANDIDATE }, PERFORMERS.measurer)).toMatchObject({ to: 'draft' })
  })
})

describe('terms', () => {
  test.each([
    ['certified', '2026-05-31'], ['returned', '2026-05-31'], ['declined', '2026-04-01'], ['struck', '2026-04-01'], ['challenged', '2026-04-01'],
    ['draft', null], ['measuring', null], ['in_review', null], ['at_panel', null], ['remeasuring', null], ['accepted', null], ['lapsed', null], ['withdrawn', null],
  ] as const)('%s', (state, due) => {
    expect(termOf(state, '2026-03-02', DEFAULT_LIMITS)).toBe(due)
  })

  test('the three terms are the registrar\'s to set, each by itself', () => {
    const limits = { ...DEFAULT_LIMITS, lapseDays: 1, appealDays: 2, answerDays: 3 }
    expect([termOf('returned', '2026-03-02', limits), termOf('declined', '2026-03-02', limits), termOf('challenged', '2026-03-02', limits)]).toEqual(['2026-03-03', '2026-03-04', '2026-03-05'])
  })

  test('a move that stays in its state leaves the running term; one that leaves begins another', () => {
    expect(go({ to: null }, { dueOn: '2026-03-09' })).toMatchObject({ dueOn: '2026-03-09' })
    expect(go({ to: 'returned' }, { dueOn: '2026-03-09' })).toMatchObject({ dueOn: '2026-05-31' })
    expect(go({ to: 'in_review' }, { dueOn: '2026-03-09' })).toMatchObject({ dueOn: null })
  })
})

describe('parties', () => {
  test('a relation to the entry and the role that goes with it, both', () => {
    expect(isParty('assigned_measurer', person(IDS.measurer), FACTS)).toBe(false)
    expect(isParty('assigned_measurer', person(IDS.measurer, ['measurer']), { ...FACTS, measurerUserId: 99 })).toBe(false)
    expect(isParty('chair', person(IDS.chair), FACTS)).toBe(false)
    expect(isParty('chair', person(IDS.judgeA, ['judge']), FACTS)).toBe(false)
    expect(isParty('judge_pair', person(IDS.judgeB, ['judge']), FACTS)).toBe(true)
    expect(isParty('judge_pair', person(IDS.judgeB), FACTS)).toBe(false)
    expect(isParty('judge_pair', person(IDS.chair, ['judge']), FACTS)).toBe(false)
    expect(isParty('judge_pair', person(IDS.judgeB, ['judge']), { ...FACTS, second: { ...FACTS.second, pair: null } })).toBe(false)
    expect(isParty('entrant', person(IDS.stranger), FACTS)).toBe(false)
    expect(isParty('entrant', person(IDS.stranger), { ...FACTS, state: null })).toBe(true)
    expect(isParty('entrant', person(IDS.stranger), { ...FACTS, ownerUserId: null })).toBe(false)
  })

  test('the panel, the clock and the system are nobody\'s role', () => {
    for (const party of ['panel', 'clock', 'system'] as const) {
      expect(isParty(party, PERFORMERS[party], FACTS)).toBe(true)
      expect(isParty(party, person(IDS.owner, ['registrar', 'judge']), FACTS)).toBe(false)
      expect(isParty('registrar', PERFORMERS[party], FACTS)).toBe(false)
    }
  })
})

describe('what may be done next', () => {
  const next = (facts: object, performer = PERFORMERS.entrant) => nextActs(WORKFLOW_TRANSITIONS, { ...FACTS, ...facts }, performer, AROUND)

  test('only from this state, only by this party, with what the request has to bring', () => {
    expect(next({})).toEqual([
      { transition: 'ask_measurer', to: 'measuring', failed: [], stakes: [], asks: ['measurer_fit', 'measurer_without_stake'] },
      { transition: 'ask_withdrawal', to: 'draft', failed: [], stakes: [], asks: ['text_given'] },
      { transition: 'withdraw', to: 'withdrawn', failed: [], stakes: [], asks: ['confirmed'] },
    ])
    expect(next({}, PERFORMERS.reviewer)).toEqual([])
  })

  test('what stands in the way is said', () => {
    const submit = next({ state: 'certified', missingPapers: ['photo_left'], fee: { due: 1, settled: 0, waived: false } }).find(act => act.transition === 'submit')
    expect(submit!.failed.map(failure => failure.guard)).toEqual(['papers_complete', 'fee_settled'])
  })

  test('a stake is told apart from guards', () => {
    const acts = next({ state: 'in_review', stakes: { ...FACTS.stakes, declaredBy: [IDS.reviewer] } }, PERFORMERS.reviewer)
    expect(acts.find(act => act.transition === 'put_before_panel')).toMatchObject({ stakes: ['declared'], failed: [] })
    expect(next({ state: 'in_review' }, PERFORMERS.reviewer).find(act => act.transition === 'put_before_panel')).toMatchObject({ stakes: [] })
  })

  test('a person is asked for ground and reason and a comment', () => {
    const acts = next({ state: 'in_review' }, PERFORMERS.reviewer)
    expect(acts.find(act => act.transition === 'decline_ineligible')!.asks).toEqual(['ground_and_reason', 'ground_fits'])
    expect(acts.find(act => act.transition === 'recertify')!.asks).toEqual(['comment_given'])
    expect(next({ state: 'struck', decision: null }, PERFORMERS.panel).find(act => act.transition === 'reinstate')!.failed.map(one => one.guard)).toContain('reason_given')
    const appeal = nextActs([row({ guards: ['reason_given'] })], FACTS, PERFORMERS.entrant, AROUND)
    expect(appeal).toMatchObject([{ failed: [], asks: ['reason_given'] }])
  })

  test('what is another\'s turn, or takes the chair, is not offered', () => {
    expect(next({ state: 'at_panel' }, PERFORMERS.reviewer).map(act => act.transition)).not.toContain('recertify')
    expect(next({ state: 'at_panel' }, PERFORMERS.chair).map(act => act.transition)).toEqual(['recertify', 'order_remeasure', 'hold'])
    expect(next({ state: 'at_panel', onHold: true }, PERFORMERS.chair).map(act => act.transition)).toContain('lift_hold')
    expect(next({ state: 'draft', onHold: true }).map(act => act.transition)).not.toContain('withdraw')
  })
})

describe('decisions of the panel as transitions', () => {
  test.each([
    ['at_panel', 'accept', 'accept'], ['at_panel', 'return', 'panel_return'], ['at_panel', 'decline', 'decline'],
    ['challenged', 'uphold', 'uphold'], ['challenged', 'strike', 'strike'], ['struck', 'uphold', 'reinstate'],
    ['struck', 'strike', undefined], ['in_review', 'accept', undefined],
  ] as const)('%s, %s', (state, outcome, code) => {
    expect(rowForOutcome(WORKFLOW_TRANSITIONS, state, outcome)?.code).toBe(code)
  })

  test('a row that only names the outcome is not the panel\'s', () => {
    expect(rowForOutcome([row({ from: ['at_panel'], guards: ['panel_says_accept'] })], 'at_panel', 'accept')).toBeUndefined()
  })
})

test('the rows of the seeds ask what the design asks', () => {
  const asks = (code: string) => WORKFLOW_TRANSITIONS.find(one => one.code === code)!
  expect(asks('certify').guards).toEqual(['sheet_complete', 'sheet_of_class', 'no_blocking_slip', 'dried_long_enough', 'accredited_when_measured', 'no_stake', 'signed_by_password'])
  expect(asks('accept').guards).toEqual(['quorum', 'panel_says_accept', 'second_measuring_done', 'standing_net_at_minimum', 'one_live_record', 'not_on_hold'])
  expect(WORKFLOW_TRANSITIONS.filter(one => one.commentRequired).map(one => one.code)).toEqual(
    ['hand_back', 'recertify', 'reclassify', 'order_remeasure', 'not_presented', 'challenge', 'amend', 'hold', 'lift_hold'])
  expect(WORKFLOW_TRANSITIONS.filter(one => one.parties.includes('panel')).every(one => one.guards.includes('quorum'))).toBe(true)
})
