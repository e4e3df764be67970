import type { SheetDefinition } from '../sheet'
import type { Side } from '../units'
import { SIDES } from '../units'
import { across, clamp, degrees, limb, moved, placeAt, trace, type Curve, type Point } from './geometry'
import { bearingAt, bow, pointFrom, thickness, type Stance } from './limbs'
import type { Inches } from './reading'
import type { Part } from './types'

/** Quarters are marked on both horns by the longer one (a published leaflet on pronghorn). */
const QUARTERS = [['firstQuarter', 0.25], ['secondQuarter', 0.5], ['thirdQuarter', 0.75]] as const

interface Horns {
  readonly stance: Stance
  readonly usual: number
}

/** How the horns of a family stand; from memory, checked by eye. */
const HORNS: Readonly<Record<'pronghorn' | 'goat' | 'bison' | 'muskox', Horns>> = {
  pronghorn: { stance: { root: 1.5, lean: 16, end: -84, turn: 3 }, usual: 0.06 },
  goat: { stance: { root: 0.9, lean: 4, end: 44, turn: 1.6, flares: true }, usual: 0.075 },
  bison: { stance: { root: 4.2, lean: 88, end: -26, turn: 1.1 }, usual: 0.1 },
  muskox: { stance: { root: 1.2, lean: 140, end: -10, turn: 1.7, hangs: true }, usual: 0.06 },
}

/** Share of its own horn at which a quarter of the longer horn falls; null where the shorter one has ended before. */
function quarterAt(share: number, length: number, longer: number): number | null {
  const at = share * longer / length
  return at < 1 ? at : null
}

function rounds(inches: Inches, side: Side, length: number, longer: number): (readonly [line: string, share: number, round: number])[] {
  const base = inches.of(side, 'baseCircumference')
  return [
    ...(base === null ? [] : [['baseCircumference', 0.02, base] as const]),
    ...QUARTERS.flatMap(([line, share]) => {
      const [round, at] = [inches.of(side, line), quarterAt(share, length, longer)]
      return round === null || at === null ? [] : [[line, at, round] as const]
    }),
  ]
}

const longerOf = (inches: Inches) => Math.max(...SIDES.map(side => inches.of(side, 'hornLength') ?? 0))

function tapes(side: Side, curve: Curve, marks: readonly (readonly [string, number, number])[]): Part[] {
  return marks.map(([line, share, round]) => ({ line, side, index: null, tape: across(curve, share, round / (2 * Math.PI)), outline: [] }))
}

function horn(family: keyof typeof HORNS, inches: Inches, side: Side): Part[] {
  const length = inches.of(side, 'hornLength')
  if (length === null) return []
  const { stance, usual } = HORNS[family]
  const marks = rounds(inches, side, length, longerOf(inches))
  const thin = thickness(marks.map(([, share, round]) => [share, round]), length, usual)
  const [boss, flat] = [inches.of(side, 'bossWidth'), inches.of(side, 'firstQuarterWidth')]
  // A muskox's horn begins as a flat boss and is round only further down.
  const radius = family !== 'muskox' ? thin : (share: number) => Math.max(share < 0.45 ? ((boss ?? 7) * (1 - share / 0.45) + (flat ?? 4) * share / 0.45) / 2 : 0, Math.min(thin(share), 1.6))
  const outer = inches.single('greatestSpread')
  const inside = inches.single('insideSpread')
  const tips = inches.single('tipToTip')
  const reach = outer !== null ? outer / 2 - radius(0.6) : inside !== null ? inside / 2 + radius(0.5) : null
  const curve = bow(length, stance, { reach, tip: tips === null ? null : tips / 2 })
  const parts: Part[] = []
  const prong = inches.of(side, 'prongLength')
  if (prong !== null) {
    const { tape, outline } = pointFrom(curve, 0.5, prong, bearingAt(curve, 0.5) + 62, 24, radius(0.5))
    parts.push({ line: 'prongLength', side, index: null, tape, outline: outline.length > 0 ? limb(tape, way => radius(0.5) * (1 - way) + 0.04) : [] })
  }
  parts.push({ line: 'hornLength', side, index: null, tape: curve, outline: limb(curve, radius) }, ...tapes(side, curve, marks))
  if (boss !== null) parts.push({ line: 'bossWidth', side, index: null, tape: across(curve, 0.03, boss / 2), outline: [] })
  if (flat !== null) parts.push({ line: 'firstQuarterWidth', side, index: null, tape: across(curve, 0.25, flat / 2), outline: [] })
  return parts
}

/** Horns seen from the face: pronghorn, goat, bison, muskox. */
export function horns(definition: SheetDefinition, inches: Inches): Part[] {
  return SIDES.flatMap(side => horn(definition.family as keyof typeof HORNS, inches, side))
}

const GAP = 3

/** Sheep: each horn from its own side, rolled out flat, so that the curl has its length. Spreads have no place in it. */
export function curls(inches: Inches): Part[] {
  return SIDES.flatMap((side) => {
    const length = inches.of(side, 'hornLength')
    if (length === null) return []
    const marks = rounds(inches, side, length, longerOf(inches))
    const radius = thickness(marks.map(([, share, round]) => [share, round]), length, 0.06)
    // A curl closes as it grows: about a full turn at forty inches, from memory.
    const turn = clamp(length * 9, 60, 400)
    const curve = trace({ x: 0, y: 0 }, length, way => degrees(28 + turn * (way * 0.86 + way * way * 0.14)), 40)
    const outline = broomed(limb(curve, radius), radius(0.97))
    const left = Math.min(...outline.map(({ x }) => x))
    const aside: Point = { x: GAP / 2 - left, y: 0 }
    return [
      { line: 'hornLength', side, index: null, tape: moved(curve, aside), outline: moved(outline, aside) },
      ...tapes(side, moved(curve, aside), marks),
    ]
  })
}

/** A horn's end is blunt, not a needle. */
function broomed(outline: Curve, half: number): Point[] {
  const tip = Math.floor(outline.length / 2)
  const at = placeAt(outline, 0.5)
  return outline.map((point, n) => Math.abs(n - tip) > 1 ? point : { x: at.x + (point.x - at.x) * half, y: at.y + (point.y - at.y) * half })
}
