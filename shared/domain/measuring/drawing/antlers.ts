import type { SheetDefinition } from '../sheet'
import { isList } from '../sheet'
import type { Side } from '../units'
import { SIDES } from '../units'
import { across, clamp, degrees, limb, trace, type Curve, type Point } from './geometry'
import { bearingAt, bow, pointFrom, thickness, type Stance } from './limbs'
import type { Inches } from './reading'
import type { Part } from './types'

/** One point of a rack: where on the beam, and how it leaves and bends, in degrees; from memory, checked by eye. */
interface Grows {
  readonly line: string
  readonly share: number
  /** against the beam's own bearing where it leaves */
  readonly leaves: number
  readonly towards: number
  /** grows from this other point instead of the beam */
  readonly on?: string
  /** a palm at its end has this line for its width */
  readonly palm?: string
}

interface Rack {
  readonly stance: Stance
  /** circumference of the beam as a share of its length, where none was measured */
  readonly usual: number
  readonly rounds: readonly (readonly [line: string, share: number])[]
  readonly grows: (inches: Inches, side: Side) => readonly Grows[]
}

const ROUNDS = [['h1', 0.05], ['h2', 0.2], ['h3', 0.42], ['h4', 0.64]] as const

/** Points of one beam one after the other, evenly, so that a rack of any number looks grown. */
function inRow(lines: readonly string[], inches: Inches, side: Side, from: number, to: number, towards: number): Grows[] {
  const there = lines.filter(line => inches.of(side, line) !== null)
  return there.map((line, place) => ({ line, share: from + (to - from) * place / Math.max(3, there.length), leaves: -58, towards }))
}

const SIMPLE: Rack = {
  stance: { root: 1.7, lean: 66, end: -52, turn: 1.25 }, usual: 0.03, rounds: ROUNDS,
  grows: (inches, side) => [
    { line: 'g1', share: 0.07, leaves: -66, towards: -8 },
    ...inRow(['g2', 'g3', 'g4', 'g5', 'g6', 'g7'], inches, side, 0.27, 0.9, -6),
  ],
}

const FORKED: Rack = {
  stance: { root: 1.8, lean: 58, end: -18, turn: 1.5 }, usual: 0.03, rounds: ROUNDS,
  grows: () => [
    { line: 'g1', share: 0.09, leaves: -55, towards: -14 },
    { line: 'g2', share: 0.4, leaves: -44, towards: -14 },
    { line: 'g3', share: 0.4, leaves: 40, towards: 2, on: 'g2' },
    { line: 'g4', share: 0.7, leaves: -40, towards: 2 },
  ],
}

const ELK: Rack = {
  stance: { root: 2.6, lean: 44, end: -18, turn: 1.3 }, usual: 0.02, rounds: [['h1', 0.07], ['h2', 0.22], ['h3', 0.46], ['h4', 0.66]],
  grows: () => [
    { line: 'g1', share: 0.03, leaves: 54, towards: 14 },
    { line: 'g2', share: 0.12, leaves: 50, towards: 12 },
    { line: 'g3', share: 0.36, leaves: 46, towards: 10 },
    { line: 'g4', share: 0.57, leaves: -40, towards: -8 },
    { line: 'g5', share: 0.76, leaves: 34, towards: 16 },
    { line: 'g6', share: 0.87, leaves: -34, towards: -16 },
    { line: 'g7', share: 0.94, leaves: 34, towards: 10 },
  ],
}

const CARIBOU: Rack = {
  stance: { root: 2.2, lean: 50, end: -44, turn: 1.5 }, usual: 0.012, rounds: [['h1', 0.1], ['h2', 0.3], ['h3', 0.55], ['h4', 0.8]],
  grows: () => [
    { line: 'browLength', share: 0.02, leaves: -46, towards: -4, palm: 'browPalmWidth' },
    { line: 'bezLength', share: 0.13, leaves: 46, towards: 22 },
    { line: 'rearPoint', share: 0.44, leaves: 62, towards: 44 },
    { line: 'secondTopPoint', share: 0.86, leaves: 44, towards: 6 },
    { line: 'longestTopPoint', share: 0.93, leaves: 26, towards: -12 },
  ],
}

const FORKED_SPECIES = ['mule-deer', 'columbia-blacktail', 'sitka-blacktail']

function rackOf(definition: SheetDefinition): Rack {
  if (definition.family === 'elk') return ELK
  if (definition.family === 'caribou') return CARIBOU
  return FORKED_SPECIES.includes(definition.species) ? FORKED : SIMPLE
}

/** Where points of a list stand: crown points fan out at the beam's end, abnormal ones anywhere, now a drop, now a kicker. */
function listed(tally: 'abnormal' | 'crown', place: number, many: number): { share: number, leaves: number, towards: number } {
  if (tally === 'crown') return { share: 0.84 + 0.14 * place / Math.max(1, many), leaves: -50 + 100 * (place + 0.5) / many, towards: -30 + 60 * (place + 0.5) / many }
  // The golden ratio spreads any number without two falling on one place.
  const share = 0.16 + 0.66 * ((place * 0.618_034 + 0.35) % 1)
  return place % 2 === 0 ? { share, leaves: 74, towards: 150 } : { share, leaves: 58, towards: 62 }
}

/** One antler with x growing outwards; the animal's right is mirrored afterwards. */
function antler(definition: SheetDefinition, inches: Inches, side: Side, rack: Rack): Part[] {
  const part = (line: string, tape: Curve, outline: Curve, index: number | null = null): Part => ({ line, side, index, tape, outline })
  const length = inches.of(side, 'mainBeam')
  if (length === null) return shed(definition, inches, side)
  const rounds = rack.rounds.map(([line, share]) => [share, inches.of(side, line)] as const)
  const topPalm = inches.of(side, 'topPalmWidth')
  const slim = thickness(rounds, length, rack.usual, 1.3)
  const radius = topPalm === null ? slim : (share: number) => Math.max(slim(share), topPalm / 2 * Math.exp(-(((share - 0.86) / 0.09) ** 2)))
  const [spread, tips] = [inches.single('insideSpread'), inches.single('tipToTip')]
  const beam = bow(length, rack.stance, { reach: spread === null ? null : spread / 2 + radius(0.5), tip: tips === null ? null : tips / 2 })
  const parts: Part[] = []
  const grown = new Map<string, Curve>()
  for (const { line, share, leaves, towards, on, palm } of rack.grows(inches, side)) {
    const long = inches.of(side, line)
    if (long === null) continue
    const parent = on === undefined ? beam : grown.get(on) ?? beam
    const at = on === undefined || grown.has(on) ? share : 0.55
    const { tape, outline } = pointFrom(parent, at, long, bearingAt(parent, at) + leaves, towards, radius(at) * 0.85 + 0.1)
    grown.set(line, tape)
    const width = palm === undefined ? null : inches.of(side, palm)
    if (palm !== undefined && width !== null) {
      parts.push(part(line, tape, limb(tape, way => Math.max(0.05, width / 2 * Math.sin(Math.PI * clamp(way * 0.75 + 0.2, 0, 1)) ** 0.8))), part(palm, across(tape, 0.4, width / 2), []))
    }
    else parts.push(part(line, tape, outline))
  }
  for (const line of definition.lines) {
    if (!isList(line)) continue
    const points = inches.list(side, line.id)
    points.forEach(({ index, length: long }, place) => {
      const { share, leaves, towards } = listed(line.tally, place, points.length)
      const { tape, outline } = pointFrom(beam, share, long, bearingAt(beam, share) + leaves, towards, radius(share) * 0.7 + 0.1)
      parts.push(part(line.id, tape, outline, index))
    })
  }
  // The beam lies over the roots of its points.
  parts.push(part('mainBeam', beam, limb(beam, radius)))
  for (const [line, share] of rack.rounds) if (inches.of(side, line) !== null) parts.push(part(line, across(beam, share, radius(share)), []))
  if (topPalm !== null) parts.push(part('topPalmWidth', across(beam, 0.86, topPalm / 2), []))
  return parts
}

/** Points without a beam stand side by side, so that nothing that was measured is hidden. */
function shed(definition: SheetDefinition, inches: Inches, side: Side): Part[] {
  const lines = definition.lines.filter(line => line.kind === 'paired' && (line.nature === 'point' || line.nature === 'length') && inches.of(side, line.id) !== null)
  return lines.map((line, place) => {
    const start: Point = { x: 2 + place * 1.4, y: 0 }
    const tape = trace(start, inches.of(side, line.id)!, () => degrees(4), 10)
    return { line: line.id, side, index: null, tape, outline: limb(tape, way => 0.3 * (1 - way) ** 0.75 + 0.03) }
  })
}

export function antlers(definition: SheetDefinition, inches: Inches): Part[] {
  const rack = rackOf(definition)
  return SIDES.flatMap(side => antler(definition, inches, side, rack))
}

export const rootOf = (definition: SheetDefinition) => rackOf(definition).stance.root
