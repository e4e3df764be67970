import type { ListLine, ListPoint, Measurements, Reading, SheetDefinition } from './sheet'
import { isCount, isList } from './sheet'
import { isPoint } from './score'
import { STEPS_PER_INCH } from './units'

/** How a rough score's measurements are rounded down first. */
export const ROUNDINGS = ['none', 'quarter', 'inch'] as const
export type Rounding = (typeof ROUNDINGS)[number]

const PARTS_OF_INCH: Readonly<Record<Exclude<Rounding, 'none'>, number>> = { quarter: 4, inch: 1 }

/**
 * Rounds every measurement down to the quarter or the whole inch, counts apart, as is done on a fresh head so as not to
 * promise too much (common practice, no source). It shrinks what is taken off too, so the rounded net can be the higher.
 * Whether a projection is a point is settled by the tape as read: rounding makes and unmakes no point on a list.
 */
export function roundDown(definition: SheetDefinition, measurements: Measurements, to: Rounding): Measurements {
  if (to === 'none') return measurements
  const size = STEPS_PER_INCH[definition.step] / PARTS_OF_INCH[to]
  const down = (steps: number) => steps - (steps % size)
  const counts = new Set(definition.lines.filter(isCount).map((line) => line.id))
  const round = (readings: Readonly<Record<string, Reading>>) => Object.fromEntries(Object.entries(readings).map(([id, reading]) =>
    [id, reading === 'absent' || counts.has(id) ? reading : down(reading)]))
  const lists: Record<string, readonly ListPoint[]> = {}
  for (const line of definition.lines) {
    const points = isList(line) ? measurements.lists[line.id] : undefined
    if (points) lists[line.id] = points.map((point) => roundPoint(line as ListLine, point, down))
  }
  return { ...measurements, single: round(measurements.single), right: round(measurements.right), left: round(measurements.left), lists }
}

function roundPoint(line: ListLine, point: ListPoint, down: (steps: number) => number): ListPoint {
  return isPoint(line, point) ? { side: point.side, length: down(point.length) } : point
}
