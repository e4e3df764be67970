import { describe, expect, it } from 'vitest'
import type { Category } from '#shared/domain/measuring/index'
import {
  compile, countedOnList, currentDefinition, keyFigures, matchOtherSide, matchUnmeasured, NOT_THERE, NOTHING_MEASURED, readMeasurements, roundDown, score, scoreSteps,
  toSteps, withoutSpread,
} from '#shared/domain/measuring/index'

const read = (category: Category, raw: unknown) => readMeasurements(currentDefinition(category), raw).measurements
const scored = (category: Category, raw: unknown) => score(currentDefinition(category), read(category, raw))
const line = (category: Category, raw: unknown, id: string) => scored(category, raw).lines.find((candidate) => candidate.id === id)

describe('every line is explained', () => {
  it('a paired line: both sides, what counts, the difference, its share', () => {
    expect(line('whitetail-typical', { right: { g2: '8' }, left: { g2: '7 4/8' } }, 'g2')).toEqual({
      id: 'g2', kind: 'paired', nature: 'point', text: 'secondPoint', single: null, right: 64, left: 60, points: null, counted: 124, difference: 4, share: 120, notes: [],
    })
  })

  it('a credit, capped and not', () => {
    const head = { insideSpread: '20', right: { mainBeam: '18' }, left: { mainBeam: '19' } }
    expect(line('elk-typical', head, 'insideSpread')).toEqual({
      id: 'insideSpread', kind: 'credit', nature: 'spread', text: 'insideSpread', single: 160, right: null, left: null, points: null, counted: 152, difference: null, share: 152,
      notes: [{ code: 'capped', line: 'mainBeam', read: 160, counted: 152 }],
    })
    expect(line('moose', { greatestSpread: '60' }, 'greatestSpread')).toMatchObject({ counted: 480, share: 480, notes: [] })
  })

  it('a deducted count: one inch each off the net, none off the frame', () => {
    expect(line('moose', { abnormalPointCount: 2 }, 'abnormalPointCount')).toMatchObject({ single: 2, counted: 16, share: -16 })
    expect(scored('moose', { greatestSpread: '60', abnormalPointCount: 2 })).toMatchObject({ gross: 480, grossAll: 496, abnormal: 16, added: 0, net: 464 })
  })

  it('a count pair with and without difference', () => {
    const head = { right: { points: 14, browPoints: 6 }, left: { points: 16, browPoints: 1 } }
    expect(line('caribou', head, 'points')).toMatchObject({ right: 14, left: 16, counted: 240, difference: 16, share: 224 })
    expect(line('caribou', head, 'browPoints')).toMatchObject({ counted: 56, difference: null, share: 56 })
  })

  it('lists: taken off, added, with what was left out', () => {
    const head = { abnormalPoints: [{ side: 'right', length: '2' }, { side: 'left', length: '0 6/8' }, { side: 'left', length: '1', width: '1' }] }
    const notes = [{ code: 'left_out', side: 'left', read: 6 }, { code: 'left_out', side: 'left', read: 8 }]
    expect(line('whitetail-typical', head, 'abnormalPoints')).toEqual({
      id: 'abnormalPoints', kind: 'deductedList', nature: 'point', text: 'abnormalPoints', single: null, right: null, left: null,
      points: [{ side: 'right', length: 16, counted: true }, { side: 'left', length: 6, counted: false }, { side: 'left', length: 8, width: 8, counted: false }],
      counted: 16, difference: null, share: -16, notes,
    })
    expect(line('whitetail-nontypical', head, 'abnormalPoints')).toMatchObject({ counted: 16, share: 16, notes })
    expect(line('whitetail-typical', {}, 'abnormalPoints')).toMatchObject({ points: null, counted: 0, share: 0 })
    expect(line('whitetail-typical', { abnormalPoints: [] }, 'abnormalPoints')).toMatchObject({ points: [] })
  })

  it('what is only recorded counts nothing, single and on sides', () => {
    const head = { tipToTip: '8', right: { points: 6 }, left: { points: 5 } }
    expect(line('whitetail-typical', head, 'tipToTip')).toMatchObject({ single: 64, counted: 0, share: 0, difference: null })
    expect(line('whitetail-typical', head, 'points')).toMatchObject({ right: 6, left: 5, counted: 0, share: 0, difference: null, notes: [] })
    expect(scored('whitetail-typical', head).gross).toBe(0)
  })

  it('notes which side alone has a line, and what is no point, from either side', () => {
    expect(line('elk-typical', { right: { g6: '4' } }, 'g6')?.notes).toEqual([{ code: 'one_side_only', side: 'right', difference: 32 }])
    expect(line('elk-typical', { left: { g6: '4' } }, 'g6')?.notes).toEqual([{ code: 'one_side_only', side: 'left', difference: 32 }])
    expect(line('elk-typical', { right: { g6: '0 7/8' }, left: { g6: '4' } }, 'g6')?.notes)
      .toEqual([{ code: 'left_out', side: 'right', read: 7 }, { code: 'one_side_only', side: 'left', difference: 32 }])
    expect(line('elk-typical', { right: { g6: '4' }, left: { g6: '0 7/8' } }, 'g6')?.notes)
      .toEqual([{ code: 'left_out', side: 'left', read: 7 }, { code: 'one_side_only', side: 'right', difference: 32 }])
    expect(line('elk-typical', { right: { g6: '0' }, left: { g6: 'absent' } }, 'g6')?.notes).toEqual([])
    expect(line('bighorn-sheep', { right: { hornLength: '30' }, left: { hornLength: 'absent' } }, 'hornLength')?.notes).toEqual([])
    expect(line('moose', { right: { normalPoints: 3 } }, 'normalPoints')?.notes).toEqual([{ code: 'one_side_only', side: 'right', difference: 24 }])
  })

  it('an empty sheet is 0 everywhere and names everything as missing', () => {
    expect(score(currentDefinition('black-bear'), NOTHING_MEASURED)).toMatchObject({
      definition: 'black-bear@1', category: 'black-bear', step: '1/16', complete: false, missing: ['skullLength', 'skullWidth'], unrecorded: [], gross: 0, grossAll: 0, net: 0,
    })
  })

  it('is complete when every counting line is measured or not there, recorded lines or not', () => {
    const side = { hornLength: '10', baseCircumference: '5', firstQuarter: '4', secondQuarter: '3', thirdQuarter: 'absent' }
    expect(scored('mountain-goat', { right: side, left: side })).toMatchObject({ complete: true, missing: [], unrecorded: ['greatestSpread', 'tipToTip'] })
    expect(scored('mountain-goat', { right: side, left: { ...side, thirdQuarter: '' } })).toMatchObject({ complete: false, missing: ['left.thirdQuarter'] })
  })

  it('stands in the order in which a person adds: spreads, beams, points, circumferences, lists', () => {
    expect(scored('whitetail-typical', {}).lines.map(({ id }) => id)).toEqual([
      'tipToTip', 'greatestSpread', 'points', 'insideSpread', 'mainBeam', 'g1', 'g2', 'g3', 'g4', 'g5', 'g6', 'g7', 'h1', 'h2', 'h3', 'h4', 'abnormalPoints',
    ])
  })
})

describe('the numeric path', () => {
  const program = compile(currentDefinition('roosevelt-elk'))

  it('lays a sheet out as its slots and its lists', () => {
    const values = toSteps(program, read('roosevelt-elk', {
      insideSpread: '30', right: { mainBeam: '40', g1: 'absent' }, abnormalPoints: [{ side: 'left', length: '2', width: '1' }], crownPoints: [{ side: 'left', length: '3' }],
    }))
    const at = (id: string, place: string) => values[program.slots.findIndex((slot) => slot.id === id && slot.place === place)]
    expect([at('insideSpread', 'single'), at('mainBeam', 'right'), at('mainBeam', 'left'), at('g1', 'right')]).toEqual([240, 320, NOT_THERE, NOT_THERE])
    expect([...values.slice(program.slots.length)]).toEqual([1, 16, 8, 1, 24, NOT_THERE])
    expect([program.definition, program.lists]).toEqual(['roosevelt-elk@1', ['abnormalPoints', 'crownPoints']])
  })

  it('writes over one array for a whole run', () => {
    const totals = new Int32Array(6)
    expect(scoreSteps(program, toSteps(program, read('roosevelt-elk', { right: { mainBeam: '40' } })), totals)).toBe(totals)
    scoreSteps(program, toSteps(program, NOTHING_MEASURED), totals)
    expect([...totals]).toEqual([0, 0, 0, 0, 0, 0])
  })
})

describe('rounding down', () => {
  it('takes every measurement to the quarter or the whole inch below, never a count', () => {
    const raw = { greatestSpread: '60 7/8', abnormalPointCount: 3, right: { normalPoints: 13, palmWidth: '12 3/8', palmLength: 'absent' }, left: { palmWidth: '12 2/8' } }
    const definition = currentDefinition('moose')
    expect(roundDown(definition, read('moose', raw), 'quarter')).toEqual({
      single: { greatestSpread: 486, abnormalPointCount: 3 }, right: { normalPoints: 13, palmWidth: 98, palmLength: 'absent' }, left: { palmWidth: 98 }, lists: {},
    })
    expect(roundDown(definition, read('moose', raw), 'inch')).toMatchObject({ single: { greatestSpread: 480 }, right: { palmWidth: 96 }, left: { palmWidth: 96 } })
    const same = read('moose', raw)
    expect(roundDown(definition, same, 'none')).toBe(same)
  })

  it('goes by sixteenths on skulls', () => {
    expect(roundDown(currentDefinition('cougar'), read('cougar', { skullLength: '8 7/16', skullWidth: '5 15/16' }), 'quarter').single).toEqual({ skullLength: 132, skullWidth: 92 })
  })

  it('settles what is a point by the tape as read', () => {
    const definition = currentDefinition('whitetail-nontypical')
    const down = roundDown(definition, read('whitetail-nontypical', {
      abnormalPoints: [{ side: 'left', length: '1 2/8', width: '1 1/8' }, { side: 'left', length: '1 7/8', width: '1 7/8' }, { side: 'right', length: '3 7/8' }],
    }), 'inch')
    expect(down.lists.abnormalPoints).toEqual([{ side: 'left', length: 8 }, { side: 'left', length: 15, width: 15 }, { side: 'right', length: 24 }])
    expect(score(definition, down).abnormal).toBe(32)
  })
})

describe('what may be scored roughly only', () => {
  it('a split skull\'s spread does not count; other spreads and lines stay', () => {
    const head = read('elk-typical', { insideSpread: '40', tipToTip: '30', right: { mainBeam: '50' } })
    expect(withoutSpread(currentDefinition('elk-typical'), head)).toEqual({ ...head, single: { insideSpread: 'absent', tipToTip: 240 } })
    const bear = read('cougar', { skullLength: '8', skullWidth: '5' })
    expect(withoutSpread(currentDefinition('cougar'), bear)).toEqual(bear)
  })

  it('an estimate if the other side matched', () => {
    const head = read('elk-typical', { insideSpread: '40', right: { mainBeam: '50', g1: '10' }, left: { mainBeam: '12' } })
    const right = { mainBeam: 400, g1: 80 }
    expect(matchOtherSide(head, 'right')).toEqual({ ...head, right, left: right })
    expect(matchOtherSide(head, 'left')).toEqual({ ...head, right: { mainBeam: 96 }, left: { mainBeam: 96 } })
  })

  it('a running figure takes only lines that are not measured yet as equal', () => {
    const head = read('elk-typical', { insideSpread: '40', right: { mainBeam: '50', g1: '10', g2: '9' }, left: { g1: 'absent', g2: '8', g3: '11' } })
    expect(matchUnmeasured(currentDefinition('elk-typical'), head)).toEqual({
      ...head, right: { mainBeam: 400, g1: 80, g2: 72, g3: 88 }, left: { mainBeam: 400, g1: 'absent', g2: 64, g3: 88 },
    })
    expect(Object.keys(matchUnmeasured(currentDefinition('elk-typical'), head).right)).toEqual(['mainBeam', 'g1', 'g2', 'g3'])
  })
})

describe('key figures', () => {
  const figures = (category: Category, raw: unknown) => keyFigures(currentDefinition(category), read(category, raw))

  it('say points, widest inside, longer beam on antlers', () => {
    expect(figures('elk-typical', { insideSpread: '40', right: { mainBeam: '50', g1: '10', g2: '0 7/8' }, left: { mainBeam: '51', g1: '10', g2: '1' } })).toEqual([
      { code: 'points', right: 2, left: 3 }, { code: 'single', line: 'insideSpread', steps: 320 }, { code: 'longer', line: 'mainBeam', steps: 408 },
    ])
  })

  it('take the points as counted at the bench before those of the sheet, and crown and abnormal points with them', () => {
    expect(figures('tule-elk', { right: { points: 9, mainBeam: '40' }, left: { mainBeam: '40', g1: '3' }, crownPoints: [{ side: 'left', length: '2' }, { side: 'left', length: '0 4/8' }], abnormalPoints: [{ side: 'left', length: '2', width: '2' }, { side: 'right', length: '2' }] })[0])
      .toEqual({ code: 'points', right: 9, left: 3 })
    expect(figures('tule-elk', { right: { points: 'absent', mainBeam: '40' } })[0]).toEqual({ code: 'points', right: 1, left: 0 })
  })

  it('add brow points on caribou, and say the longer palm of a moose', () => {
    expect(figures('caribou', { right: { points: 14, browPoints: 6 }, left: { points: 16 } })).toEqual([{ code: 'points', right: 20, left: 16 }])
    expect(figures('moose', { greatestSpread: '60', left: { palmLength: '40', normalPoints: 12 } })).toEqual([
      { code: 'points', right: 0, left: 12 }, { code: 'single', line: 'greatestSpread', steps: 480 }, { code: 'longer', line: 'palmLength', steps: 320 },
    ])
  })

  it('say horn length and base, prong, boss, skull', () => {
    expect(figures('pronghorn', { right: { hornLength: '15', baseCircumference: '6', prongLength: '5' }, left: { hornLength: '14' } }).map((figure) => 'line' in figure && `${figure.line} ${figure.steps}`))
      .toEqual(['hornLength 120', 'baseCircumference 48', 'prongLength 40'])
    expect(figures('muskox', { left: { bossWidth: '9' } })).toEqual([{ code: 'longer', line: 'bossWidth', steps: 72 }])
    expect(figures('cougar', { skullLength: '8', skullWidth: '5' })).toEqual([{ code: 'single', line: 'skullLength', steps: 128 }, { code: 'single', line: 'skullWidth', steps: 80 }])
    expect(figures('bison', { right: { hornLength: '17', baseCircumference: '14' } })).toHaveLength(2)
  })

  it('say nothing of what was not measured', () => {
    expect(figures('whitetail-typical', {})).toEqual([])
    expect(figures('caribou', {})).toEqual([])
    expect(figures('bighorn-sheep', { right: { hornLength: 'absent' } })).toEqual([])
  })
})

describe('points on lists by side', () => {
  it('are those that count', () => {
    const result = scored('roosevelt-elk', { abnormalPoints: [{ side: 'left', length: '2' }, { side: 'left', length: '0 4/8' }], crownPoints: [{ side: 'left', length: '2' }, { side: 'right', length: '2' }] })
    expect([countedOnList(result, 'right'), countedOnList(result, 'left')]).toEqual([1, 2])
  })
})
