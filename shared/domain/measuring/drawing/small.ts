import type { Curve, Point } from './geometry'
import type { Drawing, Part } from './types'

/** Side of the square that a small drawing lies in, in its own units. */
export const SMALL_SIDE = 100
const MOST_BYTES = 400
const OUTLINED = ['palmLength', 'skullLength']

/**
 * A drawing for a line of a list: one SVG path of at most 400 bytes in a square of 100 × 100, to be stroked. Limbs are
 * their middle lines, palms and skulls their outlines; what no longer fits is left out, the longest first kept.
 */
export function small(drawing: Drawing): string {
  const { left, top, right, bottom } = drawing.box
  const scale = (SMALL_SIDE - 4) / Math.max(right - left, bottom - top, 1)
  const [x0, y0] = [SMALL_SIDE / 2 - scale * (left + right) / 2, SMALL_SIDE / 2 - scale * (top + bottom) / 2]
  const place = ({ x, y }: Point): Point => ({ x: Math.round(x0 + x * scale), y: Math.round(y0 + y * scale) })
  const parts = drawing.parts.filter(part => part.outline.length > 0 && curveOf(part).length > 1).sort((a, b) => spanOf(b) - spanOf(a))
  let path = ''
  for (const part of parts) {
    const outlined = OUTLINED.includes(part.line)
    const next = written(thinned(curveOf(part), outlined ? 22 : part.line === 'mainBeam' || part.line === 'hornLength' ? 9 : 3).map(place)) + (outlined ? 'z' : '')
    if (path.length + next.length <= MOST_BYTES) path += next
  }
  return path
}

const curveOf = (part: Part): Curve => OUTLINED.includes(part.line) ? part.outline : part.tape
const spanOf = (part: Part) => curveOf(part).reduce((sum, { x, y }, n, all) => n === 0 ? 0 : sum + Math.hypot(x - all[n - 1]!.x, y - all[n - 1]!.y), 0)

/** So many of a curve's points, evenly, its ends among them. */
function thinned(curve: Curve, points: number): Curve {
  if (curve.length <= points) return curve
  return Array.from({ length: points }, (_, n) => curve[Math.round(n * (curve.length - 1) / (points - 1))]!)
}

/** Relative steps in whole units, without a sign or space too many (SVG 2, path data grammar). */
function written(points: readonly Point[]): string {
  let text = ''
  let before: Point | undefined
  for (const { x, y } of points) {
    if (before && before.x === x && before.y === y) continue
    const [dx, dy] = before ? [x - before.x, y - before.y] : [x, y]
    text += `${before ? 'l' : 'M'}${dx}${dy < 0 ? '' : ' '}${dy}`
    before = { x, y }
  }
  return text
}
