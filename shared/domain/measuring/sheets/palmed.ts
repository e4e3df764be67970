import type { Line, SheetDefinition } from '../sheet'
import { SIDED_SLIPS } from './common'

/**
 * Moose: a magazine's article on scoring and field notes (greatest spread not capped, points, palms, smallest
 * circumference); the single count of abnormal points and what differs are from memory. Caribou: two field-judging
 * guides (no typical and non-typical); which lines are compared, and that half an inch makes a point, are from memory.
 */

/** Half an inch: what makes a point on a caribou. */
const HALF_INCH = 4

const mooseLines: readonly Line[] = [
  { id: 'greatestSpread', text: 'moose.greatestSpread', kind: 'credit', nature: 'spread', wide: [10, 90] },
  { id: 'abnormalPointCount', text: 'moose.abnormalPointCount', kind: 'deductedCount', nature: 'count', wide: [0, 30] },
  { id: 'normalPoints', text: 'moose.normalPoints', kind: 'countPair', nature: 'count', difference: true, wide: [0, 40] },
  { id: 'palmWidth', text: 'moose.palmWidth', kind: 'paired', nature: 'palm', difference: true, wide: [1, 35] },
  { id: 'palmLength', text: 'moose.palmLength', kind: 'paired', nature: 'palm', difference: true, wide: [4, 65] },
  { id: 'beamCircumference', text: 'moose.beamCircumference', kind: 'paired', nature: 'circumference', difference: true, always: true, wide: [3, 14] },
]

const length = (id: string, difference: boolean, most: number): Line =>
  ({ id, text: `caribou.${id}`, kind: 'paired', nature: 'length', difference, pointFrom: HALF_INCH, wide: [0, most] })

const topPoint = (id: string, most: number): Line =>
  ({ id, text: `caribou.${id}`, kind: 'paired', nature: 'point', difference: true, pointFrom: HALF_INCH, wide: [0, most] })

const palm = (id: string, difference: boolean, most: number): Line =>
  ({ id, text: `caribou.${id}`, kind: 'paired', nature: 'palm', difference, wide: [0, most] })

const round = (id: string): Line =>
  ({ id, text: `caribou.${id}`, kind: 'paired', nature: 'circumference', difference: true, always: true, wide: [2, 20] })

const caribouLines: readonly Line[] = [
  { id: 'tipToTip', text: 'tipToTip', kind: 'recordOnly', nature: 'spread', sides: false, wide: [0, 70] },
  { id: 'greatestSpread', text: 'greatestSpread', kind: 'recordOnly', nature: 'spread', sides: false, wide: [4, 75] },
  { id: 'insideSpread', text: 'insideSpread', kind: 'credit', nature: 'spread', capBy: 'mainBeam', wide: [0, 65] },
  { id: 'points', text: 'caribou.points', kind: 'countPair', nature: 'count', difference: true, wide: [0, 50] },
  { id: 'browPoints', text: 'caribou.browPoints', kind: 'countPair', nature: 'count', difference: false, wide: [0, 25] },
  { id: 'mainBeam', text: 'mainBeam', kind: 'paired', nature: 'length', difference: true, wide: [6, 75] },
  length('browLength', false, 32),
  length('bezLength', true, 40),
  topPoint('rearPoint', 20),
  topPoint('secondTopPoint', 35),
  topPoint('longestTopPoint', 40),
  palm('browPalmWidth', false, 30),
  palm('topPalmWidth', true, 25),
  round('h1'), round('h2'), round('h3'), round('h4'),
]

export const PALMED = [
  {
    id: 'moose@1',
    category: 'moose',
    number: 1,
    species: 'moose',
    typicality: 'single',
    family: 'moose',
    step: '1/8',
    lines: mooseLines,
    slips: [{ code: 'whole_skull', line: 'greatestSpread' }, ...SIDED_SLIPS],
    keyFigures: [
      { code: 'counted_points', lines: ['normalPoints'] },
      { code: 'single', line: 'greatestSpread' },
      { code: 'longer', line: 'palmLength' },
    ],
  },
  {
    id: 'caribou@1',
    category: 'caribou',
    number: 1,
    species: 'caribou',
    typicality: 'single',
    family: 'caribou',
    step: '1/8',
    lines: caribouLines,
    slips: [
      { code: 'whole_skull', line: 'insideSpread' },
      { code: 'spread_capped', line: 'insideSpread' },
      { code: 'not_a_point' },
      ...SIDED_SLIPS,
      { code: 'circumference_grows', pairs: [{ from: 'h1', to: 'h2', over: 2 }, { from: 'h2', to: 'h3', over: 2 }] },
    ],
    keyFigures: [
      { code: 'counted_points', lines: ['points', 'browPoints'] },
      { code: 'single', line: 'insideSpread' },
      { code: 'longer', line: 'mainBeam' },
    ],
  },
] as const satisfies readonly SheetDefinition[]
