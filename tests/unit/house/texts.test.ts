import { describe, expect, it } from 'vitest'
import { z } from 'zod'
import { ERRORS } from '#shared/errors'
import { dayIn, fixedClock } from '../../../server/clock'
import { fieldsOf } from '../../../server/utils/problem'
import { hasText, localeOf, t } from '../../../server/services/texts/translate'

describe('texts on the server', () => {
  it('says every refusal in words', () => {
    expect(Object.keys(ERRORS).filter(code => !hasText(`errors.${code}`))).toEqual([])
  })

  it('titles every status', () => {
    const statuses = [...new Set(Object.values(ERRORS))]
    expect(statuses.filter(status => !hasText(`errors.titles.s${status}`))).toEqual([])
  })

  it('fills arguments, chooses plurals and falls back to English', () => {
    expect(t('en', 'common.daysLeft', { count: 1 })).toBe('one day left')
    expect(t('xx', 'common.daysLeft', { count: 3 })).toBe('3 days left')
    expect(t('en', 'errors.fields.too_long', { maximum: 12 })).toContain('12')
    expect(localeOf(undefined)).toBe('en')
  })

  it('gives the key back when there is no such text', () => {
    expect(t('en', 'errors.not_there')).toBe('errors.not_there')
    expect(hasText('errors')).toBe(false)
  })
})

describe('fields that a schema refuses', () => {
  const schema = z.strictObject({
    name: z.string().min(1).max(5),
    email: z.email(),
    sheet: z.object({ right: z.object({ g2: z.number().max(3) }) }),
  })
  const refused = (value: unknown) => fieldsOf(schema.safeParse(value).error!).map(({ path, code }) => [path, code])

  it('are told by path and rule', () => {
    expect(refused({ name: '', email: 'x', sheet: { right: { g2: 4 } } })).toEqual([['name', 'required'], ['email', 'email'], ['sheet.right.g2', 'too_big']])
    expect(refused({ name: 'abcdef', email: 'a@b.example', sheet: { right: {} } })).toEqual([['name', 'too_long'], ['sheet.right.g2', 'required']])
    expect(refused({ name: 'a', email: 'a@b.example', sheet: { right: { g2: 1 } }, more: 1 })).toEqual([['more', 'unknown_field']])
  })
})

describe('days', () => {
  it('begin and end in the registry’s zone', () => {
    const instant = new Date('2026-03-01T05:30:00Z')
    expect(dayIn('UTC', instant)).toBe('2026-03-01')
    expect(dayIn('America/Denver', instant)).toBe('2026-02-28')
  })

  it('stand still on a fixed clock until it is moved', () => {
    const clock = fixedClock('2026-01-01T00:00:00Z')
    clock.now().setFullYear(1999)
    expect(clock.now().toISOString()).toBe('2026-01-01T00:00:00.000Z')
    clock.set('2026-01-02T00:00:00Z')
    expect(clock.now().toISOString()).toBe('2026-01-02T00:00:00.000Z')
  })
})
