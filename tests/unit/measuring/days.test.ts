import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { daysBetween } from '#shared/domain/measuring/days'

describe('days on the calendar', () => {
  it.each([
    ['2026-01-01', '2026-01-01', 0], ['2026-01-01', '2026-03-02', 60], ['2024-02-28', '2024-03-01', 2], ['2023-02-28', '2023-03-01', 1], ['1900-02-28', '1900-03-01', 1],
    ['2000-02-28', '2000-03-01', 2], ['2025-12-31', '2026-01-01', 1], ['2026-03-02', '2026-01-01', -60], ['1931-01-01', '2026-01-01', 34_699],
  ])('from %s to %s are %i', (from, to, days) => {
    expect(daysBetween(from, to)).toBe(days)
  })

  it('are those of the proleptic Gregorian calendar (ECMA-262, Date.UTC)', () => {
    const date = fc.date({ min: new Date('1600-01-01'), max: new Date('2400-12-31'), noInvalidDate: true }).map((day) => day.toISOString().slice(0, 10))
    fc.assert(fc.property(date, date, (from, to) => {
      expect(daysBetween(from, to)).toBe((Date.parse(to) - Date.parse(from)) / 86_400_000)
    }), { numRuns: 2000 })
  })

  it.each(['2026-1-1', '20260101', '2026-01-01T00:00', 'x2026-01-01', ''])('%s is no date', (text) => {
    expect(() => daysBetween(text, '2026-01-01')).toThrow(`not a date: ${text}`)
  })
})
