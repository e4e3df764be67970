/**
 * Days as the registry counts them. A day is a string `YYYY-MM-DD` in the registry's own zone; which day an instant falls on
 * is found outside the domain, so that nothing here depends on a clock, a zone or an environment.
 */
export type Day = string

const DAY = /^(\d{4})-(\d{2})-(\d{2})$/
const MS_A_DAY = 86_400_000

/** True for a day that exists in the Gregorian calendar, years 1000 to 9999 (what a DATE column holds). */
export function isDay(text: string): boolean {
  const parts = DAY.exec(text)
  if (!parts) return false
  const number = Date.UTC(Number(parts[1]), Number(parts[2]) - 1, Number(parts[3]))
  return Number(parts[1]) >= 1000 && dayOfNumber(number / MS_A_DAY) === text
}

function numberOfDay(day: Day): number {
  const parts = DAY.exec(day)
  if (!parts || !isDay(day)) throw new RangeError(`not a day: ${day}`)
  return Date.UTC(Number(parts[1]), Number(parts[2]) - 1, Number(parts[3])) / MS_A_DAY
}

function dayOfNumber(number: number): Day {
  return new Date(number * MS_A_DAY).toISOString().slice(0, 10)
}

/** The day `days` after `day`; negative goes back. Throws RangeError for a text that is no day. */
export function addDays(day: Day, days: number): Day {
  return dayOfNumber(numberOfDay(day) + days)
}

/** Days from `from` to `to`: 0 on the same day, negative when `to` is earlier. */
export function daysBetween(from: Day, to: Day): number {
  return numberOfDay(to) - numberOfDay(from)
}

/** Last day of a term that began on `from` (day 0) and lasts `days`. The term ends at 24:00 of that day. */
export function lastDayOfTerm(from: Day, days: number): Day {
  return addDays(from, days)
}

/** True from the first day after the term's last one. */
export function isOver(lastDay: Day, today: Day): boolean {
  return today > lastDay
}

/** The first day on which a head that dries since `driedSince` (day 0) may be measured: day 60 where `days` is 60. */
export function firstMeasuringDay(driedSince: Day, days: number): Day {
  return addDays(driedSince, days)
}

export const DATE_PRECISIONS = ['day', 'month', 'year', 'unknown'] as const
export type DatePrecision = (typeof DATE_PRECISIONS)[number]

/** A date as far as it is known: first and last day it can have been. */
export interface InexactDate {
  readonly first: Day
  readonly last: Day
  readonly precision: DatePrecision
}

/** First and last day of a date of which nothing is known. */
export const EARLIEST_DAY: Day = '1000-01-01'
export const LATEST_DAY: Day = '9999-12-31'

/** Reads `YYYY`, `YYYY-MM`, `YYYY-MM-DD` or `unknown`. Null for anything else, so that the caller can name the field. */
export function parseInexactDate(text: string): InexactDate | null {
  if (text === 'unknown') return { first: EARLIEST_DAY, last: LATEST_DAY, precision: 'unknown' }
  if (/^\d{4}$/.test(text)) return isDay(`${text}-01-01`) ? { first: `${text}-01-01`, last: `${text}-12-31`, precision: 'year' } : null
  if (/^\d{4}-\d{2}$/.test(text)) {
    const first = `${text}-01`
    if (!isDay(first)) return null
    const last = lastDayOfMonth(first)
    return { first, last, precision: 'month' }
  }
  return isDay(text) ? { first: text, last: text, precision: 'day' } : null
}

function lastDayOfMonth(first: Day): Day {
  const nextMonth = addDays(first, 31).slice(0, 7)
  return addDays(`${nextMonth}-01`, -1)
}

/** Writes a date as far as it is known: `YYYY-MM-DD`, `YYYY-MM`, `YYYY` or `unknown`. */
export function formatInexactDate(date: InexactDate): string {
  switch (date.precision) {
    case 'day': return date.first
    case 'month': return date.first.slice(0, 7)
    case 'year': return date.first.slice(0, 4)
    case 'unknown': return 'unknown'
  }
}

/**
 * What of a date of taking may be public: the year, or the month with consent; null where not even the year is known.
 * The day is never public.
 */
export function publicDate(date: InexactDate, show: 'year' | 'month'): string | null {
  if (date.precision === 'unknown') return null
  if (date.precision === 'year' || show === 'year') return date.first.slice(0, 4)
  return date.first.slice(0, 7)
}
