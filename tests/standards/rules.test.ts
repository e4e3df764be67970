import { describe, expect, it } from 'vitest'
import type { Category } from '#shared/domain/measuring/index'
import {
  classesFor, currentDefinition, DRYING_DAYS, formatSteps, keyFigures, parseLength, readMeasurements, roundDown, score, slips, toSixteenths,
} from '#shared/domain/measuring/index'

/** The published standard, rule by rule. Each test names its source, or says that there is none. */

function sheet(category: Category, raw: unknown) {
  const definition = currentDefinition(category)
  const { measurements, problems } = readMeasurements(definition, raw)
  expect(problems).toEqual([])
  const result = score(definition, measurements)
  const shown = (steps: number | null) => (steps === null ? null : formatSteps(steps, definition.step))
  return { definition, measurements, result, shown, line: (id: string) => result.lines.find((candidate) => candidate.id === id)! }
}

const both = (side: Record<string, string | number>) => ({ right: side, left: side })

describe('units', () => {
  it('keeps antlers and horns in eighths that are never reduced (pronghorn measuring instructions, published leaflet copy)', () => {
    expect(currentDefinition('pronghorn').step).toBe('1/8')
    expect(formatSteps(1500, '1/8')).toBe('187 4/8')
  })

  it('keeps skulls in sixteenths (outfitters\' guide "How to measure a bear skull"; Outdoor Life, June 2011)', () => {
    for (const category of ['black-bear', 'grizzly-bear', 'cougar'] as const) expect(currentDefinition(category).step).toBe('1/16')
    expect(formatSteps(300, '1/16')).toBe('18 12/16')
  })

  it('has eighths of 3.175 mm exactly (international yard and pound agreement, 1959: 1 in = 25.4 mm)', () => {
    const eighth = parseLength('0 1/8', '1/8')
    expect(eighth.ok && (eighth.value * 254_000) / 8).toBe(31_750)
    expect(toSixteenths(171, '1/8')).toBe(342)
  })

  it('lets one point count one inch (common practice, no source)', () => {
    const { line, shown } = sheet('moose', both({ normalPoints: 11 }))
    expect(shown(line('normalPoints').counted)).toBe('22 0/8')
  })
})

describe('the sum', () => {
  it('adds credit and columns to the gross and takes differences off (published white-tailed sheet walk-throughs)', () => {
    const { result, shown } = sheet('whitetail-typical', {
      insideSpread: '15', right: { mainBeam: '20 1/8', g2: '8' }, left: { mainBeam: '19 7/8', g2: '8 4/8' },
    })
    expect(shown(result.credit)).toBe('15 0/8')
    expect(shown(result.right)).toBe('28 1/8')
    expect(shown(result.left)).toBe('28 3/8')
    expect(shown(result.gross)).toBe('71 4/8')
    expect(shown(result.differences)).toBe('0 6/8')
    expect(shown(result.net)).toBe('70 6/8')
  })

  it('takes the whole length of the other side where one side lacks a line (walk-throughs for the sum; the lack from memory)', () => {
    const { line, shown } = sheet('whitetail-typical', { right: { g5: '2 3/8' }, left: { g5: 'absent' } })
    expect(shown(line('g5').counted)).toBe('2 3/8')
    expect(shown(line('g5').difference)).toBe('2 3/8')
    expect(line('g5').share).toBe(0)
    expect(line('g5').notes).toEqual([{ code: 'one_side_only', side: 'right', difference: 19 }])
  })

  it('credits the inside spread no further than the longer beam (published white-tailed sheet walk-throughs)', () => {
    const { line, shown } = sheet('whitetail-typical', { insideSpread: '25 1/8', right: { mainBeam: '24 3/8' }, left: { mainBeam: '23 6/8' } })
    expect(shown(line('insideSpread').counted)).toBe('24 3/8')
    expect(line('insideSpread').notes).toEqual([{ code: 'capped', line: 'mainBeam', read: 201, counted: 195 }])
  })

  it('credits a spread that equals the longer beam in full (published white-tailed sheet walk-throughs)', () => {
    const { line, shown } = sheet('whitetail-typical', { insideSpread: '24 3/8', right: { mainBeam: '24 3/8' }, left: { mainBeam: '23 6/8' } })
    expect(shown(line('insideSpread').counted)).toBe('24 3/8')
    expect(line('insideSpread').notes).toEqual([])
  })

  it('shows the gross with abnormal and crown points beside the frame without them (common practice, no source)', () => {
    const { result, shown } = sheet('roosevelt-elk', {
      ...both({ mainBeam: '40' }),
      abnormalPoints: [{ side: 'left', length: '2' }], crownPoints: [{ side: 'right', length: '6 4/8' }],
    })
    expect([shown(result.gross), shown(result.grossAll)]).toEqual(['80 0/8', '88 4/8'])
  })
})

describe('deer', () => {
  it('takes abnormal points off a typical head and adds them to a non-typical one (Buck Manager, 10 June 2008)', () => {
    const raw = { ...both({ mainBeam: '20' }), abnormalPoints: [{ side: 'left', length: '3 1/8' }, { side: 'right', length: '1 1/8' }] }
    expect(sheet('mule-deer-typical', raw).result.net).toBe(320 - 34)
    expect(sheet('mule-deer-nontypical', raw).result.net).toBe(320 + 34)
  })

  it('has seven points a side on white-tailed and Coues\' deer and four on mule and black-tailed deer (published lines; that a further point is abnormal, from memory)', () => {
    const points = (category: Category) => currentDefinition(category).lines.filter((line) => /^g\d$/.test(line.id)).length
    expect((['whitetail-typical', 'coues-nontypical', 'mule-deer-typical', 'columbia-blacktail-typical', 'sitka-blacktail-nontypical'] as const).map(points))
      .toEqual([7, 7, 4, 4, 4])
  })

  it('always has four circumferences a side (Texas Parks and Wildlife, Kerr Wildlife Management Area, slides on scoring)', () => {
    const { definition, measurements } = sheet('whitetail-typical', { right: { h1: '4', h2: '4', h3: '4', h4: 'absent' } })
    expect(definition.lines.filter((line) => line.nature === 'circumference')).toHaveLength(4)
    expect(slips(definition, measurements)).toMatchObject([{ code: 'incomplete', line: 'h4', side: 'right', severity: 'blocking' }])
  })

  it('calls a projection a point from one inch on (Texas Parks and Wildlife, Kerr Wildlife Management Area, slides on scoring)', () => {
    const total = (length: string) => sheet('whitetail-nontypical', { abnormalPoints: [{ side: 'right', length }] }).result.abnormal
    expect(total('0 7/8')).toBe(0)
    expect(total('1 0/8')).toBe(8)
    const tine = (g1: string) => sheet('whitetail-typical', both({ g1 })).result.gross
    expect(tine('0 7/8')).toBe(0)
    expect(tine('1')).toBe(16)
  })

  it('asks a point to be longer than wide; equal is not longer (the same slides; 1 2/8 long and 0 4/8 wide: common practice, no source)', () => {
    const total = (length: string, width: string) =>
      sheet('whitetail-nontypical', { abnormalPoints: [{ side: 'right', length, width }] }).result.abnormal
    expect(total('1 2/8', '0 4/8')).toBe(10)
    expect(total('1 2/8', '1 2/8')).toBe(0)
    expect(total('1 2/8', '1 1/8')).toBe(10)
    expect(total('1 2/8', '1 3/8')).toBe(0)
  })

  it('counts the tip of the beam as a point and measures it as beam (common practice, no source)', () => {
    const { definition, measurements } = sheet('mule-deer-typical', {
      insideSpread: '22', right: { mainBeam: '24', g1: '2', g2: '12', g3: '9', g4: '10' }, left: { mainBeam: '23 4/8', g2: '12', g3: '9', g4: '10' },
      abnormalPoints: [{ side: 'right', length: '2' }, { side: 'right', length: '0 6/8' }],
    })
    expect(keyFigures(definition, measurements)).toEqual([
      { code: 'points', right: 6, left: 4 },
      { code: 'single', line: 'insideSpread', steps: 176 },
      { code: 'longer', line: 'mainBeam', steps: 192 },
    ])
  })
})

describe('elk', () => {
  it('has seven points and four circumferences a side that begin above the first point (How to score your elk, July 2015; names from memory)', () => {
    const { lines } = currentDefinition('elk-typical')
    expect(lines.filter((line) => /^g\d$/.test(line.id))).toHaveLength(7)
    expect(lines.filter((line) => /^h\d$/.test(line.id)).map((line) => line.text)).toEqual(['elk.h1', 'elk.h2', 'elk.h3', 'elk.h4'])
  })

  it('adds crown points of Roosevelt\'s and Tule elk without comparing sides (Journal of Mountain Hunting: treated apart; the rest from memory)', () => {
    for (const category of ['roosevelt-elk', 'tule-elk'] as const) {
      const { result } = sheet(category, {
        ...both({ mainBeam: '40' }), crownPoints: [{ side: 'right', length: '8 3/8' }], abnormalPoints: [{ side: 'right', length: '1 4/8' }],
      })
      expect([result.differences, result.crown, result.net]).toEqual([0, 67, 640 + 67 - 12])
    }
    expect(currentDefinition('elk-typical').lines.some((line) => line.id === 'crownPoints')).toBe(false)
  })
})

describe('moose and caribou', () => {
  it('credits the greatest spread of a moose in full (ODU Magazine, moose; field notes on Shiras moose)', () => {
    expect(sheet('moose', { greatestSpread: '66 3/8', ...both({ palmLength: '20' }) }).line('greatestSpread').counted).toBe(531)
  })

  it('takes one inch for each abnormal point of a moose (from memory)', () => {
    const { result } = sheet('moose', { greatestSpread: '50', abnormalPointCount: 3 })
    expect([result.gross, result.abnormal, result.net]).toEqual([400, 24, 376])
  })

  it('compares the points of a moose (magazine article; from memory)', () => {
    const { line } = sheet('moose', { right: { normalPoints: 13 }, left: { normalPoints: 11 } })
    expect(line('normalPoints').difference).toBe(16)
  })

  it('has one class of caribou, with or without odd points (two field-judging guides)', () => {
    expect(classesFor('caribou')).toEqual(['caribou'])
  })

  it('never compares the brow lines of a caribou, for one side may have a shovel and the other none (from memory)', () => {
    const { result } = sheet('caribou', { right: { browPoints: 6, browLength: '17', browPalmWidth: '12' }, left: { browPoints: 1, browLength: 'absent' } })
    expect(result.differences).toBe(0)
    expect(result.gross).toBe((6 + 1 + 17 + 12) * 8)
  })

  it('calls half an inch a point on a caribou (from memory)', () => {
    const gross = (rearPoint: string) => sheet('caribou', both({ rearPoint })).result.gross
    expect([gross('0 3/8'), gross('0 4/8')]).toEqual([0, 8])
  })
})

describe('horns', () => {
  it('has the lines of the leaflet on a pronghorn (pronghorn measuring instructions; differences from memory)', () => {
    expect(currentDefinition('pronghorn').lines.filter((line) => line.kind === 'paired').map((line) => line.id))
      .toEqual(['hornLength', 'baseCircumference', 'firstQuarter', 'secondQuarter', 'thirdQuarter', 'prongLength'])
    expect(sheet('pronghorn', { right: { prongLength: '5 3/8' }, left: { prongLength: '5 6/8' } }).result.differences).toBe(3)
  })

  it('lets a broomed horn cost only its own length (Field & Stream, how to score bighorn sheep\'s horns)', () => {
    for (const category of ['bighorn-sheep', 'desert-sheep', 'dall-sheep', 'stone-sheep'] as const) {
      const { result } = sheet(category, { right: { hornLength: '38 4/8', baseCircumference: '15' }, left: { hornLength: '35 1/8', baseCircumference: '14 7/8' } })
      expect(result.differences).toBe(1)
    }
  })

  it('compares the length of goat and bison horns (field evaluation leaflet, mountain goat, 2011, for the lines; differences from memory)', () => {
    for (const category of ['mountain-goat', 'bison'] as const) {
      expect(sheet(category, { right: { hornLength: '10 2/8' }, left: { hornLength: '10' } }).result.differences).toBe(2)
    }
  })

  it('measures boss and first quarter of a muskox as widths (from memory)', () => {
    expect(currentDefinition('muskox').lines.filter((line) => line.nature === 'width').map((line) => line.id)).toEqual(['bossWidth', 'firstQuarterWidth'])
  })
})

describe('skulls', () => {
  it('adds length and width: 11 9/16 + 7 3/16 = 18 12/16 (Outdoor Life, June 2011)', () => {
    const { result, shown } = sheet('black-bear', { skullLength: '11 9/16', skullWidth: '7 3/16' })
    expect([shown(result.gross), shown(result.net), result.differences]).toEqual(['18 12/16', '18 12/16', 0])
  })

  it('cannot be certified where bone is gone at a measuring place (common practice, no source)', () => {
    const { definition, measurements } = sheet('cougar', { skullLength: 'absent', skullWidth: '6' })
    expect(slips(definition, measurements)).toMatchObject([{ code: 'incomplete', line: 'skullLength', severity: 'blocking' }])
  })
})

describe('drying', () => {
  const certified = (driedSince: string, measuredOn: string) => {
    const { definition, measurements } = sheet('black-bear', { skullLength: '11 9/16', skullWidth: '7 3/16' })
    return slips(definition, measurements, { driedSince, measuredOn, wholeSkull: true }).map((slip) => slip.code)
  }

  it('asks for sixty days, the day counted from being day 0 (Idaho Fish and Game, news releases of 1 March 2020 and 14 February 2025)', () => {
    expect(DRYING_DAYS).toBe(60)
    expect(certified('2020-01-01', '2020-02-29')).toEqual(['too_fresh'])
    expect(certified('2020-01-01', '2020-03-01')).toEqual([])
  })
})

describe('rough scores', () => {
  it('can rise by rounding down, since what is taken off shrinks too (common practice, no source)', () => {
    const { definition, measurements, result } = sheet('whitetail-typical', { right: { g2: '9' }, left: { g2: '7 7/8' } })
    expect(score(definition, roundDown(definition, measurements, 'inch')).net).toBeLessThan(result.net)
    const other = sheet('whitetail-typical', { right: { g2: '9 7/8' }, left: { g2: '9' }, abnormalPoints: [{ side: 'left', length: '5 7/8' }] })
    expect(score(other.definition, roundDown(other.definition, other.measurements, 'inch')).net).toBeGreaterThan(other.result.net)
  })
})

describe('classes', () => {
  it('lets one head of deer or elk enter typical and non-typical, and no other species\' class', () => {
    expect(classesFor('mule-deer-nontypical')).toEqual(['mule-deer-typical', 'mule-deer-nontypical'])
    expect(classesFor('elk-typical')).toEqual(['elk-typical', 'elk-nontypical'])
    expect(classesFor('tule-elk')).toEqual(['tule-elk'])
  })
})
