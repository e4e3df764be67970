import type { Measurements, SheetDefinition } from '../sheet'
import type { Side } from '../units'
import { STEPS_PER_INCH } from '../units'

/** Readings of a sheet in inches; null for what is absent, missing or nothing. */
export interface Inches {
  readonly single: (line: string) => number | null
  readonly of: (side: Side, line: string) => number | null
  readonly count: (side: Side, line: string) => number
  readonly list: (side: Side, line: string) => readonly { readonly index: number, readonly length: number }[]
}

export function inchesOf(definition: SheetDefinition, measurements: Measurements): Inches {
  const steps = STEPS_PER_INCH[definition.step]
  const inches = (reading: number | 'absent' | undefined) => typeof reading === 'number' && reading > 0 ? reading / steps : null
  const counted = (reading: number | 'absent' | undefined) => typeof reading === 'number' ? reading : 0
  return {
    single: line => inches(measurements.single[line]),
    of: (side, line) => inches(measurements[side][line]),
    count: (side, line) => counted(measurements[side][line]),
    list: (side, line) => (measurements.lists[line] ?? []).flatMap((point, index) => point.side === side && point.length > 0 ? [{ index, length: point.length / steps }] : []),
  }
}
