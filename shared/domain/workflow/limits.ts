/** Day counts and limits that the registrar may change. Days are whole days in the registry's zone. */
export interface WorkflowLimits {
  readonly dryingDays: number
  readonly lapseDays: number
  /** days after the last touch on which the entrant is reminded */
  readonly reminderDays: readonly number[]
  readonly appealDays: number
  /** days before its end on which the entrant is reminded of the appeal */
  readonly appealReminderDays: number
  readonly answerDays: number
  readonly accreditationReminderDays: number
  readonly sittingReminderDays: number
  /** voting judges; never below 3 */
  readonly quorum: number
  /** places that make a second measuring due */
  readonly firstPlaces: number
  /** under so many records only a new best makes it due */
  readonly smallList: number
}

export const LEAST_QUORUM = 3

export const DEFAULT_LIMITS: WorkflowLimits = {
  dryingDays: 60,
  lapseDays: 90,
  reminderDays: [14, 75],
  appealDays: 30,
  appealReminderDays: 7,
  answerDays: 30,
  accreditationReminderDays: 30,
  sittingReminderDays: 3,
  quorum: 3,
  firstPlaces: 5,
  smallList: 20,
}
