import { addDays, type Day } from '#shared/domain/dates'
import { atHome, atWork } from './clock'
import type { PlannedRecord } from './plan'
import type { Random } from './random'

/** The moments of an entry that went the whole way. Every one lies after the one before it. */
export interface Timeline {
  readonly begunAt: Date
  readonly askedAt: Date
  readonly certifiedAt: Date
  readonly paidAt: Date
  readonly submittedAt: Date
  readonly returned: { readonly at: Date, readonly resubmittedAt: Date } | null
  readonly beforePanelAt: Date
  readonly second: { readonly orderedAt: Date, readonly day: Day, readonly recordedAt: Date } | null
  readonly acceptedAt: Date
}

/** Lays the days of a plan out as moments; `second` where a second measuring was due. */
export function timelineOf(plan: PlannedRecord, second: boolean, random: Random): Timeline {
  const { measuredOn, submittedOn, acceptedOn } = plan
  const begunAt = atHome(addDays(measuredOn, -random.whole(9, 40)), random)
  const submittedAt = new Date(Date.parse(`${submittedOn}T22:30:00.000Z`) + random.whole(0, 4 * 3600) * 1000)
  // The office has three weeks at the least between a submission and the sitting.
  const returned = random.chance(0.2)
    ? { at: atWork(addDays(submittedOn, random.whole(2, 5)), random), resubmittedAt: atHome(addDays(submittedOn, random.whole(6, 11)), random) }
    : null
  const beforePanelAt = atWork(addDays(submittedOn, random.whole(12, 15)), random)
  return {
    begunAt,
    askedAt: new Date(begunAt.getTime() + random.whole(600, 5 * 86_400) * 1000),
    certifiedAt: atWork(measuredOn, random),
    paidAt: new Date(submittedAt.getTime() - random.whole(180, 1500) * 1000),
    submittedAt,
    returned,
    beforePanelAt,
    second: second
      ? { orderedAt: atWork(addDays(submittedOn, 16), random), day: addDays(acceptedOn, -1), recordedAt: new Date(Date.parse(`${addDays(acceptedOn, -1)}T20:00:00.000Z`)) }
      : null,
    acceptedAt: new Date(Date.parse(`${acceptedOn}T17:00:00.000Z`) + random.whole(0, 5 * 3600) * 1000),
  }
}
