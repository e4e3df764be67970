import { beforeAll, describe, expect, test } from 'vitest'
import { createRegistry } from '../../../server/composition'
import { findActor } from '../../../server/services/people/sessions'
import { acceptInvitation, firstRegistrarLink } from '../../../server/services/people/invite'
import { useApp, type Client } from '../../support/app'
import { linkFor, memberAs, noticesTo, PASSWORD, personWithPassword, browserOf, refusalOf } from '../../support/account'
import type { Person } from '../../support/people'

const app = useApp()
type Member = Client & { readonly person: Person }
const proof = { password: PASSWORD }
const rolesOf = async (person: Person) => (await app.db('user_roles').where({ user_id: person.userId }).whereNull('to_at').orderBy('id').select('role')).map(row => row.role)
const give = (by: Client, to: Person, role: string) => by.post(`/api/people/${to.uid}/roles`).send({ role, ...proof })
const take = (by: Client, from: Person, role: string) => by.post(`/api/people/${from.uid}/roles/${role}/end`).send(proof)

describe('the first registrar', () => {
  test('comes by a one-time link, and by none once there is one', async () => {
    const link = await firstRegistrarLink(app.registry, 'First@OchreBasin.example')
    const token = new URL(link).searchParams.get('token')!
    expect(link.startsWith(`${app.url}/invite?token=`)).toBe(true)
    expect((await app.visitor.post('/api/account/invitation').send({ token, name: 'Hester Woldgate', ...proof })).status).toBe(200)
    const browser = browserOf(app)
    await browser.signIn('first@ochrebasin.example', PASSWORD)
    expect((await browser.me()).roles).toContain('registrar')
    expect((await app.visitor.post('/api/account/invitation').send({ token, name: 'Again', ...proof })).body.code).toBe('link_spent')
    await expect(firstRegistrarLink(app.registry, 'second@ochrebasin.example')).rejects.toMatchObject({ code: 'duplicate' })
  })

  test('of two links one makes a registrar', async () => {
    await app.db('user_roles').where({ role: 'registrar' }).delete()
    const tokens = await Promise.all(['a@x.example', 'b@x.example'].map(async email => new URL(await firstRegistrarLink(app.registry, email)).searchParams.get('token')!))
    await acceptInvitation(app.registry, { token: tokens[0]!, name: 'A', ...proof })
    await expect(acceptInvitation(app.registry, { token: tokens[1]!, name: 'B', ...proof })).rejects.toMatchObject({ code: 'link_spent' })
    await app.db('user_roles').where({ role: 'registrar' }).delete()
  })

  test('has no rights outside the demo before the second factor', async () => {
    const member = await memberAs(app, ['registrar', 'shop'])
    await app.db('user_sessions').where({ user_id: member.person.userId }).update({ second_factor_at: null })
    const [{ uid }] = await app.db('user_sessions').where({ user_id: member.person.userId }).select('uid') as [{ uid: string }]
    const production = createRegistry({ ...app.registry.config, mode: 'production' }, { clock: app.clock })
    try {
      expect(await findActor(production, uid)).toMatchObject({ roles: ['entrant', 'shop'], withheld: ['registrar'] })
      expect(await findActor(app.registry, uid)).toMatchObject({ roles: ['entrant', 'registrar', 'shop'] })
      await app.db('user_sessions').where({ uid }).update({ second_factor_at: '2026-03-02 15:00:00.000' })
      expect((await findActor(production, uid))?.roles).toContain('registrar')
    }
    finally {
      await production.close()
    }
    await app.db('user_roles').where({ role: 'registrar' }).delete()
  })
})

describe('a registrar alone', () => {
  let registrar: Member
  beforeAll(async () => {
    registrar = await memberAs(app, ['registrar'])
  })

  test('gives a staff role at once, and the person is told', async () => {
    const person = await personWithPassword(app)
    expect((await give(registrar, person, 'measurer')).body).toEqual({ outcome: 'given' })
    expect(await rolesOf(person)).toEqual(['measurer'])
    expect(await noticesTo(app, person.email)).toEqual(['role_given'])
    expect((await give(registrar, person, 'measurer')).body).toMatchObject({ code: 'duplicate', errors: [{ path: 'role', code: 'held_already' }] })
  })

  test('takes a role away, which holds from the next request on', async () => {
    const member = await memberAs(app, ['reviewer'])
    expect((await member.get('/api/me')).body.roles).toContain('reviewer')
    expect((await take(registrar, member.person, 'reviewer')).status).toBe(204)
    expect((await member.get('/api/me')).body.roles).toEqual(['entrant'])
    expect((await take(registrar, member.person, 'reviewer')).status).toBe(404)
  })

  test('changes nothing of their own', async () => {
    for (const answer of [await give(registrar, registrar.person, 'judge'), await take(registrar, registrar.person, 'registrar')]) expect(answer.body).toMatchObject({ status: 403, code: 'forbidden' })
    const own = await registrar.post(`/api/people/${registrar.person.uid}/accreditations`).send({ number: 'M-1', validFrom: '2026-01-01', validTo: '2027-01-01', species: ['elk'] })
    expect(own.status).toBe(403)
    expect(await rolesOf(registrar.person)).toEqual(['registrar'])
  })

  test('is asked for the password again', async () => {
    const person = await personWithPassword(app)
    const answer = await registrar.post(`/api/people/${person.uid}/roles`).send({ role: 'shop', password: 'wrong' })
    expect(answer.body).toMatchObject({ status: 422, code: 'password_wrong' })
    expect(await rolesOf(person)).toEqual([])
  })

  test('cannot give what is no role, nor to nobody', async () => {
    const person = await personWithPassword(app)
    expect((await give(registrar, person, 'king')).status).toBe(422)
    expect((await give(registrar, person, 'entrant')).status).toBe(422)
    expect((await give(registrar, { ...person, uid: '01890000-0000-7000-8000-000000000000' }, 'shop')).status).toBe(404)
  })
})

describe('two registrars', () => {
  let one: Member
  let two: Member
  beforeAll(async () => {
    await app.db('user_roles').where({ role: 'registrar' }).delete()
    one = await memberAs(app, ['registrar'])
    two = await memberAs(app, ['registrar'])
  })
  const proposal = async (person: Person) => ((await two.get('/api/people')).body.proposals as { id: string, person: { id: string } }[]).find(each => each.person.id === person.uid)!.id
  const decide = (by: Client, id: string, decision: string) => by.post(`/api/people/proposals/${id}/decision`).send({ decision, ...proof })

  test('a staff role waits for the second, who is told', async () => {
    const person = await personWithPassword(app)
    expect((await give(one, person, 'judge')).body).toEqual({ outcome: 'proposed' })
    expect(await rolesOf(person)).toEqual([])
    expect(await noticesTo(app, two.person.email)).toEqual(['role_proposed'])
    expect(await noticesTo(app, person.email)).toEqual([])
    const id = await proposal(person)
    expect((await decide(one, id, 'grant')).body).toMatchObject({ status: 403 })
    expect((await decide(two, id, 'grant')).status).toBe(204)
    expect(await rolesOf(person)).toEqual(['judge'])
    expect(await noticesTo(app, person.email)).toEqual(['role_given'])
    expect(await noticesTo(app, one.person.email)).toEqual(['role_changed_registrars'])
    expect((await decide(two, id, 'refuse')).status).toBe(409)
  })

  test('a shop needs no second word', async () => {
    const person = await personWithPassword(app)
    expect((await give(one, person, 'shop')).body).toEqual({ outcome: 'given' })
  })

  test('two who propose the same at once make one proposal', async () => {
    const person = await personWithPassword(app)
    const answers = await Promise.all([give(one, person, 'reviewer'), give(two, person, 'reviewer')])
    expect(answers.map(each => each.status).sort()).toEqual([200, 409])
  })

  test('a proposal is refused by the second, withdrawn by the first', async () => {
    const [a, b] = [await personWithPassword(app), await personWithPassword(app)]
    await give(one, a, 'measurer')
    await give(one, b, 'measurer')
    const [idA, idB] = [await proposal(a), await proposal(b)]
    expect((await decide(two, idA, 'withdraw')).status).toBe(403)
    expect((await decide(two, idA, 'refuse')).status).toBe(204)
    expect((await decide(one, idB, 'withdraw')).status).toBe(204)
    expect([await rolesOf(a), await rolesOf(b)]).toEqual([[], []])
  })

  test('nobody decides on a role for themselves', async () => {
    await give(one, two.person, 'judge')
    // Two is the only other registrar, so nobody is left to ask and it holds at once; with a third it would wait.
    expect(await rolesOf(two.person)).toEqual(['registrar', 'judge'])
  })
})

describe('inviting', () => {
  let registrar: Member
  beforeAll(async () => {
    await app.db('user_roles').where({ role: 'registrar' }).delete()
    registrar = await memberAs(app, ['registrar'])
  })

  test('somebody who then opens the account with the role', async () => {
    const email = 'invited@ochrebasin.example'
    const made = await registrar.post('/api/people/invitations').send({ name: 'Sorrel Ashgate', email, role: 'measurer', ...proof })
    expect(made.status).toBe(201)
    expect(made.body.role).toBe('given')
    expect(await noticesTo(app, email)).toEqual(['invite'])
    expect(refusalOf(await browserOf(app).signIn(email, ''))).toBe('sign_in_failed')
    const { id } = (await app.db('users').where({ email }).first())!
    const token = await linkFor(app, 'invite', { userId: id, email })
    expect((await app.visitor.post('/api/account/link').send({ token })).body).toEqual({ kind: 'invite', email, name: 'Sorrel Ashgate' })
    expect((await app.visitor.post('/api/account/invitation').send({ token, name: 'Sorrel A. Ashgate', ...proof })).body).toEqual({ email })
    const browser = browserOf(app)
    await browser.signIn(email, PASSWORD)
    expect((await browser.me()).roles).toEqual(['entrant', 'measurer'])
    expect((await registrar.post(`/api/people/${made.body.id}/invitation`)).status).toBe(409)
    expect((await app.visitor.post('/api/account/invitation').send({ token, name: 'X', ...proof })).body.code).toBe('link_spent')
  })

  test('an address that has an account is refused beside its field', async () => {
    const person = await personWithPassword(app)
    const answer = await registrar.post('/api/people/invitations').send({ name: 'X', email: person.email, role: '', ...proof })
    expect(answer.body).toMatchObject({ status: 409, errors: [{ path: 'email', code: 'taken' }] })
  })
})

describe('the list of people', () => {
  test('finds by a part of name or address, by role, page after page', async () => {
    const registrar = await memberAs(app, ['registrar'])
    for (let n = 0; n < 60; n++) await personWithPassword(app, n % 2 ? ['measurer'] : [], { name: `Zephyr ${String(n).padStart(2, '0')} 100%_` })
    const first = (await registrar.get('/api/people?q=zephyr')).body
    expect(first.items).toHaveLength(50)
    const second = (await registrar.get(`/api/people?q=zephyr&cursor=${first.nextCursor}`)).body
    expect(second.items).toHaveLength(10)
    expect(second.nextCursor).toBeNull()
    expect(new Set([...first.items, ...second.items].map((one: { id: string }) => one.id)).size).toBe(60)
    expect((await registrar.get('/api/people?q=zephyr&role=measurer')).body.items).toHaveLength(30)
    expect((await registrar.get('/api/people').query({ q: 'zephyr 07 100%_' })).body.items).toHaveLength(1)
    expect((await registrar.get('/api/people').query({ q: '\' OR 1=1 --' })).body.items).toHaveLength(0)
    expect((await registrar.get(`/api/people?cursor=${first.nextCursor.replace(/^./, 'X')}`)).body.code).toBe('cursor_invalid')
  })
})

describe('accreditations', () => {
  test('are given, suspended and kept apart by number', async () => {
    const registrar = await memberAs(app, ['registrar'])
    const [person, other] = [await personWithPassword(app, ['measurer']), await personWithPassword(app, ['measurer'])]
    const days = { validFrom: '2026-01-01', validTo: '2028-12-31', species: ['elk', 'moose'] }
    const made = await registrar.post(`/api/people/${person.uid}/accreditations`).send({ number: 'M-700', ...days })
    expect(made.status).toBe(201)
    expect((await registrar.post(`/api/people/${other.uid}/accreditations`).send({ number: 'M-700', ...days })).body).toMatchObject({ status: 409, errors: [{ path: 'number' }] })
    expect((await registrar.post(`/api/people/${other.uid}/accreditations`).send({ number: 'M-701', ...days, validTo: '2025-01-01' })).body.errors).toMatchObject([{ path: 'validTo' }])
    expect((await registrar.post(`/api/people/${other.uid}/accreditations`).send({ number: 'M-701', ...days, species: ['unicorn'] })).body.errors).toMatchObject([{ path: 'species' }])
    expect((await registrar.get(`/api/people/${other.uid}`)).body.accreditations).toEqual([])
    expect((await registrar.patch(`/api/people/accreditations/${made.body.id}`).send({ ...days, species: ['elk'], suspended: true })).status).toBe(204)
    expect((await registrar.get(`/api/people/${person.uid}`)).body.accreditations).toMatchObject([{ number: 'M-700', species: ['elk'], suspendedAt: app.clock.now().toISOString() }])
  })
})
