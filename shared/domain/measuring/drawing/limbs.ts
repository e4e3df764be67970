import { between, clamp, degrees, limb, placeAt, solve, trace, type Curve, type Point, type Radius } from './geometry'

/** How a family's beam or horn stands when nothing says otherwise; from memory, checked by eye. */
export interface Stance {
  /** where it leaves the skull, inches from the middle */
  readonly root: number
  /** bearing at the skull and at the tip, degrees from straight up, outwards positive */
  readonly lean: number
  readonly end: number
  /** how late it turns: 1 is an even bow */
  readonly turn: number
  /** it is farthest out at its tip, so that one bow keeps tip to tip and the spread is what comes of it */
  readonly flares?: true
  /** it hangs down first, whatever it spans, so that only its last bend looks for tip to tip */
  readonly hangs?: true
}

export interface Wishes {
  /** half of the distance that the farthest place shall have from the middle, at the curve itself */
  readonly reach: number | null
  /** half of tip to tip */
  readonly tip: number | null
}

const COARSE = 12

/**
 * A beam or horn of exactly its length that reaches as far out as the spread says and ends where tip to tip says, as far
 * as one bow can: length first, then spread, then tips.
 */
export function bow(length: number, stance: Stance, { reach, tip }: Wishes, pieces = 32): Point[] {
  const start = { x: stance.root, y: 0 }
  const bearing = (lean: number, end: number) => (share: number) => lean + (end - lean) * share ** stance.turn
  const drawn = (lean: number, end: number, fine: number) => trace(start, length, bearing(lean, end), fine)
  const turned = (lean: number) => lean + degrees(stance.end - stance.lean)
  if (stance.flares) {
    const wanted = tip ?? reach
    const lean = wanted === null ? degrees(stance.lean) : solve(wanted, at => tipOf(start, length, bearing(at, turned(at))), degrees(stance.lean - 70), degrees(stance.lean + 50), 16)
    return drawn(lean, turned(lean), pieces)
  }
  if (stance.hangs) {
    const wanted = tip ?? reach
    const lean = degrees(stance.lean)
    return drawn(lean, wanted === null ? turned(lean) : solve(wanted, at => tipOf(start, length, bearing(lean, at)), degrees(-120), degrees(90), 14), pieces)
  }
  const endFor = (lean: number) => tip === null ? turned(lean) : solve(tip, end => tipOf(start, length, bearing(lean, end)), degrees(-130), degrees(130), 9)
  const lean = reach === null
    ? degrees(stance.lean)
    : solve(reach, at => reachOf(start, length, bearing(at, endFor(at))), degrees(-40), degrees(120), 9)
  // Found to a fraction of a degree; the last bend is found finer, since the tips stand on it.
  const end = tip === null ? turned(lean) : solve(tip, at => tipOf(start, length, bearing(lean, at)), degrees(-130), degrees(130), 14)
  return drawn(lean, end, pieces)
}

/** How far out a limb ends, without keeping its way. */
function tipOf(start: Point, length: number, bearing: (share: number) => number): number {
  let sum = 0
  for (let n = 0; n < COARSE; n++) sum += Math.sin(bearing((n + 0.5) / COARSE))
  return start.x + sum * length / COARSE
}

/** How far out a limb reaches anywhere. */
function reachOf(start: Point, length: number, bearing: (share: number) => number): number {
  let [sum, most] = [0, 0]
  for (let n = 0; n < COARSE; n++) {
    sum += Math.sin(bearing((n + 0.5) / COARSE))
    if (sum > most) most = sum
  }
  return start.x + most * length / COARSE
}

/** Half the thickness along a limb from circumferences at their places, thinning out to its tip. Inches. */
export function thickness(stations: readonly (readonly [share: number, circumference: number | null])[], length: number, usual: number, burr = 1): Radius {
  const given = stations.filter((one): one is [number, number] => one[1] !== null).map(([share, round]) => [share, round / (2 * Math.PI)] as const)
  const base = given[0]?.[1] ?? clamp(length * usual, 0.15, 4)
  const along = given.length > 0 ? given : [[0, base] as const, [0.7, base * 0.7] as const]
  const last = along.at(-1)!
  return between([[0, along[0]![1] * burr], [0.025, along[0]![1]], ...along, [last[0] + (1 - last[0]) * 0.6, last[1] * 0.6], [1, 0.04]])
}

export interface Grown {
  readonly tape: Curve
  readonly outline: Curve
}

/** A point that grows from a limb: it leaves between the limb's way and its own, and bends towards `towards` degrees. */
export function pointFrom(parent: Curve, share: number, length: number, leaves: number, towards: number, thick: number): Grown {
  const start = placeAt(parent, share)
  const tape = trace(start, length, way => degrees(leaves + (towards - leaves) * way ** 0.7), 10)
  const half = clamp(length * 0.07 + 0.12, 0.12, thick)
  return { tape, outline: limb(tape, way => half * (1 - way) ** 0.75 + 0.03) }
}

/** Bearing of a limb at a share of it, in degrees from straight up. */
export function bearingAt(curve: Curve, share: number): number {
  const [from, to] = [placeAt(curve, clamp(share - 0.04, 0, 0.9)), placeAt(curve, clamp(share + 0.04, 0.1, 1))]
  return Math.atan2(to.x - from.x, from.y - to.y) * 180 / Math.PI
}
