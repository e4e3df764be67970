/** Whole days on the calendar, without a clock or a time zone: a date is `YYYY-MM-DD` of the Gregorian calendar. */

/** Days of a 400-year cycle of the Gregorian calendar. */
const CYCLE = 146_097

function dayNumber(date: string): number {
  const match = /^(\d{4})-(\d{2})-(\d{2})$/u.exec(date)
  if (!match) throw new RangeError(`not a date: ${date}`)
  const [year, month, day] = match.slice(1).map(Number) as [number, number, number]
  // Years that begin in March put the leap day last, so that every month's offset is one formula.
  const shifted = month > 2 ? month - 3 : month + 9
  const marchYear = month > 2 ? year : year - 1
  const cycle = Math.floor(marchYear / 400)
  const yearOfCycle = marchYear - cycle * 400
  const dayOfYear = Math.floor((153 * shifted + 2) / 5) + day - 1
  return cycle * CYCLE + yearOfCycle * 365 + Math.floor(yearOfCycle / 4) - Math.floor(yearOfCycle / 100) + dayOfYear
}

/** Days from one date to another; below 0 when the second is the earlier. A text that is no date throws a RangeError. */
export function daysBetween(from: string, to: string): number {
  return dayNumber(to) - dayNumber(from)
}
