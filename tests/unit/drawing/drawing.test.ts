import fc from 'fast-check'
import { describe, expect, test } from 'vitest'
import { CATEGORIES, currentDefinition, isCount, isList, NOTHING_MEASURED, readMeasurements, STEPS_PER_INCH, type SheetDefinition } from '#shared/domain/measuring/index'
import { draw, small, type Drawing, type Part } from '#shared/domain/measuring/drawing/index'
import { anySheet } from '../measuring/random'

type Points = readonly { readonly x: number, readonly y: number }[]
/** The tape laid along the drawn curve, piece by piece: the test's own sum, not the drawing's. */
const taped = (curve: Points) => curve.slice(1).reduce((sum, { x, y }, n) => sum + Math.sqrt((x - curve[n]!.x) ** 2 + (y - curve[n]!.y) ** 2), 0)
const everyNumber = (drawing: Drawing) => [...drawing.parts.flatMap(part => [...part.tape, ...part.outline]), ...drawing.ground.flat()].flatMap(({ x, y }) => [x, y])
const sheet = (category: string, written: object) => {
  const definition = currentDefinition(category as never)
  const { measurements, problems } = readMeasurements(definition, written)
  expect(problems).toEqual([])
  return { definition, measurements }
}
const drawn = (category: string, written: object) => {
  const { definition, measurements } = sheet(category, written)
  return draw(definition, measurements)
}

/** Lines whose tape runs along the bone: lengths, points, palms, boss and skulls. Spreads are tried by themselves. */
function lengthsOf(definition: SheetDefinition, part: Part, read: (line: string) => number): number | null {
  const line = definition.lines.find(({ id }) => id === part.line)!
  if (isCount(line) || line.nature === 'spread' || line.nature === 'circumference') return null
  return read(part.line) / STEPS_PER_INCH[definition.step]
}

describe('the drawing of any sheet', () => {
  test('keeps every length within 2 per cent, and never fails', () => {
    fc.assert(fc.property(anySheet, ({ definition, measurements }) => {
      const drawing = draw(definition, measurements)
      expect(everyNumber(drawing).every(Number.isFinite)).toBe(true)
      for (const part of drawing.parts) {
        const of = (line: string) => part.index !== null
          ? measurements.lists[line]![part.index]!.length
          : Number(part.side === null ? measurements.single[line] : measurements[part.side][line])
        const length = lengthsOf(definition, part, of)
        if (length !== null && part.tape.length > 0) expect(Math.abs(taped(part.tape) - length), `${definition.id} ${part.line}`).toBeLessThanOrEqual(Math.max(0.02 * length, 1e-6))
      }
    }), { numRuns: 300 })
  })

  test('shows everything long that was measured, once', () => {
    fc.assert(fc.property(anySheet, ({ definition, measurements }) => {
      const drawing = draw(definition, measurements)
      for (const line of definition.lines.filter(line => line.nature === 'length' || line.nature === 'point')) {
        const wanted = isList(line)
          ? (measurements.lists[line.id] ?? []).filter(point => point.length > 0 && Number(measurements[point.side].mainBeam) > 0).length
          : (['right', 'left'] as const).filter(side => Number(measurements[side][line.id]) > 0 && (line.id !== 'prongLength' || Number(measurements[side].hornLength) > 0)).length
        expect(drawing.parts.filter(part => part.line === line.id).length, `${definition.id} ${line.id}`).toBe(wanted)
      }
    }), { numRuns: 100 })
  })

  test('has a small form of at most 400 bytes of path', () => {
    fc.assert(fc.property(anySheet, ({ definition, measurements }) => {
      const path = small(draw(definition, measurements))
      expect(Buffer.byteLength(path)).toBeLessThanOrEqual(400)
      expect(path).toMatch(/^(?:M\d+ ?-?\d+(?:l-?\d+ ?-?\d+)*z?)*$/)
    }), { numRuns: 100 })
  })

  test.each(CATEGORIES)('of an empty sheet is empty: %s', (category) => {
    expect(draw(currentDefinition(category), NOTHING_MEASURED)).toMatchObject({ parts: [], ground: [], residuals: [], box: { left: 0, right: 0 } })
  })
})

describe('a rack', () => {
  const BEAMS = { right: { mainBeam: '23 1/8', h1: '4 5/8', h4: '3 7/8' }, left: { mainBeam: '22 7/8', h1: '4 4/8', h4: '4' } }

  test('stands as wide inside as its inside spread, and its tips as far apart as tip to tip, as far as one bow can', () => {
    for (const [spread, tips] of [['22 3/8', '18 1/8'], ['17', '12'], ['25', '24'], ['14 4/8', '8']]) {
      const { residuals, parts } = drawn('whitetail-typical', { insideSpread: spread, tipToTip: tips, ...BEAMS })
      expect(residuals, `${spread} ${tips}`).toEqual([])
      const [inner] = parts.filter(part => part.line === 'insideSpread')
      expect(taped(inner!.tape)).toBeCloseTo(sheet('whitetail-typical', { insideSpread: spread }).measurements.single.insideSpread as number / 8, 0)
    }
  })

  test('tells what it cannot keep: a spread over twice the beam', () => {
    const { residuals } = drawn('whitetail-typical', { insideSpread: '40', right: { mainBeam: '12' }, left: { mainBeam: '12' } })
    expect(residuals).toMatchObject([{ line: 'insideSpread', wanted: 40 }])
    expect(residuals[0]!.drawn).toBeLessThan(40)
  })

  test('the animal\'s right is at the reader\'s left, and swapping the sides mirrors the picture', () => {
    const one = drawn('elk-typical', { insideSpread: '40', right: { mainBeam: '50', g1: '15' }, left: { mainBeam: '48' } })
    expect(one.parts.filter(part => part.line === 'mainBeam').map(part => [part.side, Math.sign(part.tape.at(-1)!.x)])).toEqual([['right', -1], ['left', 1]])
    const other = drawn('elk-typical', { insideSpread: '40', left: { mainBeam: '50', g1: '15' }, right: { mainBeam: '48' } })
    expect(other.box.left).toBeCloseTo(-one.box.right, 9)
    expect(other.box.top).toBeCloseTo(one.box.top, 9)
  })

  test('with one side, with points and no beam, with a spike, with eleven by three points', () => {
    expect(drawn('mule-deer-typical', { right: { mainBeam: '20', g2: '12', g3: '8' } }).parts.every(part => part.side === 'right')).toBe(true)
    expect(drawn('mule-deer-typical', { left: { g2: '12' } }).parts.map(part => part.line)).toEqual(['g2'])
    expect(drawn('whitetail-typical', { insideSpread: '6', right: { mainBeam: '9' }, left: { mainBeam: '8' } }).parts.filter(part => part.outline.length > 0)).toHaveLength(2)
    const many = drawn('whitetail-nontypical', {
      insideSpread: '18', abnormalPoints: Array.from({ length: 5 }, () => ({ side: 'right', length: '3' })),
      right: { mainBeam: '22', g1: '5', g2: '9', g3: '9', g4: '7', g5: '4' }, left: { mainBeam: '22', g1: '5', g2: '9' },
    })
    expect(many.parts.filter(part => part.side === 'right' && part.outline.length > 0)).toHaveLength(11)
  })

  test('a fork of mule deer grows from its back fork', () => {
    const { parts } = drawn('mule-deer-typical', { right: { mainBeam: '23', g2: '14', g3: '9' } })
    const [g2, g3] = ['g2', 'g3'].map(line => parts.find(part => part.line === line)!.tape)
    expect(Math.min(...g2!.map(({ x, y }) => Math.hypot(x - g3![0]!.x, y - g3![0]!.y)))).toBeLessThan(0.5)
  })
})

describe('palms, horns and skulls', () => {
  test('a moose reaches as far as its greatest spread', () => {
    const side = { normalPoints: 10, palmWidth: '13', palmLength: '38', beamCircumference: '7 4/8' }
    const { residuals, box } = drawn('moose', { greatestSpread: '54', abnormalPointCount: 0, right: side, left: side })
    expect(residuals).toEqual([])
    expect(box.right - box.left).toBeCloseTo(54, 0)
  })

  test('a skull is as long and as wide as it was taped', () => {
    const { box, view } = drawn('black-bear', { skullLength: '12', skullWidth: '7 8/16' })
    expect(view).toBe('above')
    expect([box.bottom - box.top, box.right - box.left]).toEqual([expect.closeTo(12, 6), expect.closeTo(7.5, 6)])
  })

  test('quarters lie by the longer horn, so that a short horn may have ended before the last', () => {
    const base = { baseCircumference: '15', firstQuarter: '14', secondQuarter: '12', thirdQuarter: '8' }
    const { parts } = drawn('bighorn-sheep', { right: { hornLength: '36', ...base }, left: { hornLength: '24', ...base } })
    const quarters = (side: string) => parts.filter(part => part.side === side && /Quarter/.test(part.line)).map(part => part.line)
    expect(quarters('right')).toEqual(['firstQuarter', 'secondQuarter', 'thirdQuarter'])
    expect(quarters('left')).toEqual(['firstQuarter', 'secondQuarter'])
  })
})
