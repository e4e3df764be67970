import { describe, expect, it } from 'vitest'
import type { Category, Certifying, Say } from '#shared/domain/measuring/index'
import {
  CATEGORIES, currentDefinition, DEFINITIONS, keyFigures, keyFigureText, lineInstruction, lineLabel, noteText, problemText, readMeasurements, score, slips, slipText,
} from '#shared/domain/measuring/index'
import texts from '../../../i18n/locales/en/sheet.json'

/** As the message files are read: a key that is not there, or a parameter that is not given, fails. */
const say: Say = (key, params = {}) => {
  const text = key.split('.').reduce<unknown>((node, part) => (node as Record<string, unknown> | undefined)?.[part], texts)
  if (typeof text !== 'string') throw new Error(`no text for ${key}`)
  return text.replace(/\{(\w+)\}/g, (_, name: string) => {
    if (params[name] === undefined) throw new Error(`${key} needs ${name}`)
    return String(params[name])
  })
}

const slipTexts = (category: Category, raw: Record<string, unknown>, certifying?: Certifying) => {
  const definition = currentDefinition(category)
  return slips(definition, readMeasurements(definition, raw).measurements, certifying).map((slip) => slipText(say, definition, slip))
}

describe('every line of every sheet has its words', () => {
  it.each(CATEGORIES)('%s', (category) => {
    for (const line of currentDefinition(category).lines) {
      expect(lineLabel(say, line)).toMatch(/^[A-Z]/)
      expect(lineInstruction(say, line)).toMatch(/\.$/)
    }
  })

  it('labels of one sheet are told apart', () => {
    for (const definition of DEFINITIONS) {
      const labels = definition.lines.map((line) => lineLabel(say, line))
      expect(new Set(labels).size).toBe(labels.length)
    }
  })
})

describe('slips are told in words', () => {
  it('on antlers', () => {
    expect(slipTexts('mule-deer-typical', {
      insideSpread: '30', right: { mainBeam: '24', g1: '0 7/8', g3: '9', h1: '4', h2: '4 3/8' }, left: { mainBeam: '17', h1: 'absent' },
      abnormalPoints: [{ side: 'left', length: '0 5/8' }, { side: 'left', length: '2', width: '2' }, { side: 'right', length: '40' }],
    })).toEqual([
      'The inside spread of 30 0/8 is longer than the longer beam. 24 0/8 counts.',
      'Brow tine (G1), right: 0 7/8 is shorter than 1 0/8, so it is no point and is left out.',
      'Abnormal points, number 1: 0 5/8 is shorter than 1 0/8, so it is no point and is left out.',
      'Abnormal points, number 2: 2 0/8 long and 2 0/8 wide is not longer than wide, so it is no point and is left out.',
      'Main beam: 24 0/8 on the right and 17 0/8 on the left, 7 0/8 apart. Please measure both once more.',
      'Abnormal points, number 3: 40 0/8 is outside anything usual (0 0/8 to 30 0/8). A slip of the pen?',
      'Second circumference (H2), right, is 4 3/8, more than the place below it (4 0/8). It should shrink. Was the tape at the smallest place?',
      'Third point, branch of the second (G3) grows from Second point, back fork (G2), but on the right side that one is empty. One of them is in the wrong place.',
      'First circumference (H1), left has its place on every head. Without it the sheet cannot be certified.',
    ])
    expect(slipTexts('elk-typical', { right: { mainBeam: '51', g2: '17', g4: '19', g5: '11' }, left: { mainBeam: '50', g2: '16', g3: '15', g4: '18', g5: '10' } })).toEqual([
      'All 4 lengths of the right side are about one inch longer. Did the tape begin at the one-inch mark? Measure one line again from the other end of the tape.',
      'Third point (G3), right, is empty, but Fifth point (G5) is there. Broken, never grew, or not measured yet?',
    ])
  })

  it('on horns and skulls, and when certifying', () => {
    expect(slipTexts('bison', { right: { baseCircumference: '12', firstQuarter: '13' } })).toEqual([
      'First quarter circumference, right, is 13 0/8, more than the base (12 0/8). Was it taken at its mark?',
    ])
    expect(slipTexts('cougar', { skullLength: '30' }, { measuredOn: '2026-01-31', driedSince: '2026-01-01', wholeSkull: true })).toEqual([
      'Skull length: 30 0/16 is outside anything usual (5 0/16 to 11 0/16). A slip of the pen?',
      'Skull width is neither measured nor marked as not there.',
      'It has dried for 30 days since 2026-01-01. 60 are needed before an official measuring.',
    ])
    expect(slipTexts('moose', { greatestSpread: '50' }, { measuredOn: '2026-05-31', driedSince: '2026-01-01', wholeSkull: false })[0])
      .toBe('The skull is split, so Greatest spread cannot count. Mark it as not there.')
  })
})

describe('measurements that cannot be read are told in words', () => {
  const told = (raw: unknown, category: Category = 'whitetail-typical') => {
    const definition = currentDefinition(category)
    return readMeasurements(definition, raw).problems.map((problem) => problemText(say, definition, problem))
  }

  it('with the two nearest steps, and what was probably meant', () => {
    expect(told({ insideSpread: '22.3', tipToTip: '21 9/8', greatestSpread: '٢١' })).toEqual([
      'That falls between two steps: 22 2/8 or 22 3/8? A tape that reads between two is written as the lower.',
      'The fraction is a whole inch or more. Did you mean 22 1/8?',
      'Please write it with the digits 0 to 9: 21',
    ])
  })

  it('each code has its sentence', () => {
    const bad = ['x', '1,5', '-2', '999', { a: 1 }]
    for (const value of bad) expect(told({ insideSpread: value })).toHaveLength(1)
    expect(told({ right: { points: '2.5' }, left: { points: 900 } })).toHaveLength(2)
    expect(told([])).toHaveLength(1)
    expect(told({ nose: 1, right: 1, abnormalPoints: 1 })).toHaveLength(3)
    expect(told({ abnormalPoints: [{ side: 'up', length: '1' }, { side: 'left' }] })).toHaveLength(2)
    expect(told({ abnormalPoints: Array.from({ length: 300 }, () => 1) })).toEqual(['A list holds at most 200 points; 300 were given.'])
    expect(problemText(say, currentDefinition('moose'), { code: 'empty', args: {} })).toBe('Nothing is written here.')
  })
})

describe('notes and key figures are told in words', () => {
  it('what happened to a line', () => {
    const definition = currentDefinition('whitetail-typical')
    const { measurements } = readMeasurements(definition, { insideSpread: '30', right: { mainBeam: '24', g1: '0 7/8', g2: '9' }, left: { mainBeam: '23' } })
    const result = score(definition, measurements)
    expect(result.lines.flatMap((line) => line.notes.map((note) => noteText(say, definition, note)))).toEqual([
      '30 0/8 was read; no more counts than the longer Main beam: 24 0/8',
      'right: 0 7/8 is no point and is left out',
      'on the right only: its whole length is a difference',
    ])
    expect(keyFigures(definition, measurements).map((figure) => keyFigureText(say, definition, figure))).toEqual(['2 × 1 points', '30 0/8 inside', 'longer beam 24 0/8'])
  })

  it('every key figure has its words', () => {
    for (const definition of DEFINITIONS) {
      for (const rule of definition.keyFigures) {
        if ('line' in rule) expect(keyFigureText(say, definition, { code: rule.code, line: rule.line, steps: 8 })).not.toBe('')
      }
    }
  })
})
