/**
 * What can wait for somebody, by what they are asked to do. The first ones are an entrant's, then whoever began an entry for
 * another, the bench, the office, the panel, its chair, and the registrar.
 */
export const DESK_KINDS = [
  'finish_draft', 'submit', 'answer', 'appeal', 'revive', 'answer_challenge', 'unclaimed',
  'measure', 'review', 'check_report', 'plan_sitting', 'read_file', 'vote', 'second_measuring', 'open_sitting', 'close_sitting', 'role_proposal',
] as const
export type DeskKind = (typeof DESK_KINDS)[number]

/** States that the records office sees: everything from the first submission on, and what is certified, for its fee. */
export const OFFICE_STATES = [
  'in_review', 'certified', 'returned', 'at_panel', 'remeasuring', 'accepted', 'declined', 'lapsed', 'challenged', 'struck', 'withdrawn',
] as const
export type OfficeState = (typeof OFFICE_STATES)[number]

/** Orders of the office's queue: by the time an entry has stood in its state, longest first, or by its net. */
export const OFFICE_SORTS = ['age', '-age', 'net', '-net'] as const
/** Whose files the queue shows: everybody's, the reader's own, or those that nobody has taken. */
export const OFFICE_KEEPERS = ['anyone', 'me', 'nobody'] as const

/** What of the office's queue is asked for. */
export interface QueueQuestion {
  readonly state: OfficeState | 'open'
  readonly category?: string
  readonly district?: string
  readonly keeper: (typeof OFFICE_KEEPERS)[number]
  readonly q?: string
  readonly sort: (typeof OFFICE_SORTS)[number]
  readonly limit: number
}
