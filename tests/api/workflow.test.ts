import { beforeAll, describe, expect, test } from 'vitest'
import { CHECK_CODES } from '../../shared/domain/workflow/checks'
import { useApp, type Client } from '../support/app'
import { memberAs, PASSWORD } from '../support/account'
import { DEER } from '../support/scene'
import { newUid } from '../../server/services/moment'

const app = useApp()
const FACTS = { category: 'mule-deer-typical', origin: 'hunted', hunterName: 'Orla Fennimoor', takenOn: '2025-10-31', district: 'coldiron', method: 'rifle', sex: 'male', guided: false }

let entrant: Client
let measurer: Client
let reviewer: Client
let judges: Client[]
const uidOf = (client: Client) => client.person!.uid

beforeAll(async () => {
  const { db } = app
  await db('districts').insert({ code: 'coldiron', name: 'Coldiron', sort: 1 })
  await db('classes').where('code', 'mule-deer-typical').update({ offered: 1 })
  const category = (await db('classes').where('code', 'mule-deer-typical').first('id', 'species_id'))!
  const [term] = await db('minimums_terms').insert({ label: '2026', from_on: '2026-01-01' })
  await db('minimums').insert({ term_id: term!, class_id: category.id, min16: 158 * 16 })
  entrant = await memberAs(app, [], { name: 'Orla Fennimoor' })
  measurer = await memberAs(app, ['measurer'], { name: 'Berrin Stoat' })
  const [id] = await db('accreditations').insert({ uid: newUid(app.clock.now()), user_id: measurer.person!.userId, number: 'M-1', valid_from: '2020-01-01', valid_to: '2029-12-31', created_at: '2020-01-01 00:00:00.000' })
  await db('accreditation_species').insert({ accreditation_id: id!, species_id: category.species_id })
  reviewer = await memberAs(app, ['reviewer'], { name: 'Calla Wray' })
  judges = []
  for (const name of ['Dunstan Pell', 'Edda Quarrie', 'Finlo Reave']) judges.push(await memberAs(app, ['judge'], { name }))
})

const versionOf = async (by: Client, id: string) => (await by.get(`/api/entries/${id}`)).body.version as number
async function act(by: Client, id: string, transition: string, more: object = {}) {
  const { version } = (await app.db('entries').where({ uid: id }).first('version'))!
  return by.post(`/api/entries/${id}/transitions`).send({ transition, version, ...more })
}
const begin = async () => (await entrant.post('/api/entries').send(FACTS)).body.id as string

async function certified(): Promise<string> {
  const id = await begin()
  expect((await act(entrant, id, 'ask_measurer', { measurer: uidOf(measurer) })).status).toBe(200)
  const saved = await measurer.put(`/api/entries/${id}/sheet`).set('if-match', '"1"')
    .send({ measurements: DEER, measuredOn: '2026-02-20', driedSince: '2025-11-15', driedFrom: 'taken', wholeSkull: true })
  expect(saved.status).toBe(200)
  expect((await act(measurer, id, 'certify', { password: PASSWORD })).status).toBe(200)
  return id
}

async function inReview(): Promise<string> {
  const id = await certified()
  const { db } = app
  const { id: entryId } = (await db('entries').where({ uid: id }).first('id'))!
  for (const kind of ['photo_front', 'photo_left', 'photo_right', 'photo_field', 'tag_or_licence'] as const) {
    const sha256 = newUid(app.clock.now()).replaceAll('-', '').padEnd(64, '0')
    const [file] = await db('files').insert({ sha256, size: 1, mime: 'image/jpeg', storage_key: sha256, created_at: '2026-03-01 00:00:00.000' })
    await db('documents').insert({ uid: newUid(app.clock.now()), entry_id: entryId, file_id: file!, kind, name: kind, created_at: '2026-03-01 00:00:00.000' })
  }
  await db('statements').insert({ uid: newUid(app.clock.now()), entry_id: entryId, text_version: 1, part: 'hunter', signer_name: 'Orla Fennimoor', body_hash: 'a'.repeat(64), signed_at: '2026-03-01 00:00:00.000' })
  expect((await act(entrant, id, 'submit')).status).toBe(200)
  return id
}

describe('transitions by API', () => {
  test('404 for a stranger, 403 for another role, 409 from another state or version, 422 with every guard that failed', async () => {
    const id = await certified()
    expect((await act(judges[0]!, id, 'submit')).status).toBe(404)
    expect((await act(measurer, id, 'submit')).status).toBe(403)
    expect((await act(entrant, id, 'resubmit')).body).toMatchObject({ status: 409, code: 'wrong_state', state: 'certified' })
    expect((await act(entrant, id, 'fly')).status).toBe(422)
    const missing = await act(entrant, id, 'submit')
    expect(missing.status).toBe(422)
    expect(missing.headers['content-type']).toMatch(/^application\/problem\+json/)
    expect(missing.body.errors.map((error: { code: string }) => error.code)).toEqual(['guard_papers_complete', 'guard_statement_signed'])
    const stale = await entrant.post(`/api/entries/${id}/transitions`).send({ transition: 'reopen', version: 1 })
    expect(stale.body).toMatchObject({ status: 409, code: 'version_conflict', version: await versionOf(entrant, id) })
  })

  test('the same submit sent twice under one key is one submit', async () => {
    const id = await certified()
    const version = await versionOf(entrant, id)
    const send = () => entrant.post(`/api/entries/${id}/transitions`).set('idempotency-key', `reopen-${id}`).send({ transition: 'reopen', version })
    const first = await send()
    const again = await send()
    expect([first.status, again.status]).toEqual([200, 200])
    expect(again.body).toEqual(first.body)
    expect((await app.db('entry_events as v').join('entries as e', 'e.id', 'v.entry_id').where({ 'e.uid': id, 'v.kind': 'reopen' })).length).toBe(1)
  })

  test('a sheet is saved from the version that was seen: 428 without, 412 with another', async () => {
    const id = await begin()
    await act(entrant, id, 'ask_measurer', { measurer: uidOf(measurer) })
    const save = (headers: Record<string, string>) => measurer.put(`/api/entries/${id}/sheet`).set(headers).send({ measurements: {} })
    expect((await save({})).status).toBe(428)
    expect((await save({ 'if-match': '"1"' })).status).toBe(200)
    expect((await save({ 'if-match': '"1"' })).status).toBe(412)
    const bad = await measurer.put(`/api/entries/${id}/sheet`).set('if-match', '"2"').send({ measurements: { right: { g2: '21 9/8' }, insideSpread: '-2' } })
    expect(bad.status).toBe(422)
    expect(bad.body.errors.map((error: { path: string }) => error.path).sort()).toEqual(['measurements.insideSpread', 'measurements.right.g2'])
  })

  test('a system\'s or panel\'s transition is nobody\'s to call', async () => {
    const id = await inReview()
    for (const transition of ['accept', 'decline', 'strike', 'lapse', 'take_back', 'replace']) expect((await act(reviewer, id, transition)).status).toBe(403)
  })
})

describe('the panel by API', () => {
  test('from the office over a sitting into the lists', async () => {
    const id = await inReview()
    for (const code of CHECK_CODES) await reviewer.put(`/api/entries/${id}/checks/${code}`)
    expect((await act(reviewer, id, 'put_before_panel')).status).toBe(200)
    const item = (await app.db('docket_items as d').join('entries as e', 'e.id', 'd.entry_id').where('e.uid', id).first('d.uid', 'd.id'))!
    await app.db('docket_items').where({ id: item.id }).update({ second_measuring_due: 0 })
    const planned = await reviewer.post('/api/sittings').send({ heldOn: '2026-03-10', place: 'Town hall', chair: uidOf(judges[0]!), judges: judges.map(uidOf), items: [item.uid] })
    expect(planned.status).toBe(201)
    const sitting = planned.body.id as string
    const ballot = (judge: Client, body: object) => judge.put(`/api/sittings/${sitting}/items/${item.uid}/ballot`).send(body)
    expect((await ballot(judges[0]!, { vote: 'accept' })).status).toBe(409)
    expect((await judges[1]!.post(`/api/sittings/${sitting}/open`).send({})).status).toBe(403)
    expect((await judges[0]!.post(`/api/sittings/${sitting}/open`).send({})).status).toBe(200)
    expect((await ballot(judges[1]!, { vote: 'decline' })).body.errors.map((error: { path: string }) => error.path)).toEqual(['reason', 'ground'])
    for (const judge of judges) expect((await ballot(judge, { vote: 'accept' })).status).toBe(200)
    expect((await ballot(reviewer, { vote: 'accept' })).status).toBe(403)
    expect((await judges[0]!.post(`/api/sittings/${sitting}/close`).send({})).status).toBe(200)
    expect((await ballot(judges[0]!, { vote: 'accept' })).body).toMatchObject({ status: 409, code: 'sitting_closed' })
    expect((await entrant.get(`/api/entries/${id}`)).body).toMatchObject({ state: 'accepted' })
    const records = await app.visitor.get('/api/records?category=mule-deer-typical')
    expect(records.body.items).toMatchObject([{ rank: 1, net: '171 1/8', hunter: 'Orla Fennimoor', takenOn: '2025' }])
  })
})
