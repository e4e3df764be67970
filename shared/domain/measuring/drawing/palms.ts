import type { Side } from '../units'
import { SIDES } from '../units'
import { across, clamp, degrees, farthest, limb, placeAt, solve, trace, type Curve, type Point } from './geometry'
import type { Inches } from './reading'
import type { Part } from './types'

const ROOT = 2.4
const WIDEST = 0.4 / 0.86
/** How far a finger of the palm stands out along its foot: up, over a round tip, down into the bay. */
const FINGER = [-0.12, -0.02, 0.5, 0.94, 1, 0.94, 0.5, -0.02] as const

/** How a palm widens and closes along its length, as a share of its greatest width, which it has at WIDEST. */
const breadth = (way: number) => Math.sin(Math.PI * clamp(0.1 + way * 0.86, 0, 1)) ** 0.8

/** One palm at a bearing of its own; x grows outwards. */
function palm(inches: Inches, side: Side, lean: number): Part[] {
  const [length, width, round] = [inches.of(side, 'palmLength'), inches.of(side, 'palmWidth'), inches.of(side, 'beamCircumference')]
  if (length === null && width === null && round === null) return []
  const thick = (round ?? 7) / (2 * Math.PI)
  const stalk = trace({ x: ROOT, y: 0 }, clamp((length ?? 24) * 0.2, 3, 9), way => degrees(92 - (92 - lean) * 0.4 * way), 8)
  const part = (line: string, tape: Curve, outline: Curve): Part => ({ line, side, index: null, tape, outline })
  const parts: Part[] = []
  const root = placeAt(stalk, 0.94)
  const long = length ?? (width ?? 10) * 1.8
  const wide = width ?? long * 0.38
  const spine = trace(root, long, way => degrees(lean + 26 * (0.5 - way)), 24)
  parts.push(part('palmLength', length === null ? [] : spine, blade(spine, wide, Math.round(clamp(inches.count(side, 'normalPoints'), 0, 40)), long)))
  parts.push(part('beamCircumference', round === null ? [] : across(stalk, 0.45, thick), limb(stalk, way => thick * (1 + 0.15 * way))))
  if (width !== null) parts.push(part('palmWidth', across(spine, WIDEST, width / 2), []))
  return parts
}

/** A palm's outline: smooth below, its counted points along the upper edge, over the tip. Their length is not measured. */
function blade(spine: Curve, width: number, points: number, length: number): Point[] {
  const last = spine.length - 1
  const edge = (way: number, side: 1 | -1, beyond = 0): Point => {
    const at = placeAt(spine, way)
    const [from, to] = [placeAt(spine, Math.max(0, way - 0.04)), placeAt(spine, Math.min(1, way + 0.04))]
    const run = Math.hypot(to.x - from.x, to.y - from.y) || 1
    const half = (width / 2 * breadth(way) + beyond) * side
    return { x: at.x + (to.y - from.y) / run * half, y: at.y - (to.x - from.x) / run * half }
  }
  const upper: Point[] = []
  const finger = clamp(length * 0.17, 1, 6.5)
  for (let n = 0; n < points; n++) {
    const long = finger * (0.65 + 0.35 * Math.sin(Math.PI * (n + 0.7) / (points + 0.4)))
    for (let step = 0; step < FINGER.length; step++) upper.push(edge(0.02 + 0.96 * (n + step / FINGER.length) / points, 1, long * FINGER[step]!))
  }
  if (points === 0) for (let n = 0; n <= last; n++) upper.push(edge(n / last, 1))
  const lower = Array.from({ length: last + 1 }, (_, n) => edge(1 - n / last, -1))
  return [edge(0, 1), ...upper, edge(1, 1), ...lower]
}

/** Moose: each palm is turned until both reach as far as the greatest spread says. */
export function palms(inches: Inches): Part[] {
  const spread = inches.single('greatestSpread')
  return SIDES.flatMap((side) => {
    if (spread === null) return palm(inches, side, 52)
    const reach = (lean: number) => Math.max(0, ...palm(inches, side, lean).map(part => farthest(part.outline)))
    return palm(inches, side, solve(spread / 2, reach, 5, 100, 10))
  })
}
