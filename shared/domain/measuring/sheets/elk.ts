import type { KeyFigureRule, Line, SheetDefinition, SlipRule } from '../sheet'
import { INCH, SIDED_SLIPS } from './common'

/**
 * Elk, Roosevelt's and Tule elk. Where the four circumferences begin: an article on scoring elk, July 2015 (the names of
 * the places are from memory); that crown points are treated apart: a hunting journal's article on elk (the rest from memory).
 */

const spreads: readonly Line[] = [
  { id: 'tipToTip', text: 'tipToTip', kind: 'recordOnly', nature: 'spread', sides: false, wide: [0, 80] },
  { id: 'greatestSpread', text: 'greatestSpread', kind: 'recordOnly', nature: 'spread', sides: false, wide: [4, 90] },
  { id: 'points', text: 'points', kind: 'recordOnly', nature: 'count', sides: true, wide: [0, 40] },
  { id: 'insideSpread', text: 'insideSpread', kind: 'credit', nature: 'spread', capBy: 'mainBeam', wide: [0, 70] },
  { id: 'mainBeam', text: 'mainBeam', kind: 'paired', nature: 'length', difference: true, wide: [6, 75] },
]

const point = (id: string, text: string): Line =>
  ({ id, text, kind: 'paired', nature: 'point', difference: true, pointFrom: INCH, wide: [0, 36] })

const round = (id: string, text: string): Line =>
  ({ id, text, kind: 'paired', nature: 'circumference', difference: true, always: true, wide: [2, 18] })

const points: readonly Line[] = [
  point('g1', 'elk.g1'),
  point('g2', 'elk.g2'),
  point('g3', 'elk.g3'),
  point('g4', 'elk.g4'),
  point('g5', 'elk.g5'),
  point('g6', 'sixthPoint'),
  point('g7', 'seventhPoint'),
]

const rounds: readonly Line[] = [round('h1', 'elk.h1'), round('h2', 'elk.h2'), round('h3', 'elk.h3'), round('h4', 'elk.h4')]

const abnormal = (kind: 'deductedList' | 'addedList'): Line =>
  ({ id: 'abnormalPoints', text: 'abnormalPoints', kind, nature: 'point', tally: 'abnormal', pointFrom: INCH, width: true, wide: [0, 40] })

const crown: Line
  = { id: 'crownPoints', text: 'crownPoints', kind: 'addedList', nature: 'point', tally: 'crown', pointFrom: INCH, width: false, wide: [0, 30] }

const slips: readonly SlipRule[] = [
  { code: 'whole_skull', line: 'insideSpread' },
  { code: 'spread_capped', line: 'insideSpread' },
  { code: 'not_a_point' },
  ...SIDED_SLIPS,
  {
    code: 'circumference_grows',
    pairs: [{ from: 'h1', to: 'h2', over: 2 }, { from: 'h2', to: 'h3', over: 2 }, { from: 'h3', to: 'h4', over: 4 }],
  },
  { code: 'gap_in_points', severity: 'notice', points: ['g2', 'g3', 'g4', 'g5', 'g6', 'g7'] },
]

const keyFigures: readonly KeyFigureRule[] = [
  { code: 'points', beam: 'mainBeam', points: points.map((line) => line.id) },
  { code: 'single', line: 'insideSpread' },
  { code: 'longer', line: 'mainBeam' },
]

const sheet = (...lists: readonly Line[]) => ({
  number: 1,
  family: 'elk',
  step: '1/8',
  lines: [...spreads, ...points, ...rounds, ...lists],
  slips,
  keyFigures,
}) as const

export const ELK = [
  { id: 'elk-typical@1', category: 'elk-typical', species: 'elk', typicality: 'typical', ...sheet(abnormal('deductedList')) },
  { id: 'elk-nontypical@1', category: 'elk-nontypical', species: 'elk', typicality: 'nontypical', ...sheet(abnormal('addedList')) },
  { id: 'roosevelt-elk@1', category: 'roosevelt-elk', species: 'roosevelt-elk', typicality: 'single', ...sheet(abnormal('deductedList'), crown) },
  { id: 'tule-elk@1', category: 'tule-elk', species: 'tule-elk', typicality: 'single', ...sheet(abnormal('deductedList'), crown) },
] as const satisfies readonly SheetDefinition[]
