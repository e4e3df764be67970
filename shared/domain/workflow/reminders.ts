import type { Day } from '../dates'
import { daysBetween } from '../dates'
import type { WorkflowLimits } from './limits'
import type { State } from './states'

/** Notices that the clock alone sends about an entry. */
export const REMINDERS = ['untouched_returned', 'untouched_certified', 'appeal_ends'] as const
export type Reminder = (typeof REMINDERS)[number]

export interface RunningTerm {
  readonly state: State
  /** last day of the running term */
  readonly dueOn: Day
  readonly appealed: boolean
}

/**
 * The reminder that is due on a day, with the number of days it stands for; null when none is. Returned and certified entries
 * are told after so many days without a touch, counted back from the term's end; a declined one so many days before the appeal
 * ends. A day that was missed is made up until the next one.
 */
export function reminderDue(term: RunningTerm, today: Day, limits: WorkflowLimits): { reminder: Reminder, day: number } | null {
  const left = daysBetween(today, term.dueOn)
  if (left < 0) return null
  if (term.state === 'declined') {
    return !term.appealed && left <= limits.appealReminderDays ? { reminder: 'appeal_ends', day: limits.appealReminderDays } : null
  }
  if (term.state !== 'returned' && term.state !== 'certified') return null
  const untouched = limits.lapseDays - left
  const reached = limits.reminderDays.filter(day => day <= untouched)
  return reached.length === 0 ? null : { reminder: term.state === 'returned' ? 'untouched_returned' : 'untouched_certified', day: Math.max(...reached) }
}
