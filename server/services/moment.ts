import { randomBytes } from 'node:crypto'
import { sqlTime } from '../../db/time'
import type { Day } from '../../shared/domain/dates'
import { uuidv7 } from '../../shared/uuid'
import { dayIn } from '../clock'
import type { Registry } from '../composition'

/** One instant, in the three forms that services need; taken once an act, so that everything in it bears the same time. */
export interface Moment {
  readonly now: Date
  /** as the database writes it */
  readonly at: string
  /** the registry's own day */
  readonly today: Day
  readonly zone: string
}

export async function momentOf(registry: Registry): Promise<Moment> {
  const { timeZone } = await registry.settings()
  const now = registry.clock.now()
  return { now, at: sqlTime(now), today: dayIn(timeZone, now), zone: timeZone }
}

/** A new outside id. */
export function newUid(now: Date): string {
  return uuidv7(now.getTime(), randomBytes(16))
}
