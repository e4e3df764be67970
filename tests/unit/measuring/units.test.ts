import { describe, expect, it } from 'vitest'
import fc from 'fast-check'
import type { Step } from '#shared/domain/measuring/index'
import {
  formatSteps, fromSixteenths, LONGEST_INCHES, MOST_POINTS, parseCount, parseLength, splitSteps, STEPS_PER_INCH, toSixteenths,
} from '#shared/domain/measuring/index'

const eighths = (written: string | number) => parseLength(written, '1/8')
const value = (written: string | number, step: Step = '1/8') => {
  const parsed = parseLength(written, step)
  return parsed.ok ? parsed.value : parsed.code
}
const nearest = (written: string | number, step: Step = '1/8') => {
  const parsed = parseLength(written, step)
  if (parsed.ok || parsed.code !== 'off_step') return parsed
  return [parsed.args.below, parsed.args.above].map((argument) =>
    argument && 'steps' in argument ? formatSteps(argument.steps, argument.step) : argument)
}

describe('a length is read in every way of writing', () => {
  it.each([
    ['21 3/8', 171], ['21-3/8', 171], ['21-3', 171], ['21 3', 171], ['21 - 3', 171], ['21.375', 171], ['21.3750', 171], ['21 1/2', 172], ['21', 168],
    ['21 0/8', 168], ['21.0', 168], ['0', 0], ['0 0/8', 0], ['3/8', 3], ['.5', 4], ['21 2/16', 169], ['21 6/16', 171], ['21 4/32', 169],
    ['  21   3/8  ', 171], ['21\u00a03/8', 171], ['21 3 / 8', 171], ['21 3/8"', 171], ['21 3/8 in', 171], ['21 3/8 in.', 171], ['21 inches', 168],
    ['21″', 168], ['21⅜', 171], ['21 ⅜', 171], ['½', 4], ['¼', 2], ['¾', 6], ['⅛', 1], ['⅝', 5], ['⅞', 7], ['21 3⁄8', 171], ['21–3', 171], ['240', 1920], ['007', 56],
    ['21 7', 175], ['21 7/8', 175],
  ])('%s is %i eighths', (written, steps) => {
    expect(value(written)).toBe(steps)
  })

  it.each([['11 9/16', 185], ['11 9', 185], ['11-9', 185], ['11.5625', 185], ['11 1/2', 184], ['11 3/8', 182], ['11', 176], ['11 15', 191]])(
    'on a skull %s is %i sixteenths', (written, steps) => {
      expect(value(written, '1/16')).toBe(steps)
    })

  it.each([[21.375, 171], [21, 168], [0, 0], [0.125, 1], [240, 1920]])('the number %d is %i eighths', (written, steps) => {
    expect(value(written)).toBe(steps)
  })
})

describe('a length off the step is refused with the two nearest steps, the lower first', () => {
  it.each([
    ['22.3', ['22 2/8', '22 3/8']], ['21 3/7', ['21 3/8', '21 4/8']], ['21 1/16', ['21 0/8', '21 1/8']], ['21.99', ['21 7/8', '22 0/8']],
    ['21 10/7', ['22 3/8', '22 4/8']], ['21.3750000000001', ['21 3/8', '21 4/8']], ['0.1249999999999', ['0 0/8', '0 1/8']], ['1/3', ['0 2/8', '0 3/8']],
    ['0.3333333333333333333333', ['0 2/8', '0 3/8']],
  ])('%s', (written, steps) => {
    expect(nearest(written)).toEqual(steps)
  })

  it('on a skull too', () => {
    expect(nearest('11 1/32', '1/16')).toEqual(['11 0/16', '11 1/16'])
    expect(nearest('22.3', '1/16')).toEqual(['22 4/16', '22 5/16'])
  })

  it('for numbers too', () => {
    expect(nearest(22.3)).toEqual(['22 2/8', '22 3/8'])
    expect(nearest(0.1)).toEqual(['0 0/8', '0 1/8'])
  })
})

describe('what is no length is refused with a code of its own', () => {
  it.each([
    ['', 'empty'], ['   ', 'empty'], ['"', 'empty'], ['abc', 'unreadable'], ['21 3/', 'unreadable'], ['/8', 'unreadable'], ['21 3/0', 'unreadable'], ['21 0/0', 'unreadable'],
    ['1e9', 'unreadable'], ['+21', 'unreadable'], ['21 3/8 4', 'unreadable'], ['21.3.8', 'unreadable'], ['0x15', 'unreadable'], ['21.', 'unreadable'], ['--2', 'unreadable'],
    ['-x', 'unreadable'], ['Infinity', 'unreadable'], ['21 3/1234567', 'unreadable'], ['1'.repeat(41), 'unreadable'], ['<b>21</b>', 'unreadable'], ['in', 'empty'], ['21 3 / 8 x', 'unreadable'],
    ['x21', 'unreadable'], ['21 3x', 'unreadable'], ['x21.5', 'unreadable'], ['x3/8', 'unreadable'], ['21 3/8x', 'unreadable'], ['21.5x', 'unreadable'], ['21 1234567', 'unreadable'],
    ['-2', 'negative'], ['- 2', 'negative'], ['−2', 'negative'], ['-.5', 'negative'], ['-21 3/8', 'negative'],
    ['241', 'too_long'], ['240 1/8', 'too_long'], ['240.125', 'too_long'], ['99999999', 'too_long'], ['99999999 1/8', 'too_long'], ['1000000000', 'too_long'], ['99999999.5', 'too_long'],
    ['21 9/8', 'fraction_over_one'], ['21 8/8', 'fraction_over_one'], ['21 8', 'fraction_over_one'], ['21-9', 'fraction_over_one'], ['21 2/2', 'fraction_over_one'], ['9/8', 'fraction_over_one'],
    ['٢١', 'other_digits'], ['۲۱', 'other_digits'], ['२१', 'other_digits'], ['２１', 'other_digits'], ['২১', 'other_digits'], ['๒๑', 'other_digits'], ['٠', 'other_digits'], ['９', 'other_digits'], ['𝟐𝟏', 'unreadable'],
    ['21,375', 'comma'], ['1,000', 'comma'], ['x1,5', 'unreadable'], ['1,5x', 'unreadable'],
  ])('%s: %s', (written, code) => {
    expect(value(written)).toBe(code)
  })

  it.each([[1e9, 'too_long'], [240.125, 'too_long'], [-2, 'negative'], [-0.125, 'negative'], [Number.NaN, 'unreadable'], [Number.POSITIVE_INFINITY, 'unreadable']])(
    'the number %d: %s', (written, code) => {
      expect(value(written)).toBe(code)
    })

  it('says what was probably meant', () => {
    expect(eighths('21 9/8')).toEqual({ ok: false, code: 'fraction_over_one', args: { instead: { steps: 177, step: '1/8' } } })
    expect(eighths('٢١ ٣/٨')).toEqual({ ok: false, code: 'other_digits', args: { reading: { text: '21 3/8' } } })
    expect(eighths('๙')).toEqual({ ok: false, code: 'other_digits', args: { reading: { text: '9' } } })
    expect(eighths('21,375')).toEqual({ ok: false, code: 'comma', args: { reading: { text: '21.375' } } })
    expect(eighths('500')).toEqual({ ok: false, code: 'too_long', args: { most: { count: LONGEST_INCHES } } })
    expect(eighths('')).toEqual({ ok: false, code: 'empty', args: {} })
  })

  it('reads forty characters and no more', () => {
    expect(value(`21.${'0'.repeat(37)}`)).toBe(168)
    expect(value(`21.${'0'.repeat(38)}`)).toBe('unreadable')
  })
})

describe('a count of points', () => {
  const count = (written: string | number) => {
    const parsed = parseCount(written)
    return parsed.ok ? parsed.value : parsed.code
  }

  it.each([
    ['13', 13], [13, 13], ['0', 0], [' 7 ', 7], [200, 200], ['200', 200], ['201', 'too_many'], [201, 'too_many'], ['99999999', 'too_many'], [1e9, 'too_many'], [-1, 'negative'], ['-1', 'negative'],
    [2.5, 'not_whole'], ['2.5', 'not_whole'], ['13 4/8', 'not_whole'], ['21 9/8', 'not_whole'], ['six', 'unreadable'], ['x6', 'unreadable'], ['6x', 'unreadable'], ['', 'empty'], ['٣', 'other_digits'], [Number.NaN, 'unreadable'],
    [Number.NEGATIVE_INFINITY, 'unreadable'],
  ])('%s: %s', (written, result) => {
    expect(count(written)).toBe(result)
  })

  it('names the most there can be', () => {
    expect(parseCount(201)).toEqual({ ok: false, code: 'too_many', args: { most: { count: MOST_POINTS } } })
  })
})

describe('a length is written as the lists do', () => {
  it.each([[1500, '1/8', '187 4/8'], [0, '1/8', '0 0/8'], [-66, '1/8', '-8 2/8'], [-1, '1/8', '-0 1/8'], [300, '1/16', '18 12/16'], [8, '1/8', '1 0/8']] as const)(
    '%i of %s in is %s', (steps, step, text) => {
      expect(formatSteps(steps, step)).toBe(text)
    })

  it('comes apart into sign, whole inches and steps', () => {
    expect(splitSteps(-66, '1/8')).toEqual({ negative: true, whole: 8, fraction: 2, per: 8 })
    expect(splitSteps(0, '1/16')).toEqual({ negative: false, whole: 0, fraction: 0, per: 16 })
  })

  it('is read back as it was written, however it was written', () => {
    const steps = fc.constantFrom<Step>('1/8', '1/16')
    fc.assert(fc.property(steps, fc.nat(LONGEST_INCHES * 8), (step, length) => {
      const per = STEPS_PER_INCH[step]
      const text = formatSteps(length, step)
      expect(value(text, step)).toBe(length)
      expect(value(length / per, step)).toBe(length)
      expect(value(String(length / per), step)).toBe(length)
      expect(value(`${Math.floor(length / per)}-${length % per}`, step)).toBe(length)
    }))
  })

  it('never throws, whatever is typed', () => {
    fc.assert(fc.property(fc.string({ unit: 'grapheme', maxLength: 60 }), (text) => {
      const parsed = parseLength(text, '1/8')
      if (parsed.ok) expect(Number.isInteger(parsed.value) && parsed.value >= 0 && parsed.value <= LONGEST_INCHES * 8).toBe(true)
      parseCount(text)
    }))
  })
})

describe('sixteenths', () => {
  it('are the common step of all classes', () => {
    expect(toSixteenths(171, '1/8')).toBe(342)
    expect(toSixteenths(185, '1/16')).toBe(185)
    expect(fromSixteenths(342, '1/8')).toBe(171)
    expect(fromSixteenths(185, '1/16')).toBe(185)
  })

  it('that fall on no eighth are a defect', () => {
    expect(() => fromSixteenths(343, '1/8')).toThrow(/343 sixteenths do not fall on a step of 1\/8 in/)
  })
})
