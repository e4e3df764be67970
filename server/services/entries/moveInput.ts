import type { Ground } from '../../../shared/domain/workflow/eligibility'

/** What comes with a transition, as the route read it. */
export interface MoveInput {
  readonly transition: string
  readonly version: number
  readonly comment?: string
  readonly confirm?: boolean
  /** uid of the measurer that is asked */
  readonly measurer?: string
  readonly place?: string
  /** ISO 8601 */
  readonly at?: string
  readonly ground?: Ground
  readonly reason?: string
  readonly text?: string
  readonly password?: string
  /** code of the second factor, where the account has one */
  readonly code?: string
  readonly category?: string
  /** uid of the sitting, or of the challenge report */
  readonly sitting?: string
  readonly challenge?: string
  /** uids of the pair for a second measuring */
  readonly judges?: readonly [string, string]
  readonly changes?: Amendment
}

/** The same with uids of the request turned into rows. */
export interface ResolvedInput extends MoveInput {
  readonly measurerUserId?: number
  readonly judgeUserIds?: readonly [number, number]
  /** the sitting whose docket takes the entry */
  readonly sittingId?: number
  readonly at?: string
}

/** What an amendment may change on an accepted record. */
export interface Amendment {
  readonly hunterName?: string
  readonly finderName?: string
  readonly ownerName?: string
  readonly guideName?: string
  readonly hunterPrintedAs?: 'full' | 'initials' | 'withheld'
  readonly takenOn?: string
  readonly monthPublic?: boolean
  readonly district?: string
  readonly method?: string
  readonly sex?: string
}
