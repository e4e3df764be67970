import { afterAll, beforeAll, describe, expect, test } from 'vitest'
import { createRegistry, type Registry } from '../../../server/composition'
import { fixedClock } from '../../../server/clock'
import { readConfig } from '../../../server/config'
import { takeTry, type Limit } from '../../../server/services/people/limits'
import { signIn } from '../../../server/services/people/signIn'
import { DomainError } from '../../../shared/errors'
import { useApp } from '../../support/app'
import { browserOf, PASSWORD, personWithPassword, refusalOf } from '../../support/account'

const app = useApp()
const clock = fixedClock('2026-03-02T15:00:00Z')
let one: Registry
let two: Registry
beforeAll(() => {
  // Two pools of connections and nothing in common but the database, as two processes have it.
  [one, two] = [createRegistry(readConfig(app.env), { clock }), createRegistry(readConfig(app.env), { clock })]
})
afterAll(async () => {
  await Promise.all([one.close(), two.close()])
})

const waitOf = (error: unknown): number => {
  if (!(error instanceof DomainError) || error.code !== 'too_many_requests') throw error
  return error.details.retryAfter as number
}
const attempt = (registry: Registry, limits: readonly Limit[]) => takeTry(registry, limits).then(() => 0, waitOf)
const pass = (seconds: number) => clock.set(new Date(clock.now().getTime() + seconds * 1000))

describe('tries', () => {
  test('of two processes are counted together', async () => {
    const limit = { key: 'shared', free: 4, window: 600, longest: 60 }
    const waits: number[] = []
    for (let n = 0; n < 6; n++) waits.push(await attempt(n % 2 ? one : two, [limit]))
    expect(waits).toEqual([0, 0, 0, 0, 1, 1])
  })

  test('many at once, in two processes, are no way round', async () => {
    const limit = { key: 'crowd', free: 5, window: 600, longest: 60 }
    const waits = await Promise.all(Array.from({ length: 20 }, (_, n) => attempt(n % 2 ? one : two, [limit])))
    expect(waits.filter(wait => wait === 0)).toHaveLength(5)
  })

  test('wait ever longer, and a refused one does not make it longer still', async () => {
    const limit = { key: 'growing', free: 1, window: 600, longest: 6 }
    expect(await attempt(one, [limit])).toBe(0)
    for (const wait of [1, 2, 4, 6, 6]) {
      expect(await attempt(one, [limit])).toBe(wait)
      expect(await attempt(one, [limit])).toBe(wait)
      pass(wait)
      expect(await attempt(one, [limit])).toBe(0)
    }
    pass(600)
    expect([await attempt(one, [limit]), await attempt(one, [limit])]).toEqual([0, 1])
  })

  test('that one limit refuses are counted under none', async () => {
    const [tight, wide] = [{ key: 'tight', free: 1, window: 600, longest: 60 }, { key: 'wide', free: 2, window: 600, longest: 60 }]
    await attempt(one, [tight, wide])
    await attempt(one, [tight, wide])
    await attempt(one, [tight, wide])
    expect(await attempt(one, [wide])).toBe(0)
  })
})

describe('guessing', () => {
  const request = (email: string, address: string, password = 'wrong', device: string | null = null) => ({ email, password, code: '', address, userAgent: null, device })
  const outcome = (registry: Registry, ...given: Parameters<typeof request>) => signIn(registry, request(...given)).then(() => 'in', (error: DomainError) => error.code)

  test('one account from one address is slowed down after five, in whichever process, known or not', async () => {
    const person = await personWithPassword(app)
    for (const email of [person.email, 'nobody.known@ochrebasin.example']) {
      const outcomes: string[] = []
      for (let n = 0; n < 7; n++) outcomes.push(await outcome(n % 2 ? one : two, email, '203.0.113.1'))
      expect(outcomes).toEqual([...Array<string>(5).fill('sign_in_failed'), 'too_many_requests', 'too_many_requests'])
    }
  })

  test('by a stranger does not keep the account\'s own person out', async () => {
    const person = await personWithPassword(app, ['judge'])
    const { device } = await signIn(one, request(person.email, '198.51.100.7', PASSWORD))
    for (let n = 0; n < 60; n++) await outcome(one, person.email, `203.0.113.${n}`)
    // From anywhere else it takes a moment, even with the right password …
    expect(await outcome(two, person.email, '192.0.2.1', PASSWORD)).toBe('too_many_requests')
    // … from a browser that the person has used before it does not.
    expect(await outcome(two, person.email, '192.0.2.1', PASSWORD, device)).toBe('in')
    pass(60)
    expect(await outcome(two, person.email, '192.0.2.1', PASSWORD)).toBe('in')
  })

  test('a browser\'s mark is worth nothing for another account', async () => {
    const [person, other] = [await personWithPassword(app), await personWithPassword(app)]
    const { device } = await signIn(one, request(person.email, '198.51.100.8', PASSWORD))
    for (let n = 0; n < 5; n++) await outcome(one, other.email, '203.0.113.200', 'wrong', device)
    expect(await outcome(one, other.email, '203.0.113.200', 'wrong', device)).toBe('too_many_requests')
  })

  test('is told by the route as 429 with the seconds to wait', async () => {
    const person = await personWithPassword(app)
    const browser = browserOf(app)
    for (let n = 0; n < 5; n++) expect((await browser.signIn(person.email, 'wrong')).status).toBe(401)
    const answer = await browser.signIn(person.email, PASSWORD)
    expect([answer.status, refusalOf(answer), Number(answer.headers['retry-after'])]).toEqual([429, 'too_many_requests', 1])
  })

  test('a letter is sent to one address at most three times in a row, and the answer does not tell', async () => {
    const person = await personWithPassword(app)
    const answers: number[] = []
    for (let n = 0; n < 5; n++) answers.push((await app.visitor.post('/api/account/reset-request').send({ email: person.email })).status)
    expect(answers).toEqual([202, 202, 202, 202, 202])
    expect(await app.db('notices').where({ to_email: person.email })).toHaveLength(3)
  })
})
