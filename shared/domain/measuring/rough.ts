import type { Measurements, Reading, SheetDefinition } from './sheet'
import { hasSides, isList } from './sheet'
import type { Side } from './units'

/**
 * What may be scored roughly and never certified (common practice, no source): a split skull, a single shed, and an
 * estimate of a broken head. Whoever shows such a score labels it.
 */

/** A split skull's spread says nothing: it does not count. */
export function withoutSpread(definition: SheetDefinition, measurements: Measurements): Measurements {
  const single: Record<string, Reading> = { ...measurements.single }
  for (const line of definition.lines) if (line.kind === 'credit' && line.nature === 'spread') single[line.id] = 'absent'
  return { ...measurements, single }
}

/** The head if both sides were like `side`: an estimate. Points on lists stay where they are, so do spreads. */
export function matchOtherSide(measurements: Measurements, side: Side): Measurements {
  return { ...measurements, right: measurements[side], left: measurements[side] }
}

/**
 * The head so far, with every line that is measured on one side only taken as equal on the other: what the net would be
 * if the sides matched, for a running figure while one side is still to be done. Lines that are absent stay absent.
 */
export function matchUnmeasured(definition: SheetDefinition, measurements: Measurements): Measurements {
  const right: Record<string, Reading> = { ...measurements.right }
  const left: Record<string, Reading> = { ...measurements.left }
  for (const line of definition.lines) {
    if (isList(line) || !hasSides(line)) continue
    const atRight = measurements.right[line.id]
    const atLeft = measurements.left[line.id]
    if (atRight === undefined && atLeft !== undefined) right[line.id] = atLeft
    if (atLeft === undefined && atRight !== undefined) left[line.id] = atRight
  }
  return { ...measurements, right, left }
}
