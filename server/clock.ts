import { dateFormat } from '../shared/intl'

/** Where the time comes from. SQL never asks the database server for it, so that tests and demo data can set it. */
export interface Clock {
  now(): Date
}

export const systemClock: Clock = { now: () => new Date() }

/** A clock that stands still until it is moved. */
export function fixedClock(start: Date | string): Clock & { set(to: Date | string): void } {
  let current = new Date(start)
  return {
    now: () => new Date(current),
    set: (to) => { current = new Date(to) },
  }
}

/** The calendar day (`YYYY-MM-DD`) of an instant in a time zone: the registry's zone decides days. */
export function dayIn(zone: string, instant: Date): string {
  return dateFormat('en-CA', { timeZone: zone, year: 'numeric', month: '2-digit', day: '2-digit' }).format(instant)
}
