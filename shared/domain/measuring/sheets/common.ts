import type { SlipRule } from '../sheet'

/** One inch on a sheet of antlers or horns. */
export const INCH = 8

/** Slips that every sheet with a right and a left asks for. */
export const SIDED_SLIPS: readonly SlipRule[] = [
  { code: 'sides_differ', lengthShare: 4, lengthFrom: 8, circumferenceFrom: 4 },
  { code: 'tape_offset', from: 6, to: 10, lines: 4 },
  { code: 'unlikely' },
]
