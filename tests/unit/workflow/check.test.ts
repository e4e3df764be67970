import { describe, expect, test } from 'vitest'
import { WORKFLOW_STATES, WORKFLOW_TRANSITIONS } from '../../../seeds/reference/workflow'
import { checkWorkflow, type WorkflowInDoubt } from '../../../shared/domain/workflow/check'
import { isEffect } from '../../../shared/domain/workflow/effects'
import { DEFAULT_LIMITS } from '../../../shared/domain/workflow/limits'

const SEEDED: WorkflowInDoubt = { states: WORKFLOW_STATES, transitions: WORKFLOW_TRANSITIONS, limits: DEFAULT_LIMITS }
const withRow = (code: string, change: object): WorkflowInDoubt => ({ ...SEEDED, transitions: SEEDED.transitions.map(row => row.code === code ? { ...row, ...change } : row) })
const without = (code: string, guard: string) => withRow(code, { guards: WORKFLOW_TRANSITIONS.find(row => row.code === code)!.guards.filter(one => one !== guard) })

test('the seeded workflow can be used', () => {
  expect(checkWorkflow(SEEDED)).toEqual([])
  expect(WORKFLOW_TRANSITIONS.flatMap(row => row.effects).every(isEffect)).toBe(true)
  expect(isEffect('no_such_effect')).toBe(false)
  expect(isEffect(null)).toBe(false)
})

describe('names that the program does not know', () => {
  test.each([
    ['a state it leaves', { from: ['draft', 'limbo'] }, { code: 'unknown_state', where: 'submit', name: 'limbo' }],
    ['a state it leads to', { to: 'limbo' }, { code: 'unknown_state', where: 'submit', name: 'limbo' }],
    ['a party', { parties: ['anybody'] }, { code: 'unknown_party', where: 'submit', name: 'anybody' }],
    ['no party', { parties: [] }, { code: 'no_party', where: 'submit', name: '' }],
    ['a guard', { guards: ['wishes'] }, { code: 'unknown_guard', where: 'submit', name: 'wishes' }],
    ['an effect', { effects: ['explode'] }, { code: 'unknown_effect', where: 'submit', name: 'explode' }],
  ])('%s', (_, change, problem) => {
    expect(checkWorkflow(withRow('submit', change))).toEqual([problem])
  })

  test('no target is no unknown target', () => {
    expect(checkWorkflow(withRow('submit', { to: null }))).toEqual([])
  })

  test('states: missing, unknown, turn, twice', () => {
    expect(checkWorkflow({ ...SEEDED, states: WORKFLOW_STATES.slice(1) })).toEqual([{ code: 'missing_state', where: 'states', name: 'draft' }])
    expect(checkWorkflow({ ...SEEDED, states: [...WORKFLOW_STATES, { code: 'limbo', turn: 'nobody' }] })).toEqual([{ code: 'unknown_state', where: 'limbo', name: 'limbo' }])
    expect(checkWorkflow({ ...SEEDED, states: WORKFLOW_STATES.map(state => state.code === 'draft' ? { ...state, turn: 'moon' } : state) })).toEqual([{ code: 'unknown_turn', where: 'draft', name: 'moon' }])
    expect(checkWorkflow({ ...SEEDED, states: [...WORKFLOW_STATES, WORKFLOW_STATES[0]!] })).toEqual([{ code: 'twice', where: 'draft', name: 'draft' }])
    expect(checkWorkflow({ ...SEEDED, transitions: [...WORKFLOW_TRANSITIONS, WORKFLOW_TRANSITIONS[0]!] })).toEqual([{ code: 'twice', where: 'begin', name: 'begin' }])
  })
})

describe('guards for stake, signature and quorum stay', () => {
  test.each([
    ['certify', 'no_stake'], ['certify', 'signed_by_password'], ['ask_measurer', 'measurer_without_stake'], ['reassign', 'measurer_without_stake'],
    ['begin_for', 'walk_in_measurable'], ['return', 'no_stake'], ['put_before_panel', 'no_stake'], ['decline_ineligible', 'no_stake'],
    ['order_remeasure', 'no_stake'], ['order_remeasure', 'pair_named'], ['record_remeasure', 'no_stake'], ['record_remeasure', 'joint_sheet_signed_by_both'],
    ['accept', 'quorum'], ['decline', 'quorum'], ['panel_return', 'quorum'], ['uphold', 'quorum'], ['strike', 'quorum'], ['reinstate', 'quorum'],
    ['challenge', 'no_stake'], ['amend', 'no_stake'], ['hold', 'no_stake'],
  ])('%s keeps %s', (code, guard) => {
    expect(checkWorkflow(without(code, guard))).toEqual([{ code: 'guard_removed', where: code, name: guard }])
  })

  test('others may go', () => {
    expect(checkWorkflow(without('submit', 'papers_complete'))).toEqual([])
    expect(checkWorkflow(without('accept', 'second_measuring_done'))).toEqual([])
  })
})

describe('limits', () => {
  const limits = (change: object) => checkWorkflow({ ...SEEDED, limits: { ...DEFAULT_LIMITS, ...change } })
  test('a quorum is never below three', () => {
    expect(limits({ quorum: 3 })).toEqual([])
    expect(limits({ quorum: 2 })).toEqual([{ code: 'quorum_too_low', where: 'quorum', name: '2' }])
  })

  test('whole numbers that are not below zero', () => {
    expect(limits({ dryingDays: 0 })).toEqual([])
    expect(limits({ lapseDays: -1 })).toEqual([{ code: 'bad_limit', where: 'lapseDays', name: '-1' }])
    expect(limits({ appealDays: 1.5 })).toEqual([{ code: 'bad_limit', where: 'appealDays', name: '1.5' }])
    expect(limits({ reminderDays: [14, -75] })).toEqual([{ code: 'bad_limit', where: 'reminderDays', name: '-75' }])
  })

  test('the design\'s own day counts are what a registry begins with', () => {
    expect(DEFAULT_LIMITS).toEqual({
      dryingDays: 60, lapseDays: 90, reminderDays: [14, 75], appealDays: 30, appealReminderDays: 7, answerDays: 30, accreditationReminderDays: 30,
      sittingReminderDays: 3, quorum: 3, firstPlaces: 5, smallList: 20,
    })
  })
})
