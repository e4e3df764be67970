import type { Curve, Point } from './geometry'
import type { Inches } from './reading'
import type { Part } from './types'

/**
 * Half of a skull from above, from the tip of the nose (0) to the crest (1): share of the length, share of half the width.
 * A drawing's proportions, from memory; only length and width are measured.
 */
const BEAR = [[0, 0], [0, 0.2], [0.03, 0.34], [0.1, 0.4], [0.2, 0.4], [0.3, 0.44], [0.37, 0.52], [0.43, 0.74], [0.5, 0.92], [0.58, 1], [0.64, 1], [0.71, 0.92], [0.75, 0.74], [0.76, 0.64], [0.81, 0.6], [0.88, 0.58], [0.94, 0.48], [0.98, 0.26], [1, 0]] as const
const CAT = [[0, 0], [0, 0.24], [0.04, 0.38], [0.13, 0.44], [0.2, 0.5], [0.27, 0.66], [0.34, 0.85], [0.43, 0.97], [0.52, 1], [0.6, 0.98], [0.67, 0.84], [0.7, 0.66], [0.74, 0.62], [0.82, 0.62], [0.9, 0.54], [0.96, 0.34], [1, 0]] as const
/** Eye openings and seams that make it a skull and not a leaf: the same shares. */
const ORBIT = [[0.4, 0.42], [0.44, 0.58], [0.5, 0.7], [0.57, 0.74], [0.62, 0.66], [0.6, 0.5], [0.53, 0.42], [0.46, 0.38]] as const

type Shares = readonly (readonly [number, number])[]

export function skull(species: string, inches: Inches): { parts: Part[], ground: Curve[] } {
  const [length, width] = [inches.single('skullLength'), inches.single('skullWidth')]
  if (length === null && width === null) return { parts: [], ground: [] }
  const long = length ?? width! * 1.65
  const wide = width ?? length! / 1.65
  const at = ([down, out]: readonly [number, number], side: 1 | -1): Point => ({ x: side * out * wide / 2, y: (down - 1) * long })
  const half: Shares = species === 'cougar' ? CAT : BEAR
  const smooth = softened(softened(half))
  const outline = [...smooth.map(one => at(one, 1)), ...[...smooth].reverse().map(one => at(one, -1))]
  const broadest = smooth.reduce((most, one) => one[1] > most[1] ? one : most)[0]
  const line = (id: string, measured: number | null, tape: Curve, drawn: Curve): Part => ({ line: id, side: null, index: null, tape: measured === null ? [] : tape, outline: drawn })
  return {
    parts: [
      line('skullLength', length, [{ x: 0, y: -long }, { x: 0, y: 0 }], outline),
      line('skullWidth', width, [at([broadest, 1], -1), at([broadest, 1], 1)], []),
    ],
    ground: ([1, -1] as const).map(side => softened(softened([...ORBIT, ORBIT[0]])).map(one => at(one, side))),
  }
}

/** Corners cut twice as short (Chaikin 1974), ends kept, and stretched again to the whole width. */
function softened(shares: Shares): Shares {
  const cut = shares.slice(1).flatMap(([down, out], n): [number, number][] => {
    const [before, outBefore] = shares[n]!
    return [[before * 0.75 + down * 0.25, outBefore * 0.75 + out * 0.25], [before * 0.25 + down * 0.75, outBefore * 0.25 + out * 0.75]]
  })
  const most = Math.max(...cut.map(([, out]) => out))
  const whole = Math.max(...shares.map(([, out]) => out))
  return [shares[0]!, ...cut.map(([down, out]): [number, number] => [down, out * whole / most]), shares.at(-1)!]
}
