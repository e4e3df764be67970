/** Points, curves and outlines of a drawing: inches, x to the reader's right, y downwards. */

export interface Point {
  readonly x: number
  readonly y: number
}
export type Curve = readonly Point[]

/** Radians from straight up, outwards positive, at a share of the way from 0 to 1. */
export type Bearing = (share: number) => number
/** Half the thickness in inches at a share of the way. */
export type Radius = (share: number) => number

export const degrees = (value: number) => value * Math.PI / 180
export const clamp = (value: number, least: number, most: number) => Math.min(most, Math.max(least, value))

/** A curve of exactly this length, as its pieces are straight and of one length. */
export function trace(start: Point, length: number, bearing: Bearing, pieces = 24): Point[] {
  const piece = length / pieces
  const curve: Point[] = [start]
  let { x, y } = start
  for (let n = 0; n < pieces; n++) {
    const angle = bearing((n + 0.5) / pieces)
    x += piece * Math.sin(angle)
    y -= piece * Math.cos(angle)
    curve.push({ x, y })
  }
  return curve
}

/** The place at a share of a curve whose pieces are of one length. */
export function placeAt(curve: Curve, share: number): Point {
  const at = clamp(share, 0, 1) * (curve.length - 1)
  const n = Math.min(curve.length - 2, Math.floor(at))
  const [from, to] = [curve[n]!, curve[n + 1]!]
  return { x: from.x + (to.x - from.x) * (at - n), y: from.y + (to.y - from.y) * (at - n) }
}

/** Unit normal of a curve's piece, to the left of the way. */
function normalAt(curve: Curve, n: number): Point {
  const [from, to] = [curve[Math.max(0, n - 1)]!, curve[Math.min(curve.length - 1, n + 1)]!]
  const length = Math.hypot(to.x - from.x, to.y - from.y) || 1
  return { x: (to.y - from.y) / length, y: -(to.x - from.x) / length }
}

/** The outline of a limb around its curve: up one side, over the tip, down the other. */
export function limb(curve: Curve, radius: Radius): Point[] {
  const one: Point[] = []
  const other: Point[] = []
  for (let n = 0; n < curve.length; n++) {
    const half = radius(n / (curve.length - 1))
    const { x, y } = curve[n]!
    const normal = normalAt(curve, n)
    one.push({ x: x + normal.x * half, y: y + normal.y * half })
    other.push({ x: x - normal.x * half, y: y - normal.y * half })
  }
  return [...one, ...other.reverse()]
}

/** A straight line across a curve at a share of it, where a tape goes round. */
export function across(curve: Curve, share: number, half: number): Point[] {
  const n = Math.round(clamp(share, 0, 1) * (curve.length - 1))
  const { x, y } = placeAt(curve, share)
  const normal = normalAt(curve, n)
  return [{ x: x - normal.x * half, y: y - normal.y * half }, { x: x + normal.x * half, y: y + normal.y * half }]
}

export const mirrored = (curve: Curve): Point[] => curve.map(({ x, y }) => ({ x: x === 0 ? 0 : -x, y }))
export const moved = (curve: Curve, by: Point): Point[] => curve.map(({ x, y }) => ({ x: x + by.x, y: y + by.y }))
export const farthest = (curve: Curve) => curve.reduce((most, { x }) => Math.max(most, x), -Infinity)

/** Where a rising function reaches a value, within bounds; the nearer bound where it never does. */
export function solve(value: number, of: (at: number) => number, least: number, most: number, halvings = 12): number {
  let [low, high] = [least, most]
  for (let n = 0; n < halvings; n++) {
    const middle = (low + high) / 2
    if (of(middle) < value) low = middle
    else high = middle
  }
  return (low + high) / 2
}

/** Values between stations of a limb, straight from one to the next. */
export function between(stations: readonly (readonly [share: number, value: number])[]): Radius {
  return (share) => {
    let [from, before] = stations[0]!
    if (share <= from) return before
    for (const [to, after] of stations) {
      if (share <= to) return to === from ? after : before + (after - before) * (share - from) / (to - from)
      ;[from, before] = [to, after]
    }
    return before
  }
}
