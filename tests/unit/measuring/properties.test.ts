import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import type { Measurements, Reading, SheetDefinition, Side } from '#shared/domain/measuring/index'
import {
  canonicalSheet, CATEGORIES, checkMeasurements, classesFor, compile, currentDefinition, isCount, readMeasurements, roundDown, score, scoreSteps, slips,
  swapSides, toSteps, TOTALS, withoutSpread, writeMeasurements,
} from '#shared/domain/measuring/index'
import { anyMeasurements, anySheet } from './random'

const runs = { numRuns: 500 }

function withSides(measurements: Measurements, id: string, right: Reading, left: Reading): Measurements {
  return { ...measurements, right: { ...measurements.right, [id]: right }, left: { ...measurements.left, [id]: left } }
}

describe('properties of every sheet', () => {
  it('swapping the sides keeps the net, the gross and the differences', () => {
    fc.assert(fc.property(anySheet, ({ definition, measurements }) => {
      const before = score(definition, measurements)
      const after = score(definition, swapSides(measurements))
      expect([after.net, after.gross, after.differences, after.abnormal, after.crown]).toEqual([before.net, before.gross, before.differences, before.abnormal, before.crown])
      expect([after.right, after.left]).toEqual([before.left, before.right])
      expect(swapSides(swapSides(measurements))).toEqual(measurements)
    }), runs)
  })

  const typical = CATEGORIES.filter((category) => currentDefinition(category).typicality === 'typical')
  it.each(typical)('%s: the non-typical net is above the typical one by twice the abnormal total', (category) => {
    const definition = currentDefinition(category)
    const other = classesFor(category).find((candidate) => candidate !== category)!
    fc.assert(fc.property(anyMeasurements(definition), (measurements) => {
      const one = score(definition, measurements)
      const two = score(currentDefinition(other), measurements)
      expect(two.net - one.net).toBe(2 * one.abnormal)
      expect([two.gross, two.grossAll, two.differences]).toEqual([one.gross, one.grossAll, one.differences])
    }), { numRuns: 100 })
  })

  const compared = CATEGORIES.flatMap((category) => currentDefinition(category).lines
    .filter((line) => (line.kind === 'paired' || line.kind === 'countPair') && line.difference)
    .map((line) => [category, line.id, line] as const))
  it.each(compared)('%s: one step more on both sides of %s adds two steps, three where it caps the spread, two inches for counts', (category, id, line) => {
    const definition = currentDefinition(category)
    const caps = definition.lines.some((other) => other.kind === 'credit' && other.capBy === id)
    fc.assert(fc.property(anyMeasurements(definition), fc.integer({ min: 8, max: 190 }), fc.integer({ min: 8, max: 190 }), (measurements, right, left) => {
      const before = score(definition, withSides(measurements, id, right, left))
      const after = score(definition, withSides(measurements, id, right + 1, left + 1))
      const spread = measurements.single.insideSpread
      const capped = caps && typeof spread === 'number' && spread > Math.max(right, left)
      expect(after.net - before.net).toBe(isCount(line) ? 16 : capped ? 3 : 2)
    }), { numRuns: 20 })
  })

  it('the net is never above the gross with its added lists, and no list shows a net above its gross', () => {
    fc.assert(fc.property(anySheet, ({ definition, measurements }) => {
      const { net, gross, added, grossAll } = score(definition, measurements)
      expect(net).toBeLessThanOrEqual(gross + added)
      expect(net).toBeLessThanOrEqual(grossAll)
    }), runs)
  })

  it('the lines\' shares add up to the net', () => {
    fc.assert(fc.property(anySheet, ({ definition, measurements }) => {
      const { net, lines } = score(definition, measurements)
      expect(lines.reduce((sum, line) => sum + line.share, 0)).toBe(net)
    }), runs)
  })

  it('the numeric path gives what the explained one gives', () => {
    const totals = new Int32Array(6)
    fc.assert(fc.property(anySheet, ({ definition, measurements }) => {
      const program = compile(definition)
      const explained = score(definition, measurements)
      scoreSteps(program, toSteps(program, measurements), totals)
      for (const [name, at] of Object.entries(TOTALS)) expect(totals[at], name).toBe(explained[name as keyof typeof TOTALS])
    }), { numRuns: 3000 })
  })

  it('a sheet that is written and read again is the same sheet', () => {
    fc.assert(fc.property(anySheet, ({ definition, measurements }) => {
      const { measurements: again, problems } = readMeasurements(definition, JSON.parse(JSON.stringify(writeMeasurements(definition, measurements))))
      expect(problems).toEqual([])
      expect(again).toEqual(measurements)
      expect(canonicalSheet(definition, again)).toBe(canonicalSheet(definition, measurements))
    }), runs)
  })

  it('a sheet that was kept as JSON is taken back as it was', () => {
    fc.assert(fc.property(anySheet, ({ definition, measurements }) => {
      expect(checkMeasurements(definition, JSON.parse(JSON.stringify(measurements)))).toEqual(measurements)
    }), runs)
  })

  it('rounding down never raises the gross, changes no count, and is at rest after the first time', () => {
    fc.assert(fc.property(anySheet, fc.constantFrom('quarter' as const, 'inch' as const), ({ definition, measurements }, to) => {
      const down = roundDown(definition, measurements, to)
      expect(score(definition, down).gross).toBeLessThanOrEqual(score(definition, measurements).gross)
      expect(score(definition, down).missing).toEqual(score(definition, measurements).missing)
      expect(roundDown(definition, down, to)).toEqual(down)
    }), runs)
  })

  it('a spread that does not count takes nothing else with it', () => {
    fc.assert(fc.property(anySheet, ({ definition, measurements }) => {
      const before = score(definition, measurements)
      const after = score(definition, withoutSpread(definition, measurements))
      expect([after.right, after.left, after.differences, after.abnormal]).toEqual([before.right, before.left, before.differences, before.abnormal])
      if (definition.step === '1/8') expect(after.credit).toBe(0)
    }), runs)
  })

  it('slips are found alike on either side', () => {
    const turned = (side: Side | null) => (side === 'right' ? 'left' : side === 'left' ? 'right' : null)
    const names = (definition: SheetDefinition, measurements: Measurements, turn: boolean) =>
      slips(definition, measurements).map(({ code, line, side }) => `${code} ${line} ${turn ? turned(side) : side}`).sort()
    fc.assert(fc.property(anySheet, ({ definition, measurements }) => {
      expect(names(definition, swapSides(measurements), true)).toEqual(names(definition, measurements, false))
    }), runs)
  })
})
