import { beforeAll, describe, expect, it } from 'vitest'
import { useApp, type Client } from '../support/app'

const app = useApp()
const FACTS = { category: 'mule-deer-typical', origin: 'hunted', hunterName: 'Wren Aldersea', takenOn: '2025-10-31', district: 'coldiron', method: 'rifle', sex: 'male', guided: false }

let owner: Client
let other: Client

beforeAll(async () => {
  await app.db('districts').insert({ code: 'coldiron', name: 'Coldiron', sort: 1 })
  await app.db('classes').where('code', 'mule-deer-typical').update({ offered: 1 })
  owner = await app.signInAs('entrant', { name: 'Wren Aldersea' })
  other = await app.signInAs('entrant')
})

const create = (by: Client, body: object) => by.post('/api/entries').send(body)

describe('beginning an entry', () => {
  it('answers with its id, state and version', async () => {
    const answer = await create(owner, FACTS)
    expect(answer.body).toMatchObject({ state: 'draft', version: expect.any(Number), category: 'mule-deer-typical', takenOn: '2025-10-31', isOwn: true })
    expect(answer.status).toBe(201)
    expect(answer.body.people).toMatchObject([{ part: 'hunter', name: 'Wren Aldersea' }])
    expect(answer.body.next.map((act: { transition: string }) => act.transition)).toContain('ask_measurer')
  })

  it('answers a repeated client-made id alike, and refuses another content or owner under it', async () => {
    const id = '019ae000-0000-7000-8000-000000000001'
    const first = await create(owner, { ...FACTS, id })
    const again = await create(owner, { ...FACTS, id })
    expect([first.status, again.status, again.body.id]).toEqual([201, 201, id])
    expect((await create(owner, { ...FACTS, id, sex: 'female' })).status).toBe(409)
    expect((await create(other, { ...FACTS, id })).status).toBe(409)
    const at = await Promise.all(Array.from({ length: 4 }, () => create(owner, { ...FACTS, id: '019ae000-0000-7000-8000-000000000002' })))
    expect(at.map(answer => answer.status)).toEqual([201, 201, 201, 201])
    expect(await app.db('entries').where('uid', '019ae000-0000-7000-8000-000000000002')).toHaveLength(1)
  })

  it('names every fact that cannot be taken', async () => {
    const answer = await create(owner, { ...FACTS, takenOn: 'last autumn', district: 'nowhere' })
    expect(answer.status).toBe(422)
    expect(answer.body.errors.map((error: { path: string }) => error.path).sort()).toEqual(['district', 'takenOn'])
    expect((await create(owner, { ...FACTS, takenOn: '2031-01-01' })).body.errors[0]).toMatchObject({ path: 'takenOn', code: 'in_future' })
    expect((await create(owner, { ...FACTS, category: 'unicorn' })).status).toBe(422)
    expect((await app.visitor.post('/api/entries').send(FACTS)).status).toBe(401)
  })

  it('with an Idempotency-Key answers the repetition as the first, and refuses another body', async () => {
    const send = (body: object) => create(owner, body).set('idempotency-key', 'one-and-the-same')
    const first = await send(FACTS)
    const again = await send(FACTS)
    expect([again.status, again.body.id]).toEqual([201, first.body.id])
    expect((await send({ ...FACTS, sex: 'female' })).body.code).toBe('idempotency_mismatch')
    const otherPerson = await create(other, FACTS).set('idempotency-key', 'one-and-the-same')
    expect(otherPerson.body.id).not.toBe(first.body.id)
  })

  it('makes one entry under one key, even where the process died before it kept the answer', async () => {
    const send = () => create(owner, FACTS).set('idempotency-key', 'killed-in-between')
    const first = await send()
    // What a kill -9 between the two commits leaves: the entry, and a key without an answer that is let go after a while.
    await app.db('idempotency_keys').where({ key: 'killed-in-between' }).delete()
    const again = await send()
    expect([again.status, again.body.id]).toEqual([201, first.body.id])
    expect(await app.db('entries').where({ uid: first.body.id }).select('id')).toHaveLength(1)
  })
})

describe('changing an entry', () => {
  const patch = (by: Client, id: string, version: number | null, body: object) => {
    const request = by.patch(`/api/entries/${id}`).send(body)
    return version === null ? request : request.set('if-match', `"${version}"`)
  }

  it('asks for the version that was seen, and shows the newer facts where it is another', async () => {
    const { body: entry } = await create(owner, FACTS)
    expect((await patch(owner, entry.id, null, { sex: 'female' })).status).toBe(428)
    const first = await patch(owner, entry.id, entry.version, { sex: 'female' })
    expect([first.status, first.body.sex]).toEqual([200, 'female'])
    const late = await patch(owner, entry.id, entry.version, { sex: 'unknown' })
    expect([late.status, late.body.current.sex]).toEqual([412, 'female'])
    const [one, two] = await Promise.all([patch(owner, entry.id, first.body.version, { sex: 'male' }), patch(owner, entry.id, first.body.version, { sex: 'unknown' })])
    expect([one.status, two.status].sort()).toEqual([200, 412])
  })

  it('is the owner’s alone; to others the entry is not there', async () => {
    const { body: entry } = await create(owner, FACTS)
    expect((await other.get(`/api/entries/${entry.id}`)).status).toBe(404)
    expect((await patch(other, entry.id, entry.version, { sex: 'female' })).status).toBe(404)
    expect((await (await app.signInAs('reviewer')).get(`/api/entries/${entry.id}`)).status).toBe(404)
    expect((await app.visitor.get(`/api/entries/${entry.id}`)).status).toBe(401)
  })

  it('keeps people by their id, and no part is there twice', async () => {
    const { body: entry } = await create(owner, FACTS)
    const hunter = entry.people[0]
    const twice = await patch(owner, entry.id, entry.version, { people: [{ id: hunter.id, part: 'hunter', name: 'Wren Aldersea' }, { part: 'hunter', name: 'Another' }] })
    expect(twice.body.errors[0]).toMatchObject({ path: 'people.1.part', code: 'part_twice' })
    const text = `Robert'); DROP TABLE entries;-- <img src=x onerror=alert(1)>`
    const more = await patch(owner, entry.id, entry.version, { people: [{ id: hunter.id, part: 'hunter', name: 'Wren Aldersea', isMe: true }, { part: 'owner', name: text }] })
    expect(more.body.people.map((person: { name: string }) => person.name)).toEqual(['Wren Aldersea', text])
    expect(more.body.people[0]).toMatchObject({ id: hunter.id, isMe: true })
  })
})

describe('the rules of moving', () => {
  const move = (by: Client, id: string, body: object) => by.post(`/api/entries/${id}/transitions`).send(body)

  it('name what is missing, refuse a wrong state, another version and somebody else', async () => {
    const { body: entry } = await create(owner, { ...FACTS, takenOn: 'unknown' })
    const measurer = await app.signInAs('measurer')
    const missing = await move(owner, entry.id, { transition: 'ask_measurer', version: entry.version, measurer: measurer.person!.uid })
    expect(missing.status).toBe(422)
    expect(missing.body.errors.map((error: { path: string }) => error.path)).toEqual(expect.arrayContaining(['measurer']))
    for (const error of missing.body.errors) expect(error.message).not.toMatch(/errors\.|guard_/)
    expect((await move(owner, entry.id, { transition: 'submit', version: entry.version })).status).toBe(409)
    expect((await move(owner, entry.id, { transition: 'withdraw', version: entry.version + 5, confirm: true })).status).toBe(409)
    expect((await move(other, entry.id, { transition: 'withdraw', version: entry.version, confirm: true })).status).toBe(404)
    expect((await move(owner, entry.id, { transition: 'fly_away', version: entry.version })).status).toBe(422)
  })

  it('withdraw once, however often it is sent', async () => {
    const { body: entry } = await create(owner, FACTS)
    const sent = await Promise.all(Array.from({ length: 3 }, () => move(owner, entry.id, { transition: 'withdraw', version: entry.version, confirm: true })))
    expect(sent.map(answer => answer.status).sort()).toEqual([200, 409, 409])
    const { body: events } = await owner.get(`/api/entries/${entry.id}/events`)
    expect(events.items.filter((event: { kind: string }) => event.kind === 'withdraw')).toHaveLength(1)
  })
})

describe('a walk-in', () => {
  it('is claimed by its code, once, by whoever was given it', async () => {
    const shop = await app.signInAs('shop')
    const made = await shop.post('/api/entries/for').send(FACTS)
    expect(made.status).toBe(201)
    expect(made.body.claimCode).toMatch(/^[2-9A-Z]{4}-[2-9A-Z]{4}-[2-9A-Z]{4}$/)
    expect((await owner.post('/api/entries/claim').send({ code: '2222-3333-4444' })).status).toBe(422)
    const claimed = await owner.post('/api/entries/claim').send({ code: made.body.claimCode.toLowerCase().replaceAll('-', ' ') })
    expect([claimed.status, claimed.body.id, claimed.body.isOwn]).toEqual([200, made.body.id, true])
    expect((await other.post('/api/entries/claim').send({ code: made.body.claimCode })).status).toBe(422)
    expect((await owner.post('/api/entries/for').send(FACTS)).status).toBe(403)
  })

  it('is one entry under one key through a kill, and has a code to hand out', async () => {
    const shop = await app.signInAs('shop')
    const send = () => shop.post('/api/entries/for').set('idempotency-key', 'killed-at-the-counter').send(FACTS)
    const first = await send()
    // A kill -9 before the answer was kept leaves a key that is "running"; it is let go after two minutes.
    await app.db('idempotency_keys').where({ key: 'killed-at-the-counter' }).update({ state: 'running', status: null, response: null })
    expect((await send()).body).toMatchObject({ status: 409, code: 'idempotency_in_flight' })
    app.clock.pass(3 / 1440)
    const again = await send()
    expect([again.status, again.body.id]).toEqual([201, first.body.id])
    expect(await app.db('entries').where({ uid: first.body.id }).select('id')).toHaveLength(1)
    expect((await owner.post('/api/entries/claim').send({ code: again.body.claimCode })).body).toMatchObject({ id: first.body.id, isOwn: true })
    expect((await other.post('/api/entries/claim').send({ code: first.body.claimCode })).status).toBe(422)
  })
})
