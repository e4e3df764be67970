import type { KeyFigureRule, Measurements, SheetDefinition } from './sheet'
import { isList } from './sheet'
import { inSum, isPoint } from './score'
import type { Side } from './units'

/** One of the first things asked at a bench. Lengths in steps, points as counts. */
export type KeyFigure
  = | { readonly code: 'points', readonly right: number, readonly left: number }
    | { readonly code: 'single', readonly line: string, readonly steps: number }
    | { readonly code: 'longer', readonly line: string, readonly steps: number }

/**
 * "How many points, how wide?": points (right x left), widest inside, longer beam; horn length and base; palm; skull.
 * What was not measured is left out. The beam tip is a point in the count (common practice, no source).
 */
export function keyFigures(definition: SheetDefinition, measurements: Measurements): readonly KeyFigure[] {
  return definition.keyFigures.flatMap((rule) => keyFigure(definition, measurements, rule))
}

function keyFigure(definition: SheetDefinition, measurements: Measurements, rule: KeyFigureRule): readonly KeyFigure[] {
  switch (rule.code) {
    case 'points': {
      const right = pointsOn(definition, measurements, 'right', rule)
      const left = pointsOn(definition, measurements, 'left', rule)
      return right + left > 0 ? [{ code: 'points', right, left }] : []
    }
    case 'counted_points': {
      const on = (side: Side) => rule.lines.reduce((sum, id) => sum + inSum(measurements[side][id]), 0)
      return on('right') + on('left') > 0 ? [{ code: 'points', right: on('right'), left: on('left') }] : []
    }
    case 'single': {
      const steps = inSum(measurements.single[rule.line])
      return steps > 0 ? [{ code: 'single', line: rule.line, steps }] : []
    }
    case 'longer': {
      const steps = Math.max(inSum(measurements.right[rule.line]), inSum(measurements.left[rule.line]))
      return steps > 0 ? [{ code: 'longer', line: rule.line, steps }] : []
    }
  }
}

/** Points of one side: as counted at the bench where that was written down, else what the sheet itself shows. */
export function pointsOn(
  definition: SheetDefinition, measurements: Measurements, side: Side, rule: Extract<KeyFigureRule, { code: 'points' }>,
): number {
  const counted = measurements[side].points
  if (typeof counted === 'number') return counted
  let points = inSum(measurements[side][rule.beam]) > 0 ? 1 : 0
  for (const line of definition.lines) {
    if (isList(line)) points += (measurements.lists[line.id] ?? []).filter((point) => point.side === side && isPoint(line, point)).length
    else if (line.kind === 'paired' && rule.points.includes(line.id) && inSum(measurements[side][line.id]) >= (line.pointFrom ?? 1)) points += 1
  }
  return points
}
