import { isEffect } from './effects'
import type { GuardName } from './guards'
import { isGuard } from './guards'
import type { WorkflowLimits } from './limits'
import { LEAST_QUORUM } from './limits'
import type { Party } from './rows'
import { PARTIES } from './rows'
import { STATES, TURNS, isState } from './states'

/** A workflow version as it comes out of the database: nothing in it is known to be right yet. */
export interface WorkflowInDoubt {
  readonly states: readonly { readonly code: string, readonly turn: string }[]
  readonly transitions: readonly {
    readonly code: string
    readonly from: readonly string[]
    readonly to: string | null
    readonly parties: readonly string[]
    readonly guards: readonly string[]
    readonly effects: readonly string[]
  }[]
  readonly limits: WorkflowLimits
}

export const WORKFLOW_PROBLEMS = [
  'missing_state', 'unknown_state', 'unknown_turn', 'unknown_party', 'unknown_guard', 'unknown_effect', 'guard_removed', 'no_party',
  'twice', 'quorum_too_low', 'bad_limit',
] as const

export interface WorkflowProblem {
  readonly code: (typeof WORKFLOW_PROBLEMS)[number]
  /** the state, transition or limit that it stands in */
  readonly where: string
  /** the name that is unknown or missing */
  readonly name: string
}

interface Protection {
  readonly guard: GuardName
  readonly where: (row: { parties: readonly string[], effects: readonly string[] }) => boolean
}

/** Parties that decide about somebody else's animal. A measurer decides by signing, not by handing it back. */
const DECIDING: readonly Party[] = ['reviewer', 'chair', 'judge_pair']
const hasParty = (parties: readonly string[], wanted: readonly Party[]) => wanted.some(party => parties.includes(party))

/** Where guards for stake, signature and quorum belong, told by what a transition does and who performs it. */
const PROTECTIONS: readonly Protection[] = [
  { guard: 'no_stake', where: row => hasParty(row.parties, DECIDING) || row.effects.includes('lock_sheet') || row.effects.includes('amend_record') },
  { guard: 'measurer_without_stake', where: row => row.effects.includes('assign_measurer') && !row.effects.includes('to_bench_when_named') },
  { guard: 'walk_in_measurable', where: row => row.effects.includes('to_bench_when_named') },
  { guard: 'signed_by_password', where: row => row.effects.includes('lock_sheet') },
  { guard: 'pair_named', where: row => row.effects.includes('plan_remeasuring') },
  { guard: 'joint_sheet_signed_by_both', where: row => row.effects.includes('stand_panel_sheet') },
  { guard: 'quorum', where: row => row.parties.includes('panel') },
]

function unknown(code: WorkflowProblem['code'], where: string, names: readonly string[], known: (name: string) => boolean): WorkflowProblem[] {
  return names.filter(name => !known(name)).map(name => ({ code, where, name }))
}

function twice(codes: readonly string[]): WorkflowProblem[] {
  return codes.filter((code, place) => codes.indexOf(code) !== place).map(code => ({ code: 'twice', where: code, name: code }))
}

function limitProblems(limits: WorkflowLimits): WorkflowProblem[] {
  const named = Object.entries(limits).flatMap(([name, value]) => [value].flat().map(number => [name, number as number] as const))
  const bad = named.filter(([, value]) => !Number.isInteger(value) || value < 0)
    .map(([name, value]): WorkflowProblem => ({ code: 'bad_limit', where: name, name: String(value) }))
  return limits.quorum < LEAST_QUORUM ? [...bad, { code: 'quorum_too_low', where: 'quorum', name: String(limits.quorum) }] : bad
}

/** Everything that is wrong with a workflow version; the start refuses one with a problem. Empty when it can be used. */
export function checkWorkflow(workflow: WorkflowInDoubt): WorkflowProblem[] {
  const codes = workflow.states.map(state => state.code)
  return [
    ...unknown('missing_state', 'states', STATES, state => codes.includes(state)),
    ...workflow.states.flatMap(state => [
      ...unknown('unknown_state', state.code, [state.code], isState),
      ...unknown('unknown_turn', state.code, [state.turn], turn => (TURNS as readonly string[]).includes(turn)),
    ]),
    ...twice(codes),
    ...twice(workflow.transitions.map(row => row.code)),
    ...workflow.transitions.flatMap(row => [
      ...unknown('unknown_state', row.code, row.to === null ? row.from : [...row.from, row.to], isState),
      ...unknown('unknown_party', row.code, row.parties, party => (PARTIES as readonly string[]).includes(party)),
      ...unknown('unknown_guard', row.code, row.guards, isGuard),
      ...unknown('unknown_effect', row.code, row.effects, isEffect),
      ...(row.parties.length === 0 ? [{ code: 'no_party', where: row.code, name: '' } as const] : []),
      ...PROTECTIONS.filter(protection => protection.where(row) && !row.guards.includes(protection.guard))
        .map((protection): WorkflowProblem => ({ code: 'guard_removed', where: row.code, name: protection.guard })),
    ]),
    ...limitProblems(workflow.limits),
  ]
}
