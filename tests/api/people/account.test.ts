import { describe, expect, test } from 'vitest'
import { totpCode } from '../../../server/services/people/totp'
import { verifyPassword } from '../../../server/services/people/verifyPassword'
import { useApp, type Client } from '../../support/app'
import { browserOf, linkFor, memberAs, noticesTo, PASSWORD, personWithPassword, refusalOf } from '../../support/account'
import type { Person } from '../../support/people'

const app = useApp()
const FRESH = 'a heron over the reeds'

type Member = Client & { readonly person: Person }
const accountBy = async (email: string) => (await app.db('users').where({ email }).first())!
let number = 0
const freshEmail = () => `new${++number}@ochrebasin.example`

async function setUpFactor(member: Member): Promise<{ secret: string, recoveryCodes: string[] }> {
  const { secret } = (await member.post('/api/account/second-factor').send({ password: PASSWORD })).body
  const enabled = await member.post('/api/account/second-factor/enable').send({ code: totpCode(secret, app.clock.now()) })
  expect(enabled.status).toBe(200)
  return { secret, recoveryCodes: enabled.body.recoveryCodes }
}
const later = (seconds: number) => app.clock.set(new Date(app.clock.now().getTime() + seconds * 1000))

describe('opening an account', () => {
  test('asks for the address to be confirmed before anybody signs in', async () => {
    const email = freshEmail()
    const answer = await app.visitor.post('/api/account/sign-up').send({ name: 'Wren Tarnley', email, password: PASSWORD })
    expect(answer.status).toBe(202)
    expect(await noticesTo(app, email)).toEqual(['confirm_email'])
    expect(refusalOf(await browserOf(app).signIn(email, PASSWORD))).toBe('email_unconfirmed')
    const { id } = await accountBy(email)
    const token = await linkFor(app, 'confirm_email', { userId: id, email })
    expect((await app.visitor.post('/api/account/link').send({ token })).body).toEqual({ kind: 'confirm_email', email, name: '' })
    expect((await app.visitor.post('/api/account/confirm').send({ token, password: 'not it at all' })).body).toMatchObject({ code: 'password_wrong', errors: [{ path: 'password' }] })
    expect((await app.visitor.post('/api/account/confirm').send({ token, password: PASSWORD })).body).toEqual({ email })
    expect((await app.visitor.post('/api/account/confirm').send({ token, password: PASSWORD })).body.code).toBe('link_spent')
    const browser = browserOf(app)
    await browser.signIn(email, PASSWORD)
    expect(await browser.me()).toMatchObject({ signedIn: true, roles: ['entrant'] })
  })

  test('answers the same for an address that has an account, and tells its owner', async () => {
    const person = await personWithPassword(app)
    const answers = await Promise.all([person.email, freshEmail()].map(email => app.visitor.post('/api/account/sign-up').send({ name: 'Somebody', email, password: FRESH })))
    expect(answers[0]!.status).toBe(202)
    expect(answers[0]!.body).toEqual(answers[1]!.body)
    expect(await noticesTo(app, person.email)).toEqual(['account_exists'])
    expect(refusalOf(await browserOf(app).signIn(person.email, FRESH))).toBe('sign_in_failed')
  })

  test('another person\'s click does not open the account to whoever wrote the address', async () => {
    const email = freshEmail()
    await app.visitor.post('/api/account/sign-up').send({ name: 'A stranger', email, password: 'the stranger\'s words' })
    const { id } = await accountBy(email)
    const token = await linkFor(app, 'confirm_email', { userId: id, email })
    await app.visitor.post('/api/account/sign-up').send({ name: 'The owner', email, password: PASSWORD })
    expect((await app.visitor.post('/api/account/confirm').send({ token, password: PASSWORD })).status).toBe(200)
    expect(refusalOf(await browserOf(app).signIn(email, 'the stranger\'s words'))).toBe('sign_in_failed')
  })

  test('names every field that is wrong', async () => {
    const answer = await app.visitor.post('/api/account/sign-up').send({ name: ' ', email: 'no address', password: 'short' })
    expect(answer.status).toBe(422)
    expect(answer.body.errors.map((one: { path: string }) => one.path).sort()).toEqual(['email', 'name', 'password'])
  })

  test('an address that differs by an accent opens another account', async () => {
    const person = await personWithPassword(app, [], { email: 'owner@ochrebasin.example' })
    expect((await app.visitor.post('/api/account/sign-up').send({ name: 'Other', email: 'öwner@ochrebasin.example', password: FRESH })).status).toBe(202)
    expect((await accountBy('öwner@ochrebasin.example')).id).not.toBe(person.userId)
    expect(await noticesTo(app, person.email)).toEqual([])
  })
})

describe('a forgotten password', () => {
  test('is answered alike whether there is an account or not', async () => {
    const person = await personWithPassword(app)
    const answers = await Promise.all([person.email, freshEmail()].map(email => app.visitor.post('/api/account/reset-request').send({ email })))
    expect(answers.map(one => [one.status, one.body])).toEqual([[202, { status: 'sent' }], [202, { status: 'sent' }]])
    expect(await noticesTo(app, person.email)).toEqual(['reset_password'])
  })

  test('is set anew once by a link, ends every session, and the owner is told', async () => {
    const member = await memberAs(app)
    const tokens = [await linkFor(app, 'reset_password', member.person), await linkFor(app, 'reset_password', member.person)]
    expect((await app.visitor.post('/api/account/reset').send({ token: tokens[0], password: FRESH })).status).toBe(200)
    for (const token of tokens) expect((await app.visitor.post('/api/account/reset').send({ token, password: 'yet another one' })).body.code).toBe('link_spent')
    expect((await member.get('/api/account')).status).toBe(401)
    expect(await noticesTo(app, member.person.email)).toEqual(['password_changed'])
    expect(refusalOf(await browserOf(app).signIn(member.person.email, PASSWORD))).toBe('sign_in_failed')
    expect(refusalOf(await browserOf(app).signIn(member.person.email, FRESH))).toBeNull()
  })

  test('a link that has run out, and one for another purpose, open nothing', async () => {
    const person = await personWithPassword(app)
    const old = await linkFor(app, 'reset_password', person)
    const other = await linkFor(app, 'change_email', person)
    later(3601)
    for (const token of [old, other, 'made up']) expect((await app.visitor.post('/api/account/reset').send({ token, password: FRESH })).body.code).toBe('link_spent')
  })

  test('two clicks at once set one password', async () => {
    const person = await personWithPassword(app)
    const token = await linkFor(app, 'reset_password', person)
    const answers = await Promise.all(['first of the two', 'second of the two'].map(password => app.visitor.post('/api/account/reset').send({ token, password })))
    expect(answers.map(one => one.status).sort()).toEqual([200, 422])
  })
})

describe('changing password and address', () => {
  test('the password asks for the one until now and ends every other session', async () => {
    const here = await memberAs(app)
    const there = await app.signIn(here.person)
    expect((await here.post('/api/account/password').send({ password: 'wrong', newPassword: FRESH })).body).toMatchObject({ code: 'password_wrong' })
    expect((await here.post('/api/account/password').send({ password: PASSWORD, newPassword: FRESH })).status).toBe(204)
    expect((await here.get('/api/account')).status).toBe(200)
    expect((await there.get('/api/account')).status).toBe(401)
    expect(await noticesTo(app, here.person.email)).toEqual(['password_changed'])
  })

  test('the address counts once confirmed at the new one, and the old one is told', async () => {
    const member = await memberAs(app)
    const email = freshEmail()
    expect((await member.post('/api/account/email').send({ email, password: PASSWORD })).status).toBe(202)
    expect((await member.get('/api/me')).body.email).toBe(member.person.email)
    expect(await noticesTo(app, email)).toEqual(['change_email'])
    const token = await linkFor(app, 'change_email', { userId: member.person.userId, email })
    expect((await app.visitor.post('/api/account/confirm').send({ token })).body).toEqual({ email })
    expect(await noticesTo(app, member.person.email)).toEqual(['email_changed'])
    expect((await member.get('/api/account')).status).toBe(401)
    expect(refusalOf(await browserOf(app).signIn(email, PASSWORD))).toBeNull()
  })

  test('an address of somebody else is answered alike, and stays theirs', async () => {
    const [member, other] = [await memberAs(app), await personWithPassword(app)]
    expect((await member.post('/api/account/email').send({ email: other.email, password: PASSWORD })).status).toBe(202)
    expect(await noticesTo(app, other.email)).toEqual(['account_exists'])
    const token = await linkFor(app, 'change_email', { userId: member.person.userId, email: other.email })
    expect((await app.visitor.post('/api/account/confirm').send({ token })).body.code).toBe('link_spent')
  })
})

describe('the second factor', () => {
  test('is asked for after the password, and each code is good once', async () => {
    const member = await memberAs(app)
    const { secret } = await setUpFactor(member)
    const { email } = member.person
    expect(refusalOf(await browserOf(app).signIn(email, PASSWORD))).toBe('second_factor_required')
    expect(refusalOf(await browserOf(app).signIn(email, 'wrong', '123456'))).toBe('sign_in_failed')
    const used = totpCode(secret, app.clock.now())
    expect(refusalOf(await browserOf(app).signIn(email, PASSWORD, used))).toBe('second_factor_wrong')
    later(30)
    const next = totpCode(secret, app.clock.now())
    const browser = browserOf(app)
    expect(refusalOf(await browser.signIn(email, PASSWORD, next))).toBeNull()
    expect((await browser.me())).toMatchObject({ signedIn: true, secondFactor: true })
    expect(refusalOf(await browserOf(app).signIn(email, PASSWORD, next))).toBe('second_factor_wrong')
    // The code before it is no way round either.
    expect(refusalOf(await browserOf(app).signIn(email, PASSWORD, used))).toBe('second_factor_wrong')
  })

  test('two at once with one code: one gets in', async () => {
    const member = await memberAs(app)
    const { secret } = await setUpFactor(member)
    later(30)
    const code = totpCode(secret, app.clock.now())
    const answers = await Promise.all([1, 2].map(() => browserOf(app).signIn(member.person.email, PASSWORD, code)))
    expect(answers.map(refusalOf).sort()).toEqual(['second_factor_wrong', null].sort())
  })

  test('setting it up ends the other sessions and tells the owner', async () => {
    const here = await memberAs(app)
    const there = await app.signIn(here.person)
    await setUpFactor(here)
    expect((await there.get('/api/account')).status).toBe(401)
    expect(await noticesTo(app, here.person.email)).toEqual(['second_factor_changed'])
  })

  test('neither secret nor recovery codes can be read in the database', async () => {
    const member = await memberAs(app)
    const { secret, recoveryCodes } = await setUpFactor(member)
    const row = await accountBy(member.person.email)
    expect(row.totp_secret_enc).not.toContain(secret)
    const hashes = await app.db('recovery_codes').where({ user_id: member.person.userId }).select('code_hash')
    expect(hashes).toHaveLength(10)
    expect(recoveryCodes).toHaveLength(10)
    expect(JSON.stringify(hashes)).not.toContain(recoveryCodes[0])
  })

  test('a recovery code opens the account once, however it is typed', async () => {
    const member = await memberAs(app)
    const { recoveryCodes } = await setUpFactor(member)
    const typed = ` ${recoveryCodes[0]!.toLowerCase().replace('-', ' ')} `
    expect(refusalOf(await browserOf(app).signIn(member.person.email, PASSWORD, typed))).toBeNull()
    expect(refusalOf(await browserOf(app).signIn(member.person.email, PASSWORD, typed))).toBe('second_factor_wrong')
    expect((await member.get('/api/account')).body).toMatchObject({ secondFactor: true, recoveryCodes: 9 })
  })

  test('signing asks for password and code', async () => {
    const member = await memberAs(app)
    const { secret } = await setUpFactor(member)
    const actor = { userId: member.person.userId, uid: member.person.uid, name: '', email: '', roles: [], sessionId: 1_000_000 + member.person.userId, secondFactor: true }
    const code = (error: unknown) => (error as { code: string }).code
    await expect(verifyPassword(app.registry, actor, 'wrong').catch(code)).resolves.toBe('password_wrong')
    await expect(verifyPassword(app.registry, actor, PASSWORD).catch(code)).resolves.toBe('second_factor_required')
    await expect(verifyPassword(app.registry, actor, PASSWORD, { code: '000000' }).catch(code)).resolves.toBe('second_factor_required')
    later(30)
    await expect(verifyPassword(app.registry, actor, PASSWORD, { code: totpCode(secret, app.clock.now()) })).resolves.toBeUndefined()
  })

  test('is taken off with password and code', async () => {
    const member = await memberAs(app)
    const { secret } = await setUpFactor(member)
    expect((await member.post('/api/account/second-factor/remove').send({ password: PASSWORD })).body).toMatchObject({ code: 'second_factor_required', errors: [{ path: 'code' }] })
    later(30)
    expect((await member.post('/api/account/second-factor/remove').send({ password: PASSWORD, code: totpCode(secret, app.clock.now()) })).status).toBe(204)
    expect(refusalOf(await browserOf(app).signIn(member.person.email, PASSWORD))).toBeNull()
  })
})

describe('the profile', () => {
  test('keeps what the person says, and refuses a district that is none', async () => {
    const member = await memberAs(app)
    const profile = { name: 'Wren <b>Tarnley</b>', phone: '555 0100', address: 'Mill Lane 4', shopName: '', district: null, printName: 'initials' }
    expect((await member.patch('/api/account').send(profile)).body).toMatchObject({ name: 'Wren <b>Tarnley</b>', phone: '555 0100', shopName: null, printName: 'initials' })
    expect((await member.patch('/api/account').send({ ...profile, district: 'nowhere' })).body.errors).toMatchObject([{ path: 'district' }])
  })

  test('is nobody else\'s to see', async () => {
    expect((await app.visitor.get('/api/account')).status).toBe(401)
  })
})
