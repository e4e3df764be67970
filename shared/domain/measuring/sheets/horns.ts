import type { Line, SheetDefinition, SlipRule } from '../sheet'
import { SIDED_SLIPS } from './common'

/**
 * Pronghorn (lines: measuring instructions, published leaflet copy; differences from memory), sheep (how to score bighorn
 * sheep's horns, a magazine article: length is not compared, so a broomed tip costs only itself), mountain goat (field
 * evaluation leaflet of 2011 for the lines; differences from memory), bison and muskox (from memory). Quarters are marked
 * on both horns at 1/4, 2/4 and 3/4 of the longer one.
 */

const horn = (id: string, text: string, nature: 'length' | 'circumference' | 'width', wide: readonly [number, number], difference = true): Line =>
  ({ id, text, kind: 'paired', nature, difference, wide })

const base = (text: string, wide: readonly [number, number]): Line =>
  ({ id: 'baseCircumference', text, kind: 'paired', nature: 'circumference', difference: true, always: true, wide })

const recorded = (id: string, most: number): Line =>
  ({ id, text: id === 'insideSpread' ? 'horn.insideSpread' : `horn.${id}`, kind: 'recordOnly', nature: 'spread', sides: false, wide: [0, most] })

const quarters = (most: number): readonly Line[] => [
  horn('firstQuarter', 'horn.firstQuarter', 'circumference', [0, most]),
  horn('secondQuarter', 'horn.secondQuarter', 'circumference', [0, most]),
  horn('thirdQuarter', 'horn.thirdQuarter', 'circumference', [0, most]),
]

const smallerThanBase: SlipRule = {
  code: 'quarter_not_smaller',
  base: 'baseCircumference',
  quarters: ['firstQuarter', 'secondQuarter', 'thirdQuarter'],
  by: 3,
}

const lengthAndBase = [
  { code: 'longer', line: 'hornLength' },
  { code: 'longer', line: 'baseCircumference' },
] as const

const curled = (lengthCompared: boolean, length: number, around: number, spread: number) => ({
  number: 1,
  typicality: 'single',
  step: '1/8',
  lines: [
    recorded('greatestSpread', spread),
    recorded('tipToTip', spread),
    horn('hornLength', 'horn.hornLength', 'length', [1, length], lengthCompared),
    base('horn.baseCircumference', [1, around]),
    ...quarters(around),
  ],
  slips: [smallerThanBase, ...SIDED_SLIPS],
  keyFigures: lengthAndBase,
}) as const

const sheep = { ...curled(false, 60, 20, 45), family: 'sheep' } as const

export const HORNS = [
  {
    id: 'pronghorn@1',
    category: 'pronghorn',
    number: 1,
    species: 'pronghorn',
    typicality: 'single',
    family: 'pronghorn',
    step: '1/8',
    lines: [
      recorded('insideSpread', 30),
      recorded('tipToTip', 30),
      horn('hornLength', 'pronghorn.hornLength', 'length', [1, 24]),
      base('pronghorn.baseCircumference', [1, 12]),
      ...quarters(12),
      horn('prongLength', 'pronghorn.prongLength', 'length', [0, 12]),
    ],
    slips: [
      // The prong stands at the first two quarters, where the horn may well be thicker than at its base (from memory).
      { code: 'quarter_not_smaller', base: 'baseCircumference', quarters: ['thirdQuarter'], by: 3 },
      ...SIDED_SLIPS,
    ],
    keyFigures: [...lengthAndBase, { code: 'longer', line: 'prongLength' }],
  },
  { id: 'bighorn-sheep@1', category: 'bighorn-sheep', species: 'bighorn-sheep', ...sheep },
  { id: 'desert-sheep@1', category: 'desert-sheep', species: 'desert-sheep', ...sheep },
  { id: 'dall-sheep@1', category: 'dall-sheep', species: 'dall-sheep', ...sheep },
  { id: 'stone-sheep@1', category: 'stone-sheep', species: 'stone-sheep', ...sheep },
  { id: 'mountain-goat@1', category: 'mountain-goat', species: 'mountain-goat', ...curled(true, 15, 9, 20), family: 'goat' },
  { id: 'bison@1', category: 'bison', species: 'bison', ...curled(true, 30, 24, 50), family: 'bison' },
  {
    id: 'muskox@1',
    category: 'muskox',
    number: 1,
    species: 'muskox',
    typicality: 'single',
    family: 'muskox',
    step: '1/8',
    lines: [
      recorded('greatestSpread', 45),
      recorded('tipToTip', 45),
      horn('hornLength', 'horn.hornLength', 'length', [2, 40]),
      horn('bossWidth', 'muskox.bossWidth', 'width', [1, 18]),
      horn('firstQuarterWidth', 'muskox.firstQuarterWidth', 'width', [0, 15]),
      horn('secondQuarter', 'horn.secondQuarter', 'circumference', [0, 20]),
      horn('thirdQuarter', 'horn.thirdQuarter', 'circumference', [0, 20]),
    ],
    slips: SIDED_SLIPS,
    keyFigures: [
      { code: 'longer', line: 'hornLength' },
      { code: 'longer', line: 'bossWidth' },
    ],
  },
] as const satisfies readonly SheetDefinition[]
