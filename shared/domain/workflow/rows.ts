import type { EffectName } from './effects'
import type { GuardName } from './guards'
import type { State, Turn } from './states'

/** Who can perform a transition: a relation to this entry, not only a role. */
export const PARTIES = [
  'entrant', 'shop', 'measurer', 'assigned_measurer', 'reviewer', 'chair', 'judge_pair', 'panel', 'registrar', 'clock', 'system',
] as const
export type Party = (typeof PARTIES)[number]

/** A state as the registry keeps it. */
export interface StateRow {
  readonly code: State
  readonly turn: Turn
  readonly sort: number
}

/** A transition as the registry keeps it: data, numbered with its workflow version. */
export interface TransitionRow {
  readonly code: string
  /** states it leaves; empty where it begins an entry */
  readonly from: readonly State[]
  /** state it leads to; null where the entry stays in its state */
  readonly to: State | null
  readonly parties: readonly Party[]
  readonly guards: readonly GuardName[]
  readonly effects: readonly EffectName[]
  readonly commentRequired: boolean
  readonly sort: number
}
