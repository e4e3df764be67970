import type { KeyFigureRule, Line, SheetDefinition, SlipRule } from '../sheet'
import { INCH, SIDED_SLIPS } from './common'

/**
 * White-tailed, Coues', mule, Columbian and Sitka black-tailed deer. Lines: published sheet walk-throughs, and a public
 * agency's slides on scoring (points, beam, spread, four circumferences); lines of mule deer: a how-to article.
 * Wide bounds are from memory; they only catch slips of the pen.
 */

const spreads: readonly Line[] = [
  { id: 'tipToTip', text: 'tipToTip', kind: 'recordOnly', nature: 'spread', sides: false, wide: [0, 50] },
  { id: 'greatestSpread', text: 'greatestSpread', kind: 'recordOnly', nature: 'spread', sides: false, wide: [2, 60] },
  { id: 'points', text: 'points', kind: 'recordOnly', nature: 'count', sides: true, wide: [0, 60] },
  { id: 'insideSpread', text: 'insideSpread', kind: 'credit', nature: 'spread', capBy: 'mainBeam', wide: [0, 40] },
  { id: 'mainBeam', text: 'mainBeam', kind: 'paired', nature: 'length', difference: true, wide: [2, 40] },
]

const point = (id: string, text: string, most: number): Line =>
  ({ id, text, kind: 'paired', nature: 'point', difference: true, pointFrom: INCH, wide: [0, most] })

const round = (id: string, text: string): Line =>
  ({ id, text, kind: 'paired', nature: 'circumference', difference: true, always: true, wide: [1, 12] })

const abnormal = (kind: 'deductedList' | 'addedList'): Line =>
  ({ id: 'abnormalPoints', text: 'abnormalPoints', kind, nature: 'point', tally: 'abnormal', pointFrom: INCH, width: true, wide: [0, 30] })

const simplePoints: readonly Line[] = [
  point('g1', 'browTine', 14),
  point('g2', 'secondPoint', 22),
  point('g3', 'thirdPoint', 20),
  point('g4', 'fourthPoint', 18),
  point('g5', 'fifthPoint', 16),
  point('g6', 'sixthPoint', 14),
  point('g7', 'seventhPoint', 12),
]

const forkedPoints: readonly Line[] = [
  point('g1', 'browTine', 10),
  point('g2', 'forked.secondPoint', 26),
  point('g3', 'forked.thirdPoint', 22),
  point('g4', 'forked.fourthPoint', 22),
]

const simpleRounds: readonly Line[] = [
  round('h1', 'deer.h1'), round('h2', 'deer.h2'), round('h3', 'deer.h3'), round('h4', 'deer.h4'),
]

const forkedRounds: readonly Line[] = [
  round('h1', 'deer.h1'), round('h2', 'deer.h2'), round('h3', 'forked.h3'), round('h4', 'forked.h4'),
]

const common: readonly SlipRule[] = [
  { code: 'whole_skull', line: 'insideSpread' },
  { code: 'spread_capped', line: 'insideSpread' },
  { code: 'not_a_point' },
  ...SIDED_SLIPS,
]

const simpleSlips: readonly SlipRule[] = [
  ...common,
  {
    code: 'circumference_grows',
    pairs: [{ from: 'h1', to: 'h2', over: 2 }, { from: 'h2', to: 'h3', over: 2 }, { from: 'h3', to: 'h4', over: 4 }],
  },
  { code: 'gap_in_points', severity: 'notice', points: ['g2', 'g3', 'g4', 'g5', 'g6', 'g7'] },
]

const forkedSlips: readonly SlipRule[] = [
  ...common,
  { code: 'circumference_grows', pairs: [{ from: 'h1', to: 'h2', over: 2 }] },
  { code: 'gap_in_points', severity: 'blocking', points: ['g2', 'g3'] },
]

const keyFigures = (points: readonly Line[]): readonly KeyFigureRule[] => [
  { code: 'points', beam: 'mainBeam', points: points.map((line) => line.id) },
  { code: 'single', line: 'insideSpread' },
  { code: 'longer', line: 'mainBeam' },
]

const simple = (kind: 'deductedList' | 'addedList') => ({
  number: 1,
  family: 'deer',
  step: '1/8',
  lines: [...spreads, ...simplePoints, ...simpleRounds, abnormal(kind)],
  slips: simpleSlips,
  keyFigures: keyFigures(simplePoints),
}) as const

const forked = (kind: 'deductedList' | 'addedList') => ({
  number: 1,
  family: 'deer',
  step: '1/8',
  lines: [...spreads, ...forkedPoints, ...forkedRounds, abnormal(kind)],
  slips: forkedSlips,
  keyFigures: keyFigures(forkedPoints),
}) as const

export const DEER = [
  { id: 'whitetail-typical@1', category: 'whitetail-typical', species: 'whitetail', typicality: 'typical', ...simple('deductedList') },
  { id: 'whitetail-nontypical@1', category: 'whitetail-nontypical', species: 'whitetail', typicality: 'nontypical', ...simple('addedList') },
  { id: 'coues-typical@1', category: 'coues-typical', species: 'coues', typicality: 'typical', ...simple('deductedList') },
  { id: 'coues-nontypical@1', category: 'coues-nontypical', species: 'coues', typicality: 'nontypical', ...simple('addedList') },
  { id: 'mule-deer-typical@1', category: 'mule-deer-typical', species: 'mule-deer', typicality: 'typical', ...forked('deductedList') },
  { id: 'mule-deer-nontypical@1', category: 'mule-deer-nontypical', species: 'mule-deer', typicality: 'nontypical', ...forked('addedList') },
  { id: 'columbia-blacktail-typical@1', category: 'columbia-blacktail-typical', species: 'columbia-blacktail', typicality: 'typical', ...forked('deductedList') },
  { id: 'columbia-blacktail-nontypical@1', category: 'columbia-blacktail-nontypical', species: 'columbia-blacktail', typicality: 'nontypical', ...forked('addedList') },
  { id: 'sitka-blacktail-typical@1', category: 'sitka-blacktail-typical', species: 'sitka-blacktail', typicality: 'typical', ...forked('deductedList') },
  { id: 'sitka-blacktail-nontypical@1', category: 'sitka-blacktail-nontypical', species: 'sitka-blacktail', typicality: 'nontypical', ...forked('addedList') },
] as const satisfies readonly SheetDefinition[]
