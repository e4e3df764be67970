import { describe, expect, test } from 'vitest'
import { sqlTime } from '../../../db/time'
import { useApp } from '../../support/app'
import { browserOf, memberAs, PASSWORD, personWithPassword, refusalOf } from '../../support/account'

const app = useApp()

describe('signing in', () => {
  test('begins a session whose cookie is out of reach for scripts and foreign forms', async () => {
    const person = await personWithPassword(app, ['measurer'])
    const browser = browserOf(app)
    const answer = await browser.signIn(person.email, PASSWORD)
    expect(answer.status).toBe(200)
    expect(refusalOf(answer)).toBeNull()
    const cookies = (answer.headers['set-cookie'] as unknown as string[]).filter(one => one.startsWith('hartroll-test.session='))
    expect(cookies).toHaveLength(1)
    expect(cookies[0]).toMatch(/HttpOnly/i)
    expect(cookies[0]).toMatch(/SameSite=Lax/i)
    expect(await browser.me()).toMatchObject({ signedIn: true, email: person.email, roles: ['entrant', 'measurer'] })
    expect((await browser.agent.get('/api/auth/session')).body.user).toEqual({ name: person.name, email: person.email })
  })

  test('refuses a wrong password, an unknown address and a closed account with the same answer', async () => {
    const person = await personWithPassword(app)
    const closed = await personWithPassword(app)
    await app.db('users').where({ id: closed.userId }).update({ disabled_at: '2026-01-01 00:00:00.000' })
    const answers = [
      await browserOf(app).signIn(person.email, 'not the password'),
      await browserOf(app).signIn('nobody@ochrebasin.example', PASSWORD),
      await browserOf(app).signIn(closed.email, PASSWORD),
    ]
    expect(answers.map(one => [one.status, refusalOf(one)])).toEqual(Array(3).fill([401, 'sign_in_failed']))
  })

  test('an unknown address takes as long as a wrong password', async () => {
    const person = await personWithPassword(app)
    const time = async (email: string) => {
      const times: number[] = []
      for (let i = 0; i < 4; i++) {
        const browser = browserOf(app)
        await browser.agent.get('/api/auth/csrf')
        const begun = performance.now()
        await browser.signIn(email, `wrong ${i}`)
        times.push(performance.now() - begun)
      }
      return Math.min(...times)
    }
    const known = await time(person.email)
    const unknown = await time('nobody.at.all@ochrebasin.example')
    // Hashing alone is most of either; without it the unknown one would answer in a fraction.
    expect(unknown).toBeGreaterThan(known / 3)
    expect(unknown).toBeLessThan(known * 3)
  })

  test('is refused without the token against foreign forms', async () => {
    const person = await personWithPassword(app)
    const browser = browserOf(app)
    const answer = await browser.agent.post('/api/auth/callback/credentials').type('form').ok(() => true).send({ email: person.email, password: PASSWORD, json: 'true' })
    expect(new URL(answer.body.url).searchParams.get('csrf')).toBe('true')
    expect(await browser.me()).toMatchObject({ signedIn: false })
  })

  test('is refused from a foreign page', async () => {
    const answer = await app.visitor.post('/api/auth/callback/credentials').set('Origin', 'https://elsewhere.example').type('form').send({ email: 'a@b.example', password: 'x' })
    expect(answer.status).toBe(403)
    expect(answer.body.code).toBe('foreign_origin')
  })

  test('an address that differs by an accent is another account, one that differs by case is the same', async () => {
    const person = await personWithPassword(app, [], { email: 'victim@ochrebasin.example' })
    expect(refusalOf(await browserOf(app).signIn('vićtim@ochrebasin.example', PASSWORD))).toBe('sign_in_failed')
    const browser = browserOf(app)
    await browser.signIn(' Victim@OchreBasin.example ', PASSWORD)
    expect((await browser.me()).email).toBe(person.email)
  })

  test('says that the address is unconfirmed only to who knows the password', async () => {
    const person = await personWithPassword(app)
    await app.db('users').where({ id: person.userId }).update({ email_verified_at: null })
    expect(refusalOf(await browserOf(app).signIn(person.email, 'wrong'))).toBe('sign_in_failed')
    expect(refusalOf(await browserOf(app).signIn(person.email, PASSWORD))).toBe('email_unconfirmed')
  })

  test('leads to our own pages only', async () => {
    const person = await personWithPassword(app)
    const browser = browserOf(app)
    const { csrfToken } = (await browser.agent.get('/api/auth/csrf')).body
    const answer = await browser.agent.post('/api/auth/callback/credentials').type('form').send({ csrfToken, email: person.email, password: PASSWORD, callbackUrl: 'https://elsewhere.example/', json: 'true' })
    expect(answer.body.url).not.toContain('elsewhere')
  })
})

describe('a session', () => {
  test('ends with sign-out, so that a copied cookie is worth nothing', async () => {
    const person = await personWithPassword(app)
    const browser = browserOf(app)
    const cookie = ((await browser.signIn(person.email, PASSWORD)).headers['set-cookie'] as unknown as string[]).find(one => one.startsWith('hartroll-test.session='))!.split(';')[0]!
    expect((await app.visitor.get('/api/me').set('Cookie', cookie)).body.signedIn).toBe(true)
    await browser.signOut()
    expect((await browser.me()).signedIn).toBe(false)
    expect((await app.visitor.get('/api/me').set('Cookie', cookie)).body.signedIn).toBe(false)
    expect((await app.visitor.get('/api/auth/session').set('Cookie', cookie)).body).toEqual({})
  })

  test('that is ended elsewhere holds no more from the next request on', async () => {
    const person = await personWithPassword(app)
    const [here, there] = [await app.signIn(person), await app.signIn(person)]
    const list = (await here.get('/api/account/sessions')).body.items as { id: string, current: boolean }[]
    expect(list).toHaveLength(2)
    expect((await here.delete(`/api/account/sessions/${list.find(one => !one.current)!.id}`)).status).toBe(204)
    expect((await there.get('/api/account')).status).toBe(401)
    expect((await here.get('/api/account')).status).toBe(200)
  })

  test('of somebody else cannot be ended', async () => {
    const [me, other] = [await memberAs(app), await memberAs(app)]
    const { id } = (await other.get('/api/account/sessions')).body.items[0]
    expect((await me.delete(`/api/account/sessions/${id}`)).status).toBe(404)
    expect((await other.get('/api/account')).status).toBe(200)
  })

  test('ends after fourteen days without use, and not while it is used', async () => {
    const person = await personWithPassword(app)
    const [used, idle] = [browserOf(app), browserOf(app)]
    await used.signIn(person.email, PASSWORD)
    await idle.signIn(person.email, PASSWORD)
    app.clock.pass(10)
    expect((await used.me()).signedIn).toBe(true)
    app.clock.pass(10)
    expect((await used.me()).signedIn).toBe(true)
    expect((await idle.me()).signedIn).toBe(false)
  })

  test('a role that was taken holds no more from the next request on', async () => {
    const member = await memberAs(app, ['registrar'])
    expect((await member.get('/api/people')).status).toBe(200)
    await app.db('user_roles').where({ user_id: member.person.userId }).update({ to_at: sqlTime(app.clock.now()) })
    expect((await member.get('/api/people')).status).toBe(403)
  })
})
