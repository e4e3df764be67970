import type { ActiveActor } from '../../../shared/domain/access/roles'
import { daysBetween, firstMeasuringDay } from '../../../shared/domain/dates'
import type { BenchAnswer } from '../../../shared/schemas/bench'
import { dayIn } from '../../clock'
import type { Registry } from '../../composition'
import { writtenNet } from '../../presenters/desk'
import { accreditationsOf, signedLately, unclaimedOf, waitingAtBench } from '../../read-models/bench/bench'
import { loadCurrentWorkflow } from '../workflow/load'

/** A measurer's bench: who waits and since when, whose head has dried, what was begun for others, what was signed last. */
export async function readBench(registry: Registry, actor: ActiveActor): Promise<BenchAnswer> {
  const { db } = registry
  const [{ timeZone }, workflow, waiting, unclaimed, signed, accreditations] = await Promise.all([
    registry.settings(), loadCurrentWorkflow(db), waitingAtBench(db, actor.userId), unclaimedOf(db, actor.userId), signedLately(db, actor.userId), accreditationsOf(db, actor.userId),
  ])
  const today = dayIn(timeZone, registry.clock.now())
  const days = (since: string) => Math.max(0, daysBetween(dayIn(timeZone, new Date(since)), today))
  return {
    waiting: waiting.map(({ uid, ...line }) => {
      const firstDay = line.driedSince === null ? null : firstMeasuringDay(line.driedSince, workflow.limits.dryingDays)
      return { id: uid, ...line, firstDay, daysToDry: firstDay === null ? null : daysBetween(today, firstDay), days: days(line.since) }
    }),
    unclaimed: unclaimed.map(({ uid, ...line }) => ({ id: uid, ...line, days: days(line.since) })),
    signed: signed.map(({ uid, net16, step, number, ...line }) => ({ id: uid, ...line, net: writtenNet(net16, step), version: number })),
    accreditations: accreditations.map(({ suspendedAt, validTo, ...one }) => ({ ...one, validTo, daysLeft: daysBetween(today, validTo), suspended: suspendedAt !== null })),
  }
}
