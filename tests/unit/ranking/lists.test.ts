import { describe, expect, test } from 'vitest'
import { facetYear, listsOf, recordTokens, searchTokens, shownName, sortName } from '../../../shared/domain/lists'

describe('how a name stands in the lists', () => {
  test.each([
    ['  Wren   Tarnley ', 'full', 'Wren Tarnley'],
    ['Wren Tarnley', 'initials', 'W. T.'],
    ['Anne-Lise van Ørsted', 'initials', 'A. L. V. Ø.'],
    ['(Bo) O\'Dray 3rd', 'initials', 'B. O. R.'],
    ['12', 'initials', ''],
    ['Wren Tarnley', 'withheld', ''],
  ] as const)('%j as %s is %j', (name, printedAs, shown) => expect(shownName(name, printedAs)).toBe(shown))

  test.each([['Wren Ash Tarnley', 'Tarnley, Wren Ash'], ['Tarnley', 'Tarnley'], ['', '']])('%j is sorted as %j', (shown, sorted) => expect(sortName(shown)).toBe(sorted))
})

describe('the words under which a record is found', () => {
  test('are the beginnings, two to ten letters long, of its name, its numbers and its old number', () => {
    expect(recordTokens({ recordNo: 7, formerNo: 'B-12', hunterShown: 'Åse Featherstonehaugh' }).sort()).toEqual([
      '12', '7', 'as', 'ase', 'b', 'fe', 'fea', 'feat', 'feath', 'feathe', 'feather', 'feathers', 'featherst', 'feathersto',
    ].sort())
    expect(recordTokens({ recordNo: 123, formerNo: null, hunterShown: '' })).toEqual(['12', '123'])
  })

  test('a word that was typed is looked up by its first ten letters, each once', () => {
    expect(searchTokens('Featherstonehaugh ÅSE ase')).toEqual(['feathersto', 'ase'])
    expect(searchTokens('  —  ')).toEqual([])
  })
})

describe('the lists that a record stands in', () => {
  test('are region and district, for all methods and its own', () => {
    expect(listsOf({ classId: 3, districtId: 9, method: 'rifle' })).toEqual([
      { classId: 3, districtId: 0, method: '' }, { classId: 3, districtId: 0, method: 'rifle' },
      { classId: 3, districtId: 9, method: '' }, { classId: 3, districtId: 9, method: 'rifle' },
    ])
  })
  test('are half as many without a method', () => {
    expect(listsOf({ classId: 3, districtId: 9, method: null })).toEqual([{ classId: 3, districtId: 0, method: '' }, { classId: 3, districtId: 9, method: '' }])
  })
  test('a year of taking is counted as it stands, an unknown one as 0', () => {
    expect(facetYear({ firstOn: '1931-01-01', precision: 'year' })).toBe(1931)
    expect(facetYear({ firstOn: '0001-01-01', precision: 'unknown' })).toBe(0)
  })
})
