import { describe, expect, it } from 'vitest'
import type { Category, Certifying } from '#shared/domain/measuring/index'
import { CATEGORIES, currentDefinition, readMeasurements, slipKey, slips } from '#shared/domain/measuring/index'

function caught(category: Category, raw: Record<string, unknown>, certifying?: Certifying) {
  const definition = currentDefinition(category)
  const { measurements, problems } = readMeasurements(definition, raw)
  expect(problems).toEqual([])
  return slips(definition, measurements, certifying)
}

/** Slips of one code as `line side`. */
const places = (code: string, category: Category, raw: Record<string, unknown>, certifying?: Certifying) =>
  caught(category, raw, certifying).filter((slip) => slip.code === code).map((slip) => (slip.side ? `${slip.line} ${slip.side}` : String(slip.line)))

const steps = (value: number) => ({ steps: value, step: '1/8' as const })

describe('spread_capped', () => {
  const head = (insideSpread: string) => ({ insideSpread, right: { mainBeam: '24 3/8' }, left: { mainBeam: '23' } })

  it.each(['whitetail-typical', 'elk-typical', 'caribou', 'tule-elk'] as const)('%s: one step over the longer beam, and not the beam itself', (category) => {
    expect(places('spread_capped', category, head('24 3/8'))).toEqual([])
    expect(places('spread_capped', category, head('24 4/8'))).toEqual(['insideSpread'])
  })

  it('says what counts', () => {
    expect(caught('whitetail-typical', head('25'))).toContainEqual({
      code: 'spread_capped', line: 'insideSpread', side: null, severity: 'notice', args: { read: steps(200), counted: steps(195), by: { line: 'mainBeam' } },
    })
  })

  it('waits until both beams are measured or not there', () => {
    expect(places('spread_capped', 'elk-typical', { insideSpread: '30', right: { mainBeam: '20' } })).toEqual([])
    expect(places('spread_capped', 'elk-typical', { insideSpread: '30', left: { mainBeam: '20' } })).toEqual([])
    expect(places('spread_capped', 'elk-typical', { insideSpread: '30', right: { mainBeam: '20' }, left: { mainBeam: 'absent' } })).toEqual(['insideSpread'])
  })

  it('is no matter on moose, whose spread is not capped', () => {
    expect(places('spread_capped', 'moose', { greatestSpread: '60', right: { palmLength: '30' }, left: { palmLength: '30' } })).toEqual([])
  })
})

describe('not_a_point', () => {
  it('a tine under one inch; one of an inch is one', () => {
    expect(places('not_a_point', 'whitetail-typical', { right: { g1: '0 7/8', g2: '1' }, left: { g1: '0' } })).toEqual(['g1 right'])
    expect(caught('mule-deer-typical', { left: { g1: '0 7/8' } })[0]).toEqual({
      code: 'not_a_point', line: 'g1', side: 'left', severity: 'notice', args: { read: steps(7), least: steps(8) },
    })
  })

  it('on caribou under half an inch', () => {
    expect(places('not_a_point', 'caribou', { right: { rearPoint: '0 3/8', bezLength: '0 4/8' } })).toEqual(['rearPoint right'])
  })

  it('a projection on a list that is short, or not longer than wide; named with its number', () => {
    const found = caught('elk-nontypical', {
      abnormalPoints: [{ side: 'right', length: '1' }, { side: 'left', length: '0 7/8' }, { side: 'right', length: '2', width: '2' }, { side: 'right', length: '2', width: '1 7/8' }],
    })
    expect(found).toEqual([
      { code: 'not_a_point', line: 'abnormalPoints', side: 'left', severity: 'notice', args: { number: { count: 2 }, read: steps(7), least: steps(8) } },
      { code: 'not_a_point', line: 'abnormalPoints', side: 'right', severity: 'notice', args: { number: { count: 3 }, read: steps(16), least: steps(8), width: steps(16) } },
    ])
  })

  it('a crown point under one inch', () => {
    expect(places('not_a_point', 'roosevelt-elk', { crownPoints: [{ side: 'left', length: '0 7/8' }, { side: 'left', length: '1' }] })).toEqual(['crownPoints left'])
  })
})

describe('circumference_grows', () => {
  const grows = (category: Category, right: Record<string, string>) => places('circumference_grows', category, { right })

  it.each(['whitetail-typical', 'coues-nontypical', 'elk-typical', 'elk-nontypical', 'roosevelt-elk', 'tule-elk'] as const)('%s: each of three places, one step over its limit', (category) => {
    expect(grows(category, { h1: '4', h2: '4 2/8', h3: '4 4/8', h4: '5' })).toEqual([])
    expect(grows(category, { h1: '4', h2: '4 3/8' })).toEqual(['h2 right'])
    expect(grows(category, { h2: '4', h3: '4 3/8' })).toEqual(['h3 right'])
    expect(grows(category, { h3: '4', h4: '4 4/8' })).toEqual([])
    expect(grows(category, { h3: '4', h4: '4 5/8' })).toEqual(['h4 right'])
  })

  it.each(['mule-deer-typical', 'columbia-blacktail-nontypical', 'sitka-blacktail-typical'] as const)('%s: the second over the first only', (category) => {
    expect(grows(category, { h1: '4', h2: '4 2/8' })).toEqual([])
    expect(grows(category, { h1: '4', h2: '4 3/8', h3: '5', h4: '6' })).toEqual(['h2 right'])
  })

  it('caribou: not the fourth', () => {
    expect(grows('caribou', { h1: '5', h2: '5 2/8', h3: '5 4/8', h4: '9' })).toEqual([])
    expect(grows('caribou', { h1: '5', h2: '5 3/8' })).toEqual(['h2 right'])
    expect(grows('caribou', { h2: '5', h3: '5 3/8' })).toEqual(['h3 right'])
  })

  it('says from where to where, on the side where it is', () => {
    expect(caught('whitetail-typical', { left: { h1: '4', h2: '4 3/8' } })).toEqual([
      { code: 'circumference_grows', line: 'h2', side: 'left', severity: 'notice', args: { from: { line: 'h1' }, lower: steps(32), upper: steps(35) } },
    ])
  })

  it('needs both places measured', () => {
    expect(grows('whitetail-typical', { h1: 'absent', h2: '4 3/8' })).toEqual([])
    expect(grows('whitetail-typical', { h2: '4 3/8' })).toEqual([])
  })
})

describe('quarter_not_smaller', () => {
  it.each(['bighorn-sheep', 'dall-sheep', 'desert-sheep', 'stone-sheep', 'mountain-goat', 'bison'] as const)('%s: a quarter three steps above the base', (category) => {
    for (const quarter of ['firstQuarter', 'secondQuarter', 'thirdQuarter']) {
      expect(places('quarter_not_smaller', category, { right: { baseCircumference: '5', [quarter]: '5 2/8' } })).toEqual([])
      expect(places('quarter_not_smaller', category, { left: { baseCircumference: '5', [quarter]: '5 3/8' } })).toEqual([`${quarter} left`])
    }
  })

  it('pronghorn: not at the prong', () => {
    expect(places('quarter_not_smaller', 'pronghorn', { right: { baseCircumference: '6', firstQuarter: '7', secondQuarter: '7', thirdQuarter: '6 2/8' } })).toEqual([])
    expect(places('quarter_not_smaller', 'pronghorn', { right: { baseCircumference: '6', thirdQuarter: '6 3/8' } })).toEqual(['thirdQuarter right'])
  })

  it('says both, and needs the base', () => {
    expect(caught('bison', { right: { baseCircumference: '12', firstQuarter: '12 3/8' } })).toEqual([
      { code: 'quarter_not_smaller', line: 'firstQuarter', side: 'right', severity: 'notice', args: { base: steps(96), read: steps(99) } },
    ])
    expect(places('quarter_not_smaller', 'bison', { right: { firstQuarter: '12' } })).toEqual([])
  })

  it('muskox has no base circumference to go by', () => {
    expect(places('quarter_not_smaller', 'muskox', { right: { bossWidth: '5', secondQuarter: '9', thirdQuarter: '12' } })).toEqual([])
  })
})

describe('sides_differ', () => {
  const differ = (category: Category, line: string, right: string, left: string) => places('sides_differ', category, { right: { [line]: right }, left: { [line]: left } })

  it('lengths: a quarter of the longer and at least one inch', () => {
    expect(differ('whitetail-typical', 'g2', '8', '6')).toEqual(['g2'])
    expect(differ('whitetail-typical', 'g2', '8', '6 1/8')).toEqual([])
    expect(differ('whitetail-typical', 'g2', '6', '8')).toEqual(['g2'])
    expect(differ('whitetail-typical', 'g1', '3', '2')).toEqual(['g1'])
    expect(differ('whitetail-typical', 'g1', '3', '2 1/8')).toEqual([])
    expect(differ('mule-deer-typical', 'mainBeam', '24', '18')).toEqual(['mainBeam'])
    expect(differ('mule-deer-typical', 'mainBeam', '24', '18 1/8')).toEqual([])
  })

  it('palms and widths as lengths', () => {
    expect(differ('moose', 'palmWidth', '16', '12')).toEqual(['palmWidth'])
    expect(differ('moose', 'palmWidth', '16', '12 1/8')).toEqual([])
    expect(differ('muskox', 'bossWidth', '8', '6')).toEqual(['bossWidth'])
  })

  it('circumferences: four steps', () => {
    expect(differ('bighorn-sheep', 'baseCircumference', '15', '15 3/8')).toEqual([])
    expect(differ('bighorn-sheep', 'baseCircumference', '15', '15 4/8')).toEqual(['baseCircumference'])
    expect(differ('elk-typical', 'h3', '7 4/8', '7')).toEqual(['h3'])
  })

  it('never where sides are not compared, in counts, or where one side lacks the line or has no point', () => {
    expect(differ('bighorn-sheep', 'hornLength', '38', '20')).toEqual([])
    expect(differ('caribou', 'browPalmWidth', '12', '4')).toEqual([])
    expect(places('sides_differ', 'moose', { right: { normalPoints: 14 }, left: { normalPoints: 4 } })).toEqual([])
    expect(differ('whitetail-typical', 'g5', '4', 'absent')).toEqual([])
    expect(differ('whitetail-typical', 'g5', '4', '0')).toEqual([])
    expect(differ('whitetail-typical', 'g5', '4', '0 7/8')).toEqual([])
    expect(differ('whitetail-typical', 'g5', '4', '1')).toEqual(['g5'])
    expect(differ('whitetail-typical', 'g5', '1', '4')).toEqual(['g5'])
    expect(differ('pronghorn', 'prongLength', '0', '5')).toEqual([])
    expect(differ('pronghorn', 'prongLength', '0 1/8', '5')).toEqual(['prongLength'])
  })

  it('says both sides and what lies between', () => {
    expect(caught('elk-typical', { right: { h1: '8' }, left: { h1: '8 5/8' } })).toEqual([
      { code: 'sides_differ', line: 'h1', side: null, severity: 'notice', args: { right: steps(64), left: steps(69), difference: steps(5) } },
    ])
  })
})

describe('tape_offset', () => {
  const lines = ['mainBeam', 'g2', 'g3', 'g4']
  const offset = (differences: readonly number[], extra: Record<string, string> = {}) => places('tape_offset', 'whitetail-typical', {
    right: { ...Object.fromEntries(differences.map((difference, index) => [lines[index], (160 + difference) / 8])), ...extra },
    left: { ...Object.fromEntries(differences.map((_, index) => [lines[index], 20])), ...extra },
  })

  it('all lengths of one side longer by about an inch, four lines at least', () => {
    expect(offset([6, 8, 10, 9])).toEqual(['null right'])
    expect(offset([-6, -8, -10, -9])).toEqual(['null left'])
    expect(offset([6, 8, 10])).toEqual([])
  })

  it.each([[[5, 8, 10, 9]], [[6, 8, 11, 9]], [[-5, -8, -10, -9]], [[-6, -8, -11, -9]], [[6, 8, 10, -9]], [[6, 8, 10, 0]]])('not %j', (differences) => {
    expect(offset(differences)).toEqual([])
  })

  it('is not hidden by circumferences, which do not reach the tape\'s end, nor by a point on one side only', () => {
    expect(offset([6, 8, 10, 9], { h1: '5', h2: '4' })).toEqual(['null right'])
    expect(places('tape_offset', 'whitetail-typical', {
      right: { mainBeam: '21', g2: '9', g3: '9', g4: '7', g5: '3' }, left: { mainBeam: '20', g2: '8', g3: '8', g4: '6', g5: 'absent' },
    })).toEqual(['null right'])
  })

  it('says on how many lines', () => {
    expect(caught('whitetail-typical', { right: { mainBeam: '21', g2: '9', g3: '9', g4: '8' }, left: { mainBeam: '20', g2: '8', g3: '8', g4: '7' } })).toEqual([
      { code: 'tape_offset', line: null, side: 'right', severity: 'notice', args: { lines: { count: 4 }, longer: { side: 'right' } } },
    ])
  })
})

describe('gap_in_points', () => {
  it.each(['whitetail-typical', 'coues-typical', 'elk-nontypical', 'roosevelt-elk', 'tule-elk'] as const)('%s: a point after one that is absent or not measured', (category) => {
    expect(places('gap_in_points', category, { right: { g2: '8', g3: 'absent', g4: '5' }, left: { g2: '8', g4: '5' } })).toEqual(['g3 right', 'g3 left'])
    expect(places('gap_in_points', category, { right: { g2: '8', g3: '7', g4: '5', g5: 'absent' } })).toEqual([])
    expect(places('gap_in_points', category, { right: { g3: '7' } })).toEqual(['g2 right'])
    expect(places('gap_in_points', category, { right: { g2: '7', g7: '2' } })).toEqual(['g3 right', 'g4 right', 'g5 right', 'g6 right'])
  })

  it('the brow tine apart', () => {
    expect(places('gap_in_points', 'whitetail-typical', { right: { g1: 'absent', g2: '8', g3: '7' } })).toEqual([])
    expect(places('gap_in_points', 'whitetail-typical', { right: { g2: '8' } })).toEqual([])
    expect(places('gap_in_points', 'whitetail-typical', { right: { g1: '4' } })).toEqual([])
  })

  it.each(['mule-deer-typical', 'columbia-blacktail-typical', 'sitka-blacktail-nontypical'] as const)('%s: a third point without a second is blocking; a fourth without a third is ordinary', (category) => {
    expect(caught(category, { right: { g3: '8' } })).toEqual([
      { code: 'gap_in_points', line: 'g2', side: 'right', severity: 'blocking', args: { next: { line: 'g3' } } },
    ])
    expect(places('gap_in_points', category, { right: { g2: '12', g4: '10' } })).toEqual([])
    expect(places('gap_in_points', category, { right: { g2: '12', g3: '10' } })).toEqual([])
  })

  it('is a notice on simple antlers and names the point that stands above', () => {
    expect(caught('elk-typical', { left: { g2: '8', g4: '5' } })).toEqual([
      { code: 'gap_in_points', line: 'g3', side: 'left', severity: 'notice', args: { next: { line: 'g4' } } },
    ])
  })
})

describe('unlikely', () => {
  it('outside wide bounds, which are themselves within', () => {
    expect(places('unlikely', 'whitetail-typical', { right: { mainBeam: '2' }, left: { mainBeam: '40' } })).toEqual([])
    expect(places('unlikely', 'whitetail-typical', { right: { mainBeam: '1 7/8' }, left: { mainBeam: '40 1/8' } })).toEqual(['mainBeam right', 'mainBeam left'])
    expect(places('unlikely', 'grizzly-bear', { skullLength: '20 1/16', skullWidth: '14' })).toEqual(['skullLength'])
    expect(places('unlikely', 'moose', { right: { normalPoints: 41 }, left: { normalPoints: 40 } })).toEqual(['normalPoints right'])
    expect(places('unlikely', 'whitetail-typical', { abnormalPoints: [{ side: 'left', length: '30' }, { side: 'left', length: '30 1/8' }] })).toEqual(['abnormalPoints left'])
  })

  it('says what was read and the bounds', () => {
    expect(caught('moose', { right: { normalPoints: 41 } })[0]?.args).toEqual({ read: { count: 41 }, least: { count: 0 }, most: { count: 40 } })
    expect(caught('whitetail-typical', { abnormalPoints: [{ side: 'left', length: '30 1/8' }] })[0]?.args)
      .toEqual({ read: steps(241), least: steps(0), most: steps(240), number: { count: 1 } })
    expect(caught('cougar', { skullLength: '12' })[0]?.args)
      .toEqual({ read: { steps: 192, step: '1/16' }, least: { steps: 80, step: '1/16' }, most: { steps: 176, step: '1/16' } })
  })

  it('leaves what published means and extremes of white-tailed deer alone (DeYoung and Lukefahr 1995: beam 17.82 in, 2.00 to 26.25; inside spread 15.00 in, 0 to 31.5)', () => {
    const beam = (length: string, insideSpread: string) => places('unlikely', 'whitetail-typical', { insideSpread, right: { mainBeam: length }, left: { mainBeam: length } })
    expect([...beam('2', '0'), ...beam('26.25', '31.5'), ...beam('17 7/8', '15')]).toEqual([])
  })

  it.each(CATEGORIES)('%s has bounds on every line', (category) => {
    for (const line of currentDefinition(category).lines) expect(line.wide, line.id).toBeDefined()
  })
})

describe('certifying', () => {
  const dry: Certifying = { measuredOn: '2026-03-02', driedSince: '2026-01-01', wholeSkull: true }
  const skull = { skullLength: '11 9/16', skullWidth: '7 3/16' }

  it('passes a whole, dry and complete sheet', () => {
    expect(caught('black-bear', skull, dry)).toEqual([])
  })

  it('is blocked under sixty days, and not on the sixtieth', () => {
    expect(caught('black-bear', skull, { ...dry, measuredOn: '2026-03-01' })).toEqual([
      { code: 'too_fresh', line: null, side: null, severity: 'blocking', args: { days: { count: 59 }, needed: { count: 60 }, since: { date: '2026-01-01' } } },
    ])
  })

  it('is blocked by every line that is neither measured nor absent, recorded ones too', () => {
    expect(places('incomplete', 'mountain-goat', { right: { hornLength: '9', baseCircumference: '5' }, left: { hornLength: '9', baseCircumference: '5', firstQuarter: 'absent' } }, dry))
      .toEqual(['firstQuarter right', 'secondQuarter right', 'secondQuarter left', 'thirdQuarter right', 'thirdQuarter left', 'greatestSpread', 'tipToTip'])
    expect(caught('black-bear', { skullLength: '11' }, dry)).toEqual([
      { code: 'incomplete', line: 'skullWidth', side: null, severity: 'blocking', args: { reason: { text: 'not_measured' } } },
    ])
  })

  it('asks for lists, but not for a count of points that follows from the sheet', () => {
    const side = { mainBeam: '20', g1: '3', g2: '9', g3: '8', g4: '5', h1: '4', h2: '4', h3: '4', h4: '4' }
    const head = { insideSpread: '16', tipToTip: '8', greatestSpread: '18', right: side, left: side }
    expect(places('incomplete', 'mule-deer-typical', head, dry)).toEqual(['abnormalPoints'])
    expect(places('incomplete', 'mule-deer-typical', { ...head, abnormalPoints: [] }, dry)).toEqual([])
  })

  it('is blocked where a circumference was given as absent, and a rough sheet says so too', () => {
    expect(places('incomplete', 'elk-typical', { right: { h2: 'absent', h3: '5' }, left: { h4: 'absent' } })).toEqual(['h2 right', 'h4 left'])
    expect(caught('bison', { left: { baseCircumference: 'absent' } })).toEqual([
      { code: 'incomplete', line: 'baseCircumference', side: 'left', severity: 'blocking', args: { reason: { text: 'always_there' } } },
    ])
    expect(places('incomplete', 'bison', { left: { thirdQuarter: 'absent' } })).toEqual([])
  })

  it('is blocked by a spread on a split skull, where a spread counts', () => {
    const split = { ...dry, wholeSkull: false }
    for (const [category, spread] of [['elk-typical', 'insideSpread'], ['whitetail-typical', 'insideSpread'], ['caribou', 'insideSpread'], ['moose', 'greatestSpread']] as const) {
      expect(places('whole_skull', category, { [spread]: '20' }, split)).toEqual([spread])
      expect(places('whole_skull', category, { [spread]: 'absent' }, split)).toEqual([])
      expect(places('whole_skull', category, { [spread]: '20' }, dry)).toEqual([])
      expect(places('whole_skull', category, { [spread]: '20' })).toEqual([])
    }
    expect(places('whole_skull', 'bighorn-sheep', { greatestSpread: '20' }, split)).toEqual([])
    expect(caught('moose', { greatestSpread: '50' }, split)[0]).toEqual({ code: 'whole_skull', line: 'greatestSpread', side: null, severity: 'blocking', args: { line: { line: 'greatestSpread' } } })
  })
})

describe('a slip has a name by which a reason stays with it', () => {
  it('code, line and side', () => {
    expect(slipKey({ code: 'gap_in_points', line: 'g3', side: 'left' })).toBe('gap_in_points:g3:left')
    expect(slipKey({ code: 'too_fresh', line: null, side: null })).toBe('too_fresh::')
  })
})
