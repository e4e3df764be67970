import { describe, expect, test } from 'vitest'
import * as fc from 'fast-check'
import { Temporal } from 'temporal-polyfill'
import { addDays, daysBetween, firstMeasuringDay, formatInexactDate, isDay, isOver, lastDayOfTerm, parseInexactDate, publicDate } from '../../../shared/domain/dates'
import { addressKey, fold, foldedWords, nameKey } from '../../../shared/domain/fold'
import { compareListed, percentile, ranksInOrder, standingOf } from '../../../shared/domain/ranking'

const anyDay = fc.date({ min: new Date('1000-01-01'), max: new Date('9000-12-31'), noInvalidDate: true }).map(date => date.toISOString().slice(0, 10))

describe('days', () => {
  test.each(['2026-03-02', '2024-02-29', '2000-02-29', '1000-01-01', '9999-12-31'])('%s is a day', day => expect(isDay(day)).toBe(true))
  test.each(['2026-02-29', '1900-02-29', '2026-13-01', '2026-00-10', '2026-04-31', '2026-1-1', '0999-12-31', '2026-03-02T00:00', ' 2026-03-02', '', 'today'])('%s is none', day => expect(isDay(day)).toBe(false))

  test('adding and counting agree with the Temporal library', () => {
    fc.assert(fc.property(anyDay, fc.integer({ min: -4000, max: 4000 }), (day, days) => {
      const expected = Temporal.PlainDate.from(day).add({ days })
      fc.pre(expected.year >= 1000 && expected.year <= 9999)
      expect(addDays(day, days)).toBe(expected.toString())
      expect(daysBetween(day, expected.toString())).toBe(days)
    }))
  })

  test('a text that is no day is a defect', () => {
    expect(() => addDays('soon', 1)).toThrow(RangeError)
    expect(() => daysBetween('2026-02-30', '2026-03-01')).toThrow('not a day: 2026-02-30')
  })

  test('a term ends at the end of its last day; drying counts from day 0', () => {
    expect(lastDayOfTerm('2026-03-02', 30)).toBe('2026-04-01')
    expect(isOver('2026-04-01', '2026-04-01')).toBe(false)
    expect(isOver('2026-04-01', '2026-04-02')).toBe(true)
    expect(firstMeasuringDay('2025-12-31', 60)).toBe('2026-03-01')
  })

  test.each([
    ['1987', { first: '1987-01-01', last: '1987-12-31', precision: 'year' }],
    ['1987-02', { first: '1987-02-01', last: '1987-02-28', precision: 'month' }],
    ['1988-02', { first: '1988-02-01', last: '1988-02-29', precision: 'month' }],
    ['1987-12', { first: '1987-12-01', last: '1987-12-31', precision: 'month' }],
    ['1987-11-09', { first: '1987-11-09', last: '1987-11-09', precision: 'day' }],
    ['unknown', { first: '1000-01-01', last: '9999-12-31', precision: 'unknown' }],
  ] as const)('%s as far as it is known', (text, date) => {
    expect(parseInexactDate(text)).toEqual(date)
    expect(formatInexactDate(date)).toBe(text)
  })

  test.each(['', '0987', '87', '1987-13', '1987-00', '1987-02-30', '1987-2', 'x1987', '1987x', '1987-02x', 'about 1987', '0987-05'])('%s is no date', text => expect(parseInexactDate(text)).toBeNull())

  test('the day is never public, the month only with consent', () => {
    const of = (text: string, show: 'year' | 'month') => publicDate(parseInexactDate(text)!, show)
    expect(of('1987-11-09', 'year')).toBe('1987')
    expect(of('1987-11-09', 'month')).toBe('1987-11')
    expect(of('1987-11', 'month')).toBe('1987-11')
    expect(of('1987-11', 'year')).toBe('1987')
    expect(of('1987', 'month')).toBe('1987')
    expect(of('unknown', 'month')).toBeNull()
    expect(of('unknown', 'year')).toBeNull()
  })
})

describe('folding', () => {
  test('marks and letters that stand alone', () => {
    expect(fold('Ćwikła Ødegård Þór Straße ÆŒ Ħð ıŋŧ')).toBe('cwikla odegard thor strasse aeoe hd int')
    expect(fold('ﬁne')).toBe('fine')
    expect(foldedWords('  O’Hara-Łoś,  4½ ')).toEqual(['ohara', 'los', '41', '2'])
    expect(foldedWords('O\'Hara Oʼhara O`hara')).toEqual(['ohara', 'ohara', 'ohara'])
    expect(foldedWords('—')).toEqual([])
  })

  test('one person\'s name in any order, with or without initials', () => {
    expect(nameKey('Wren Q. Tarnley')).toBe('tarnley wren')
    expect(nameKey('TARNLEY, Wren')).toBe('tarnley wren')
    expect(nameKey('Wren Q')).toBe('q wren')
    expect(nameKey('W. Q.')).toBe('q w')
    expect(nameKey('??')).toBe('')
  })

  test('one address in two spellings', () => {
    expect(addressKey('12 North Mill Street, Alderfall')).toBe('12 n mill st alderfall')
    expect(addressKey('12 N. Mill St. Alderfall')).toBe('12 n mill st alderfall')
    expect(addressKey('Post Office Box 4')).toBe('po box 4')
    expect(addressKey('South Road East Avenue West Lane Drive Court Place Highway Apartment 3')).toBe('s rd e ave w ln dr ct pl hwy apt 3')
    expect(addressKey(' , ')).toBeNull()
    expect(addressKey(null)).toBeNull()
  })
})

describe('ranks', () => {
  const COUNTS = [{ net16: 100, n: 2 }, { net16: 120, n: 1 }, { net16: 90, n: 3 }]
  test('equal nets share a rank and the next is skipped', () => {
    expect(ranksInOrder([120, 100, 100, 90])).toEqual([1, 2, 2, 4])
    expect(ranksInOrder([5, 5, 5])).toEqual([1, 1, 1])
    expect(ranksInOrder([])).toEqual([])
  })

  test('from counts: where a net stands or would stand', () => {
    expect(standingOf(COUNTS, 100)).toEqual({ rank: 2, sharedBy: 2, total: 6, below: 3 })
    expect(standingOf(COUNTS, 121)).toEqual({ rank: 1, sharedBy: 0, total: 6, below: 6 })
    expect(standingOf(COUNTS, 89)).toEqual({ rank: 7, sharedBy: 0, total: 6, below: 0 })
    expect(standingOf([], 1)).toEqual({ rank: 1, sharedBy: 0, total: 0, below: 0 })
  })

  test('both ways agree for every list', () => {
    fc.assert(fc.property(fc.array(fc.integer({ min: 1, max: 30 }), { maxLength: 40 }), (nets) => {
      const sorted = [...nets].sort((a, b) => b - a)
      const counts = [...new Set(nets)].map(net16 => ({ net16, n: nets.filter(net => net === net16).length }))
      expect(sorted.map(net => standingOf(counts, net).rank)).toEqual(ranksInOrder(sorted))
    }))
  })

  test('percentile: the share that stands lower, rounded down', () => {
    expect(percentile(standingOf(COUNTS, 100))).toBe(50)
    expect(percentile(standingOf(COUNTS, 120))).toBe(83)
    expect(percentile(standingOf([], 5))).toBeNull()
  })

  test('list order: net, then the earlier taking, then the earlier record', () => {
    const a = { net16: 100, takenFirstOn: '1990-01-01', id: 2 }
    expect(compareListed(a, { ...a, net16: 101 })).toBeGreaterThan(0)
    expect(compareListed(a, { ...a, net16: 99 })).toBeLessThan(0)
    expect(compareListed(a, { ...a, takenFirstOn: '1991-01-01' })).toBeLessThan(0)
    expect(compareListed(a, { ...a, takenFirstOn: '1989-01-01' })).toBeGreaterThan(0)
    expect(compareListed(a, { ...a, id: 3 })).toBeLessThan(0)
    expect(compareListed(a, { ...a, id: 1 })).toBeGreaterThan(0)
    expect(compareListed(a, { ...a })).toBe(0)
  })
})
