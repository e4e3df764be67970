import Fraction from 'fraction.js'

/**
 * A second opinion on every sheet, written from the published lines (see the sources beside each family) with exact
 * fractions and without anything of the scoring engine: it reads the sheet as people write it.
 */

interface Lines {
  /** Counts once; with the line that caps it, if any. */
  credits: readonly (readonly [id: string, cap: string | null])[]
  compared: readonly string[]
  notCompared: readonly string[]
  comparedCounts: readonly string[]
  notComparedCounts: readonly string[]
  deductedCount: string | null
  abnormal: 'taken off' | 'added' | null
  crown: boolean
  recorded: readonly string[]
  /** Projections that must have a length to be points at all, and that length. */
  projections: readonly string[]
  least: string
  step: 8 | 16
}

const nothing: Lines = {
  credits: [], compared: [], notCompared: [], comparedCounts: [], notComparedCounts: [], deductedCount: null,
  abnormal: null, crown: false, recorded: [], projections: [], least: '1', step: 8,
}

const gs = (last: number) => Array.from({ length: last }, (_, index) => `g${index + 1}`)
const hs = ['h1', 'h2', 'h3', 'h4']

/** A public wildlife agency's slides on scoring; published sheet walk-throughs; mule deer: a how-to article on its lines. */
const antlered = (points: number, abnormal: 'taken off' | 'added', crown = false): Lines => ({
  ...nothing,
  credits: [['insideSpread', 'mainBeam']],
  compared: ['mainBeam', ...gs(points), ...hs],
  projections: gs(points),
  recorded: ['tipToTip', 'greatestSpread'],
  abnormal,
  crown,
})

/** Horns: pronghorn leaflet; magazine article on bighorn sheep; mountain goat leaflet of 2011; the rest from memory. */
const quarters = ['baseCircumference', 'firstQuarter', 'secondQuarter', 'thirdQuarter']
const sheep: Lines = { ...nothing, compared: quarters, notCompared: ['hornLength'], recorded: ['greatestSpread', 'tipToTip'] }
const goat: Lines = { ...nothing, compared: ['hornLength', ...quarters], recorded: ['greatestSpread', 'tipToTip'] }
/** Outfitters' guide on bear skulls; Outdoor Life, June 2011. */
const skull: Lines = { ...nothing, credits: [['skullLength', null], ['skullWidth', null]], step: 16 }

export const TABLE: Readonly<Record<string, Lines>> = {
  'whitetail-typical': antlered(7, 'taken off'),
  'whitetail-nontypical': antlered(7, 'added'),
  'coues-typical': antlered(7, 'taken off'),
  'coues-nontypical': antlered(7, 'added'),
  'mule-deer-typical': antlered(4, 'taken off'),
  'mule-deer-nontypical': antlered(4, 'added'),
  'columbia-blacktail-typical': antlered(4, 'taken off'),
  'columbia-blacktail-nontypical': antlered(4, 'added'),
  'sitka-blacktail-typical': antlered(4, 'taken off'),
  'sitka-blacktail-nontypical': antlered(4, 'added'),
  'elk-typical': antlered(7, 'taken off'),
  'elk-nontypical': antlered(7, 'added'),
  'roosevelt-elk': antlered(7, 'taken off', true),
  'tule-elk': antlered(7, 'taken off', true),
  /** A magazine's article on moose and field notes; the single abnormal count and the differences from memory. */
  moose: {
    ...nothing,
    credits: [['greatestSpread', null]],
    compared: ['palmWidth', 'palmLength', 'beamCircumference'],
    comparedCounts: ['normalPoints'],
    deductedCount: 'abnormalPointCount',
  },
  /** Two field-judging guides (one class); which lines are compared, and the half inch, from memory. */
  caribou: {
    ...nothing,
    credits: [['insideSpread', 'mainBeam']],
    compared: ['mainBeam', 'bezLength', 'rearPoint', 'secondTopPoint', 'longestTopPoint', 'topPalmWidth', ...hs],
    notCompared: ['browLength', 'browPalmWidth'],
    comparedCounts: ['points'],
    notComparedCounts: ['browPoints'],
    recorded: ['tipToTip', 'greatestSpread'],
    projections: ['browLength', 'bezLength', 'rearPoint', 'secondTopPoint', 'longestTopPoint'],
    least: '1/2',
  },
  pronghorn: { ...nothing, compared: ['hornLength', ...quarters, 'prongLength'], recorded: ['insideSpread', 'tipToTip'] },
  'bighorn-sheep': sheep,
  'desert-sheep': sheep,
  'dall-sheep': sheep,
  'stone-sheep': sheep,
  'mountain-goat': goat,
  bison: goat,
  muskox: {
    ...nothing,
    compared: ['hornLength', 'bossWidth', 'firstQuarterWidth', 'secondQuarter', 'thirdQuarter'],
    recorded: ['greatestSpread', 'tipToTip'],
  },
  'black-bear': skull,
  'grizzly-bear': skull,
  cougar: skull,
}

/** A sheet as written. */
export interface Sheet {
  single: Record<string, string | number>
  right: Record<string, string | number>
  left: Record<string, string | number>
  abnormal: { side: string, length: string, width?: string }[]
  crown: { side: string, length: string }[]
}

export interface Totals { gross: Fraction, differences: Fraction, abnormal: Fraction, crown: Fraction, net: Fraction, grossAll: Fraction }

const known = new Map<string | number, Fraction>()
const ZERO = new Fraction(0)

/** What is written, in inches; whatever is not a number of inches counts nothing. `21-3` is 21 inches and 3 steps. */
function inches(written: string | number | undefined, step: number): Fraction {
  if (written === undefined || written === 'absent') return ZERO
  const key = `${step} ${written}`
  const before = known.get(key)
  if (before) return before
  const steps = /^(\d+)[- ](\d+)$/.exec(String(written))
  const value = steps ? new Fraction(Number(steps[1])).add(new Fraction(Number(steps[2]), step)) : new Fraction(written)
  known.set(key, value)
  return value
}

/** The score of a sheet by the published rules, in exact fractions of an inch. */
export function secondOpinion(category: string, sheet: Sheet): Totals {
  const lines = TABLE[category]!
  const least = inches(lines.least, lines.step)
  const side = (name: 'right' | 'left', id: string): Fraction => {
    const value = inches(sheet[name][id], lines.step)
    return lines.projections.includes(id) && value.lt(least) ? ZERO : value
  }
  let gross = ZERO
  let differences = ZERO
  for (const [id, cap] of lines.credits) {
    const value = inches(sheet.single[id], lines.step)
    const right = cap ? side('right', cap) : ZERO
    const left = cap ? side('left', cap) : ZERO
    const longer = right.gt(left) ? right : left
    gross = gross.add(cap && value.gt(longer) ? longer : value)
  }
  for (const id of [...lines.compared, ...lines.comparedCounts]) {
    const right = side('right', id)
    const left = side('left', id)
    gross = gross.add(right).add(left)
    differences = differences.add(right.sub(left).abs())
  }
  for (const id of [...lines.notCompared, ...lines.notComparedCounts]) gross = gross.add(side('right', id)).add(side('left', id))

  const real = (point: { length: string, width?: string }) => {
    const length = inches(point.length, lines.step)
    return length.gte(least) && (point.width === undefined || length.gt(inches(point.width, lines.step))) ? length : ZERO
  }
  let abnormal = lines.deductedCount ? inches(sheet.single[lines.deductedCount], lines.step) : ZERO
  for (const point of sheet.abnormal) abnormal = abnormal.add(real(point))
  let crown = ZERO
  for (const point of sheet.crown) crown = crown.add(real(point))
  const signed = lines.abnormal === 'added' ? abnormal : abnormal.neg()
  return { gross, differences, abnormal, crown, net: gross.sub(differences).add(signed).add(crown), grossAll: gross.add(abnormal).add(crown) }
}
