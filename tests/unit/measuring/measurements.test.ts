import { describe, expect, it } from 'vitest'
import { canonicalSheet, checkMeasurements, currentDefinition, NOTHING_MEASURED, readMeasurements, score, writeMeasurements } from '#shared/domain/measuring/index'

const deer = currentDefinition('whitetail-typical')
const moose = currentDefinition('moose')
const crowned = currentDefinition('roosevelt-elk')
const problemsOf = (raw: unknown, definition = deer) => readMeasurements(definition, raw).problems.map(({ path, code }) => `${path}: ${code}`)

describe('measurements are read', () => {
  it('from strings, numbers and "absent"; what is empty or missing is not measured', () => {
    const { measurements, problems } = readMeasurements(deer, {
      insideSpread: 15.5, tipToTip: '', greatestSpread: null, right: { mainBeam: ' 21-3 ', g1: 'absent', g2: ' ABSENT ', g3: '   ' }, left: { g3: undefined, points: '6' },
      abnormalPoints: [{ side: 'left', length: '1 5/8', width: '0 5/8' }, { side: 'right', length: 2, width: '' }],
    })
    expect(problems).toEqual([])
    expect(measurements).toEqual({
      single: { insideSpread: 124 }, right: { mainBeam: 171, g1: 'absent', g2: 'absent' }, left: { points: 6 },
      lists: { abnormalPoints: [{ side: 'left', length: 13, width: 5 }, { side: 'right', length: 16 }] },
    })
  })

  it('an absent list is an empty one; a list that is not there was not looked at', () => {
    expect(readMeasurements(deer, { abnormalPoints: 'absent' }).measurements.lists).toEqual({ abnormalPoints: [] })
    expect(readMeasurements(deer, { abnormalPoints: null }).measurements.lists).toEqual({})
    expect(readMeasurements(deer, {}).measurements).toEqual(NOTHING_MEASURED)
  })

  it('counts as whole points', () => {
    expect(readMeasurements(moose, { abnormalPointCount: '3', right: { normalPoints: 13 } }).measurements).toMatchObject({ single: { abnormalPointCount: 3 }, right: { normalPoints: 13 } })
    expect(problemsOf({ right: { normalPoints: '13 4/8' } }, moose)).toEqual(['right.normalPoints: not_whole'])
  })

  it('and every bad field is told with its path while the rest is kept', () => {
    const { measurements, problems } = readMeasurements(deer, {
      insideSpread: '22.3', right: { g2: '21 9/8', g3: '8' }, left: { g2: -2 }, abnormalPoints: [{ side: 'left', length: '1e9' }, { side: 'left', length: '2' }],
    })
    expect(problems).toEqual([
      { path: 'insideSpread', code: 'off_step', args: { below: { steps: 178, step: '1/8' }, above: { steps: 179, step: '1/8' } } },
      { path: 'right.g2', code: 'fraction_over_one', args: { instead: { steps: 177, step: '1/8' } } },
      { path: 'left.g2', code: 'negative', args: {} },
      { path: 'abnormalPoints.0.length', code: 'unreadable', args: {} },
    ])
    expect(measurements).toEqual({ single: {}, right: { g3: 64 }, left: {}, lists: { abnormalPoints: [{ side: 'left', length: 16 }] } })
  })

  it.each([[null], ['sheet'], [[]], [7], [undefined]])('%j is no sheet', (raw) => {
    expect(readMeasurements(deer, raw)).toEqual({ measurements: NOTHING_MEASURED, problems: [{ path: '', code: 'not_a_sheet', args: {} }] })
  })

  it('lines that the sheet does not have are refused, in the wrong place too', () => {
    expect(problemsOf({ spread: '15' })).toEqual(['spread: unknown_line'])
    expect(problemsOf({ mainBeam: '15' })).toEqual(['mainBeam: unknown_line'])
    expect(problemsOf({ right: { insideSpread: '15', g8: '1', abnormalPoints: [] } })).toEqual(['right.insideSpread: unknown_line', 'right.g8: unknown_line', 'right.abnormalPoints: unknown_line'])
    expect(problemsOf(JSON.parse('{"__proto__": "1", "right": {"constructor": "2"}}'))).toEqual(['__proto__: unknown_line', 'right.constructor: unknown_line'])
    expect(readMeasurements(deer, { right: { g8: '1' } }).problems[0]?.args).toEqual({ line: { text: 'right.g8' } })
    expect(problemsOf({ right: { g5: '12' } }, currentDefinition('mule-deer-typical'))).toEqual(['right.g5: unknown_line'])
  })

  it('what has the wrong form is refused', () => {
    expect(problemsOf({ right: '21', left: [] })).toEqual(['right: not_a_side', 'left: not_a_side'])
    expect(problemsOf({ right: { mainBeam: { inches: 21 } }, insideSpread: true })).toEqual(['right.mainBeam: not_a_measurement', 'insideSpread: not_a_measurement'])
    expect(problemsOf({ abnormalPoints: { length: 1 } })).toEqual(['abnormalPoints: not_a_list'])
    expect(problemsOf({ abnormalPoints: ['2', null] })).toEqual(['abnormalPoints.0: not_a_measurement', 'abnormalPoints.1: not_a_measurement'])
    expect(problemsOf({ abnormalPoints: [{ side: 'middle', length: '2' }, { length: '2' }] })).toEqual(['abnormalPoints.0.side: not_a_side', 'abnormalPoints.1.side: not_a_side'])
    expect(problemsOf({ abnormalPoints: [{ side: 'left' }, { side: 'left', length: ' ' }, { side: 'left', length: null }] }))
      .toEqual(['abnormalPoints.0.length: length_missing', 'abnormalPoints.1.length: length_missing', 'abnormalPoints.2.length: length_missing'])
    expect(problemsOf({ abnormalPoints: [{ side: 'left', length: true }, { side: 'left', length: '2', width: '0.3' }] }))
      .toEqual(['abnormalPoints.0.length: not_a_measurement', 'abnormalPoints.1.width: off_step'])
    expect(problemsOf({ abnormalPoints: [{ side: 'left', length: '2', colour: 'brown' }] })).toEqual(['abnormalPoints.0.colour: unknown_line'])
    expect(readMeasurements(deer, { abnormalPoints: [{ side: 'left', length: '2', colour: 'brown' }] }).problems[0]?.args).toEqual({ line: { text: 'colour' } })
  })

  it('a crown point has no width', () => {
    expect(problemsOf({ crownPoints: [{ side: 'left', length: '2', width: '1' }] }, crowned)).toEqual(['crownPoints.0.width: unknown_line'])
  })

  it('a list holds two hundred points and no more', () => {
    const points = (count: number) => Array.from({ length: count }, () => ({ side: 'right', length: '2' }))
    expect(problemsOf({ abnormalPoints: points(200) })).toEqual([])
    expect(readMeasurements(deer, { abnormalPoints: points(201) })).toEqual({
      measurements: NOTHING_MEASURED,
      problems: [{ path: 'abnormalPoints', code: 'too_many_points', args: { most: { count: 200 }, given: { count: 201 } } }],
    })
    expect(problemsOf({ abnormalPoints: points(10_000) })).toEqual(['abnormalPoints: too_many_points'])
  })
})

describe('stored measurements', () => {
  const whole = { single: {}, right: {}, left: {}, lists: {} }

  it('are taken back when they fit the definition', () => {
    const stored = { single: { insideSpread: 1920, tipToTip: 'absent' }, right: { g2: 0, points: 200 }, left: {}, lists: { abnormalPoints: [{ side: 'left', length: 8, width: 4 }] } }
    expect(checkMeasurements(deer, stored)).toEqual(stored)
  })

  it.each([
    [null, 'not an object'], [[], 'not an object'], [{}, 'single'], [{ ...whole, extra: 1 }, 'extra'], [{ ...whole, right: [] }, 'right'], [{ ...whole, lists: null }, 'lists'],
    [{ ...whole, single: { g2: 8 } }, 'single.g2'], [{ ...whole, right: { insideSpread: 8 } }, 'right.insideSpread'], [{ ...whole, right: { g9: 8 } }, 'right.g9'],
    [{ ...whole, single: { abnormalPoints: 8 } }, 'single.abnormalPoints'], [{ ...whole, lists: { g2: 8 } }, 'lists.g2'], [{ ...whole, left: { g2: '8' } }, 'left.g2'],
    [{ ...whole, left: { g2: 8.5 } }, 'left.g2'], [{ ...whole, left: { g2: -1 } }, 'left.g2'], [{ ...whole, left: { g2: 1921 } }, 'left.g2'], [{ ...whole, left: { g2: null } }, 'left.g2'],
    [{ ...whole, left: { points: 201 } }, 'left.points'], [{ ...whole, left: { points: -1 } }, 'left.points'], [{ ...whole, left: { points: 1.5 } }, 'left.points'],
    [{ ...whole, lists: { abnormalPoints: 'absent' } }, 'lists.abnormalPoints'], [{ ...whole, lists: { abnormalPoints: [8] } }, 'lists.abnormalPoints'],
    [{ ...whole, lists: { abnormalPoints: [{ side: 'up', length: 8 }] } }, 'lists.abnormalPoints'], [{ ...whole, lists: { abnormalPoints: [{ side: 'left' }] } }, 'lists.abnormalPoints'],
    [{ ...whole, lists: { abnormalPoints: [{ side: 'left', length: 8, width: 'x' }] } }, 'lists.abnormalPoints'], [{ ...whole, lists: { abnormalPoints: [{ side: 'left', length: 8, note: 1 }] } }, 'lists.abnormalPoints'],
    [{ ...whole, lists: { abnormalPoints: Array.from({ length: 201 }, () => ({ side: 'left', length: 8 })) } }, 'lists.abnormalPoints'],
  ])('%j does not fit: %s', (stored, where) => {
    expect(() => checkMeasurements(deer, stored)).toThrow(new TypeError(`stored measurements do not fit whitetail-typical@1: ${where}`))
  })

  it('hold two hundred points, and no width on a crown', () => {
    expect(() => checkMeasurements(deer, { ...whole, lists: { abnormalPoints: Array.from({ length: 200 }, () => ({ side: 'left', length: 8 })) } })).not.toThrow()
    expect(() => checkMeasurements(crowned, { ...whole, lists: { crownPoints: [{ side: 'left', length: 8, width: 4 }] } })).toThrow(/lists.crownPoints/)
  })
})

describe('a sheet is written', () => {
  const { measurements } = readMeasurements(moose, { greatestSpread: 'absent', abnormalPointCount: 1, right: { normalPoints: 13, palmWidth: 15.5 } })

  it('as people write it, counts as numbers, empty sides left out', () => {
    expect(writeMeasurements(moose, measurements)).toEqual({ greatestSpread: 'absent', abnormalPointCount: 1, right: { normalPoints: 13, palmWidth: '15 4/8' } })
    const list = readMeasurements(deer, { abnormalPoints: [{ side: 'left', length: 2 }, { side: 'right', length: 3, width: 1 }] }).measurements
    expect(writeMeasurements(deer, list)).toEqual({ abnormalPoints: [{ side: 'left', length: '2 0/8' }, { side: 'right', length: '3 0/8', width: '1 0/8' }] })
  })

  it('in one canonical text, with sorted keys and whole numbers (RFC 8785 for such data)', () => {
    expect(canonicalSheet(moose, measurements)).toBe(
      '{"definition":"moose@1","left":{},"lists":{},"right":{"normalPoints":13,"palmWidth":124},"single":{"abnormalPointCount":1,"greatestSpread":"absent"}}')
    const list = readMeasurements(deer, { abnormalPoints: [{ width: '1', side: 'left', length: 2 }], left: { h1: 4, g1: 2 } }).measurements
    expect(canonicalSheet(deer, list)).toBe(
      '{"definition":"whitetail-typical@1","left":{"g1":16,"h1":32},"lists":{"abnormalPoints":[{"length":16,"side":"left","width":8}]},"right":{},"single":{}}')
  })

  it('the order of abnormal points is part of it, the order of keys is not', () => {
    const one = readMeasurements(deer, { right: { g1: 2, g2: 8 }, abnormalPoints: [{ side: 'left', length: 2 }, { side: 'left', length: 3 }] }).measurements
    const two = readMeasurements(deer, { abnormalPoints: [{ length: 2, side: 'left' }, { length: 3, side: 'left' }], right: { g2: 8, g1: 2 } }).measurements
    expect(canonicalSheet(deer, one)).toBe(canonicalSheet(deer, two))
  })
})

describe('an incomplete sheet', () => {
  it('names the counting lines that were not measured, and apart from them what is only recorded', () => {
    const { measurements } = readMeasurements(currentDefinition('bighorn-sheep'), { right: { hornLength: '38', baseCircumference: '15', firstQuarter: '15', secondQuarter: '14', thirdQuarter: 'absent' }, left: { hornLength: 'absent' } })
    const result = score(currentDefinition('bighorn-sheep'), measurements)
    expect(result.complete).toBe(false)
    expect(result.missing).toEqual(['left.baseCircumference', 'left.firstQuarter', 'left.secondQuarter', 'left.thirdQuarter'])
    expect(result.unrecorded).toEqual(['greatestSpread', 'tipToTip'])
  })

  it('names lists that were not looked at', () => {
    expect(score(crowned, NOTHING_MEASURED).missing.slice(-2)).toEqual(['abnormalPoints', 'crownPoints'])
    expect(score(deer, NOTHING_MEASURED).unrecorded).toEqual(['tipToTip', 'greatestSpread', 'right.points', 'left.points'])
  })
})
