import type { Vote } from '#shared/domain/workflow/panel'
import type { State } from '#shared/domain/workflow/states'

export type SittingState = 'planned' | 'open' | 'closed'

export interface SittingLine {
  readonly id: string
  readonly heldOn: string
  readonly place: string
  readonly state: SittingState
  readonly chair: string
  readonly isChair: boolean
  readonly isJudge: boolean
  readonly items: number
  /** items on which the viewer has still to vote; 0 for who is no judge of it */
  readonly toVote: number
  readonly daysUntil: number
}

/** An entry before the panel that no sitting has yet. */
export interface WaitingItem {
  readonly id: string
  readonly entryId: string
  readonly kind: 'entry' | 'appeal' | 'challenge'
  readonly category: string
  readonly district: string | null
  readonly person: string | null
  readonly net: string | null
  readonly days: number
}

export interface JudgeChoice { readonly id: string, readonly name: string }

export interface PanelAnswer {
  readonly sittings: readonly SittingLine[]
  readonly waiting: readonly WaitingItem[]
  /** everybody who is a judge today, for whoever may plan */
  readonly judges: readonly JudgeChoice[]
  readonly mayPlan: boolean
  readonly today: string
}

export interface BallotShown {
  readonly judge: string
  readonly vote: Vote
  readonly ground: string | null
  readonly reason: string | null
  readonly requests: readonly string[]
}

export interface DocketItem {
  readonly id: string
  readonly entryId: string
  readonly kind: 'entry' | 'appeal' | 'challenge'
  readonly position: number
  readonly state: 'open' | 'decided' | 'carried' | 'applied' | 'removed'
  readonly entryState: State
  readonly category: string
  readonly district: string | null
  readonly person: string | null
  /** null where the viewer measures the animal blind, or has a stake */
  readonly net: string | null
  readonly secondDue: boolean
  readonly pair: readonly string[]
  readonly outcome: string | null
  readonly ground: string | null
  readonly reason: string | null
  /** ballots that count towards the quorum, and judges who stand aside; never whose */
  readonly voting: number
  readonly standingAside: number
  readonly mine: Omit<BallotShown, 'judge'> | null
  /** the viewer's stakes in the animal */
  readonly stakes: readonly string[]
  readonly onHold: boolean
  /** every ballot, once the sitting is closed */
  readonly ballots: readonly BallotShown[]
}

export interface SittingShown {
  readonly id: string
  readonly heldOn: string
  readonly place: string
  readonly state: SittingState
  readonly openedAt: string | null
  readonly closedAt: string | null
  readonly chair: JudgeChoice
  readonly isChair: boolean
  readonly isJudge: boolean
  readonly mayPlan: boolean
  readonly judges: readonly (JudgeChoice & { readonly present: boolean, readonly isMe: boolean })[]
  readonly quorum: number
  readonly items: readonly DocketItem[]
  readonly society: string
}
