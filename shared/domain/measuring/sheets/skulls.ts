import type { SheetDefinition } from '../sheet'

/**
 * Bears and cougar: length without the lower jaw and width, by caliper, in sixteenths (outfitters' guide; Outdoor Life,
 * June 2011). Where bone is gone at a measuring place the skull cannot be certified (common practice, no source).
 */
const skull = (length: readonly [number, number], width: readonly [number, number]) => ({
  number: 1,
  typicality: 'single',
  family: 'skull',
  step: '1/16',
  lines: [
    { id: 'skullLength', text: 'skull.skullLength', kind: 'credit', nature: 'skull', always: true, wide: length },
    { id: 'skullWidth', text: 'skull.skullWidth', kind: 'credit', nature: 'skull', always: true, wide: width },
  ],
  slips: [{ code: 'unlikely' }],
  keyFigures: [
    { code: 'single', line: 'skullLength' },
    { code: 'single', line: 'skullWidth' },
  ],
}) as const

export const SKULLS = [
  { id: 'black-bear@1', category: 'black-bear', species: 'black-bear', ...skull([6, 16], [4, 11]) },
  { id: 'grizzly-bear@1', category: 'grizzly-bear', species: 'grizzly-bear', ...skull([8, 20], [5, 14]) },
  { id: 'cougar@1', category: 'cougar', species: 'cougar', ...skull([5, 11], [3, 9]) },
] as const satisfies readonly SheetDefinition[]
