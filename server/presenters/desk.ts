import { dayIn } from '../clock'
import { daysBetween, type Day } from '../../shared/domain/dates'
import { formatSteps, fromSixteenths, type Step } from '../../shared/domain/measuring/units'
import type { DeskLine } from '../../shared/schemas/desk'
import type { DeskRow } from '../read-models/desk/rows'

/** A length kept in sixteenths as its class writes it; null stays null. */
export function writtenNet(net16: number | null | undefined, step: Step | undefined): string | null {
  return net16 === null || net16 === undefined || !step ? null : formatSteps(fromSixteenths(Number(net16), step), step)
}

/** One line of the desk. Only what its kind names leaves: no address, no tag, no day of taking. */
export function presentDeskLine(row: DeskRow, zone: string, today: Day): DeskLine {
  const since = new Date(row.since)
  return {
    kind: row.kind,
    id: row.uid,
    sittingId: row.sitting_uid ?? null,
    state: row.state ?? null,
    category: row.category ?? null,
    district: row.district ?? null,
    person: row.person ?? null,
    role: row.role ?? null,
    net: writtenNet(row.net16, row.step),
    place: row.place ?? null,
    heldOn: row.held_on ?? null,
    count: row.count ?? null,
    onHold: Boolean(row.hold_at),
    since: since.toISOString(),
    days: Math.max(0, daysBetween(dayIn(zone, since), today)),
    dueOn: row.due_on ?? null,
    daysLeft: row.due_on ? daysBetween(today, row.due_on) : null,
  }
}
