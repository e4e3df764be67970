import type { ActiveActor } from '../../../shared/domain/access/roles'
import { hasAnyRole, hasRole } from '../../../shared/domain/access/roles'
import { canPlanSittings } from '../../../shared/domain/access/abilities'
import type { DeskAnswer } from '#shared/schemas/desk'
import type { Registry } from '../../composition'
import { presentDeskLine } from '../../presenters/desk'
import { benchEntries, filesToReview, ownEntries, unclaimedEntries } from '../../read-models/desk/entries'
import { docketOf, itemsWithoutSitting, secondMeasuringsOf, sittingsOfChair } from '../../read-models/desk/panel'
import { proposalsFor, reportsToCheck } from '../../read-models/desk/registrar'
import type { DeskPile } from '../../read-models/desk/rows'
import { dayIn } from '../../clock'

/** Everything that waits for a person now, whatever their roles, oldest first. */
export async function readDesk(registry: Registry, actor: ActiveActor): Promise<DeskAnswer> {
  const { db } = registry
  const { timeZone } = await registry.settings()
  const today = dayIn(timeZone, registry.clock.now())
  const asked: Promise<DeskPile | DeskPile[]>[] = [...ownEntries(db, actor.userId, today)]
  if (hasAnyRole(actor, ['shop', 'measurer'])) asked.push(unclaimedEntries(db, actor.userId))
  if (hasRole(actor, 'measurer')) asked.push(benchEntries(db, actor.userId))
  if (hasRole(actor, 'reviewer')) asked.push(filesToReview(db, actor.userId), reportsToCheck(db))
  if (canPlanSittings(actor)) asked.push(itemsWithoutSitting(db))
  if (hasRole(actor, 'judge')) asked.push(docketOf(db, actor.userId), secondMeasuringsOf(db, actor.userId), sittingsOfChair(db, actor.userId, today))
  if (hasRole(actor, 'registrar')) asked.push(proposalsFor(db, actor.userId))
  const piles = (await Promise.all(asked)).flat().filter(pile => pile.rows.length > 0)
  const lines = piles.flatMap(pile => pile.rows).map(row => presentDeskLine(row, timeZone, today))
    .sort((a, b) => a.since < b.since ? -1 : a.since > b.since ? 1 : 0)
  const counts = piles.map(pile => ({
    kind: pile.rows[0]!.kind,
    count: pile.total,
    oldestDays: presentDeskLine(pile.rows[0]!, timeZone, today).days,
  }))
  return { lines, counts }
}
