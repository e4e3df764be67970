import { addDays, type Day } from '#shared/domain/dates'
import type { Random } from './random'

/** A moment of an ordinary working day in the society's zone (UTC-7 or UTC-6), as an instant. */
export function atWork(day: Day, random: Random): Date {
  return new Date(Date.parse(`${day}T15:30:00.000Z`) + random.whole(0, 7 * 3600) * 1000 + random.whole(0, 999))
}

/** A moment of the evening before midnight in the society's zone, when people sit down with their papers. */
export function atHome(day: Day, random: Random): Date {
  return new Date(Date.parse(`${day}T22:10:00.000Z`) + random.whole(0, 6 * 3600) * 1000 + random.whole(0, 999))
}

/** A day so many days later; the number comes from the stream, both ends included. */
export const later = (day: Day, from: number, to: number, random: Random): Day => addDays(day, random.whole(from, to))

/** Saturdays on which the panel sits: the third of March, June, September and December. */
export function sittingDays(fromYear: number, until: Day): Day[] {
  const days: Day[] = []
  for (let year = fromYear; year <= Number(until.slice(0, 4)); year++) {
    for (const month of ['03', '06', '09', '12']) {
      const first = new Date(`${year}-${month}-01T00:00:00Z`).getUTCDay()
      const day = `${year}-${month}-${String(1 + ((6 - first + 7) % 7) + 14).padStart(2, '0')}`
      if (day <= until) days.push(day)
    }
  }
  return days
}
