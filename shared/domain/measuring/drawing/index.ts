import type { Measurements, SheetDefinition } from '../sheet'
import { antlers, rootOf } from './antlers'
import { farthest, mirrored, type Curve, type Point } from './geometry'
import { curls, horns } from './horns'
import { palms } from './palms'
import { inchesOf, type Inches } from './reading'
import { skull } from './skulls'
import type { Box, Drawing, Part, Residual, View } from './types'

export type { Box, Drawing, Part, Residual, View } from './types'
export { small, SMALL_SIDE } from './small'
export { grainOf, pathOf, svgOf, viewBoxOf } from './svg'

const VIEWS: Readonly<Partial<Record<SheetDefinition['family'], View>>> = { sheep: 'sides', skull: 'above' }
/** Inches that a drawn spread may be off before it is told; a share for long ones. */
const TOLD_FROM = 0.25
const TOLD_SHARE = 0.02

/**
 * Draws an animal from a sheet, whatever is missing on it: the animal's right at the reader's left, as one sees it from
 * the front. Never throws; an empty sheet gives an empty drawing.
 */
export function draw(definition: SheetDefinition, measurements: Measurements): Drawing {
  const inches = inchesOf(definition, measurements)
  const { parts: grown, ground } = grow(definition, inches)
  const parts = grown.map(part => part.side === 'right' ? { ...part, tape: mirrored(part.tape), outline: mirrored(part.outline) } : part)
  const across = acrossParts(definition, inches, parts)
  const all = [...parts, ...across.parts]
  return { view: VIEWS[definition.family] ?? 'front', ground, parts: all, residuals: across.residuals, box: boxOf([...all.flatMap(({ tape, outline }) => [tape, outline]), ...ground]) }
}

function grow(definition: SheetDefinition, inches: Inches): { parts: Part[], ground: Curve[] } {
  switch (definition.family) {
    case 'skull': return skull(definition.species, inches)
    case 'sheep': return { parts: curls(inches), ground: [] }
    case 'moose': return onGround(palms(inches), 2.4)
    case 'deer':
    case 'elk':
    case 'caribou': return onGround(antlers(definition, inches), rootOf(definition))
    case 'pronghorn': return onGround(horns(definition, inches), 1.5)
    case 'goat': return onGround(horns(definition, inches), 0.9)
    case 'bison': return onGround(horns(definition, inches), 4.2)
    case 'muskox': return onGround(horns(definition, inches), 1.2)
  }
}

/** The plate of skull that carries both sides; drawn only under something. */
function onGround(parts: Part[], root: number): { parts: Part[], ground: Curve[] } {
  if (parts.length === 0) return { parts, ground: [] }
  const [wide, high] = [root + 0.5, 0.9 + root * 0.35]
  return { parts, ground: [[{ x: -wide, y: -0.15 }, { x: -wide * 0.45, y: -high * 0.28 }, { x: wide * 0.45, y: -high * 0.28 }, { x: wide, y: -0.15 }, { x: wide * 0.72, y: high * 0.55 }, { x: 0, y: high }, { x: -wide * 0.72, y: high * 0.55 }, { x: -wide, y: -0.15 }]] }
}

/** Spreads and tip to tip: straight from one side to the other, and what of them the picture could not keep. */
function acrossParts(definition: SheetDefinition, inches: Inches, parts: readonly Part[]): { parts: Part[], residuals: Residual[] } {
  const found: Part[] = []
  const residuals: Residual[] = []
  if (definition.family === 'skull' || definition.family === 'sheep') return { parts: found, residuals }
  const main = (side: string) => parts.find(part => part.side === side && (part.line === 'mainBeam' || part.line === 'hornLength'))
  const [right, left] = [main('right'), main('left')]
  const add = (line: string, from: Point | undefined, to: Point | undefined) => {
    const wanted = inches.single(line)
    if (wanted === null || !from || !to) return
    found.push({ line, side: null, index: null, tape: [from, to], outline: [] })
    const drawn = to.x - from.x
    if (Math.abs(drawn - wanted) > Math.max(TOLD_FROM, wanted * TOLD_SHARE)) residuals.push({ line, side: null, wanted, drawn })
  }
  if (right && left) {
    add('tipToTip', right.tape.at(-1), left.tape.at(-1))
    const [a, b] = [innermostAtWidest(right), innermostAtWidest(left)]
    add('insideSpread', a && { x: a.x, y: (a.y + b!.y) / 2 }, b && { x: b.x, y: (a!.y + b.y) / 2 })
  }
  const outlines = parts.flatMap(part => part.outline)
  if (outlines.length > 0) {
    const [west, east] = [outlines.reduce((a, b) => b.x < a.x ? b : a), outlines.reduce((a, b) => b.x > a.x ? b : a)]
    // Points and abnormal points reach where nobody said; only of bare horns and palms does the picture claim this line.
    if (['moose', 'goat', 'bison', 'muskox'].includes(definition.family)) add('greatestSpread', { x: west.x, y: (west.y + east.y) / 2 }, { x: east.x, y: (west.y + east.y) / 2 })
  }
  return { parts: found, residuals }
}

/** The inner edge of a beam at the place where the beam is farthest out: from there the inside spread is measured. */
function innermostAtWidest({ tape, outline }: Part): Point | undefined {
  const most = farthest(tape.map(({ x, y }) => ({ x: Math.abs(x), y })))
  const n = tape.findIndex(({ x }) => Math.abs(x) === most)
  const [one, other] = [outline[n], outline[outline.length - 1 - n]]
  return one && other ? (Math.abs(one.x) < Math.abs(other.x) ? one : other) : undefined
}

function boxOf(curves: readonly Curve[]): Box {
  const box = { left: Infinity, top: Infinity, right: -Infinity, bottom: -Infinity }
  for (const curve of curves) {
    for (const { x, y } of curve) {
      if (x < box.left) box.left = x
      if (x > box.right) box.right = x
      if (y < box.top) box.top = y
      if (y > box.bottom) box.bottom = y
    }
  }
  return box.left > box.right ? { left: 0, top: 0, right: 0, bottom: 0 } : box
}
