import { beforeAll, describe, expect, test } from 'vitest'
import { useApp, type Client } from '../support/app'
import { answerRequest, askRequest, makeScene, type Scene } from '../support/scene'

const app = useApp()
let scene: Scene
let entrant: Client

beforeAll(async () => {
  scene = await makeScene(Object.assign(app.registry, { at: app.clock.set, pass: app.clock.pass }))
  entrant = await app.signIn({ ...scene.cast.entrant })
})

const FACTS = { category: 'mule-deer-typical', takenOn: '2025-11-14', district: 'alderfall', sex: 'male' }
async function begun(facts: object): Promise<string> {
  const answer = await entrant.post('/api/entries').send({ ...FACTS, ...facts })
  expect(answer.body).toHaveProperty('id')
  return answer.body.id
}
const hunted = (people: object[]) => begun({ origin: 'hunted', method: 'rifle', guided: false, people })
const read = async (id: string) => (await entrant.get(`/api/entries/${id}/statement`)).body
async function sign(id: string, part: string, name: string, more: object = {}) {
  const { text } = await read(id)
  return entrant.post(`/api/entries/${id}/statement`).send({ part, name, textVersion: text.version, ...more })
}

describe('who signs the statement', () => {
  test('the hunter, whatever the case, spaces and accents of the typed name', async () => {
    const id = await hunted([{ part: 'hunter', name: 'Åse Wick' }])
    expect(await read(id)).toMatchObject({ signers: [{ part: 'hunter', name: 'Åse Wick' }], signed: [], maySign: true })
    expect((await sign(id, 'hunter', 'Somebody Else')).body).toMatchObject({ status: 422, errors: [{ path: 'name', code: 'other_name' }] })
    const signed = await sign(id, 'hunter', '  åse   WICK ')
    expect(signed.body.signed).toMatchObject([{ part: 'hunter', stands: true }])
  })

  test('the guardian of a minor, and not the minor', async () => {
    const id = await hunted([{ part: 'hunter', name: 'Bo Wick', isMinor: true }, { part: 'guardian', name: 'Åse Wick' }])
    expect((await read(id)).signers).toEqual([{ part: 'guardian', name: 'Åse Wick' }])
    expect((await sign(id, 'hunter', 'Bo Wick')).body.errors).toMatchObject([{ path: 'part', code: 'no_signer' }])
    expect((await sign(id, 'guardian', 'Åse Wick')).status).toBe(200)
  })

  test('the heir of a hunter who has died', async () => {
    const id = await hunted([{ part: 'hunter', name: 'Old Wick', diedOn: '2025-12-24' }, { part: 'heir', name: 'Åse Wick' }])
    expect((await read(id)).signers).toEqual([{ part: 'heir', name: 'Åse Wick' }])
    expect((await sign(id, 'heir', 'Åse Wick')).status).toBe(200)
  })

  test('the finder of a found head, the owner of an inherited one', async () => {
    const found = await begun({ origin: 'found', people: [{ part: 'finder', name: 'Åse Wick' }] })
    expect((await read(found)).signers).toEqual([{ part: 'finder', name: 'Åse Wick' }])
    const inherited = await begun({ origin: 'inherited', takenOn: '1961', people: [{ part: 'owner', name: 'Åse Wick' }] })
    expect((await read(inherited)).signers).toEqual([{ part: 'owner', name: 'Åse Wick' }])
  })

  test('only the entry\'s own person, in words that were read', async () => {
    const id = await hunted([{ part: 'hunter', name: 'Åse Wick' }])
    const { text } = await read(id)
    expect(text.body.length).toBeGreaterThan(100)
    expect((await sign(id, 'hunter', 'Åse Wick', { textVersion: text.version + 1 })).body).toMatchObject({ status: 422, errors: [{ path: 'textVersion' }] })
    const other = await app.signIn({ ...scene.cast.other })
    expect((await other.post(`/api/entries/${id}/statement`).send({ part: 'hunter', name: 'Åse Wick', textVersion: text.version })).status).toBe(404)
    const kept = await app.db('statements as s').join('entries as e', 'e.id', 's.entry_id').where('e.uid', id).select('s.id')
    expect(kept).toEqual([])
  })
})

describe('a signature', () => {
  test('no longer stands when the people of the entry change, and is given anew', async () => {
    const id = await hunted([{ part: 'hunter', name: 'Åse Wick' }])
    await sign(id, 'hunter', 'Åse Wick')
    const { version } = (await entrant.get(`/api/entries/${id}`)).body
    expect((await entrant.patch(`/api/entries/${id}`).set('if-match', `"${version}"`).send({ people: [{ part: 'hunter', name: 'Tove Wick' }] })).status).toBe(200)
    expect((await read(id)).signed).toMatchObject([{ name: 'Åse Wick', stands: false }])
    expect((await sign(id, 'hunter', 'Tove Wick')).body.signed.filter((one: { stands: boolean }) => one.stands)).toMatchObject([{ name: 'Tove Wick' }])
  })

  test.each([
    ['takenOn', '2025-11-15', '2025-11-14'], ['district', 'brackwater', 'alderfall'], ['method', 'crossbow', 'rifle'], ['sex', 'female', 'male'], ['guided', true, false],
    ['category', 'mule-deer-nontypical', 'mule-deer-typical'], ['origin', 'road_killed', 'hunted'],
  ] as const)('no longer stands when the %s is another than was stated; saying the same again changes nothing', async (fact, other, same) => {
    const id = await hunted([{ part: 'hunter', name: 'Åse Wick' }])
    await sign(id, 'hunter', 'Åse Wick')
    const change = async (facts: object) => entrant.patch(`/api/entries/${id}`).set('if-match', `"${(await entrant.get(`/api/entries/${id}`)).body.version}"`).send(facts)
    expect((await change({ [fact]: same, driedFrom: 'taken', monthPublic: true })).status).toBe(200)
    expect((await read(id)).signed).toMatchObject([{ stands: true }])
    expect((await change({ [fact]: other })).status).toBe(200)
    expect((await read(id)).signed).toMatchObject([{ stands: false }])
    expect((await entrant.get(`/api/entries/${id}`)).body.statement.signedBy).toEqual([])
  })

  test('is wanted again before a fact that the office asked about goes back to it', async () => {
    const id = await scene.entry('in_review')
    const request = await askRequest(app.registry, scene.cast.reviewer, id, { kind: 'fact', text: 'Male or female?', wants: ['sex'] })
    await scene.move(scene.cast.reviewer, id, { transition: 'return' })
    const { version } = (await entrant.get(`/api/entries/${id}`)).body
    expect((await entrant.patch(`/api/entries/${id}`).set('if-match', `"${version}"`).send({ sex: 'female' })).status).toBe(200)
    await answerRequest(app.registry, scene.cast.entrant, id, request, 'Female, by the teeth.')
    await expect(scene.move(scene.cast.entrant, id, { transition: 'resubmit' })).rejects.toMatchObject({ code: 'guard_failed', fields: [expect.objectContaining({ code: 'guard_statement_signed' })] })
    expect((await sign(id, 'hunter', scene.cast.entrant.name)).status).toBe(200)
    await scene.move(scene.cast.entrant, id, { transition: 'resubmit' })
    expect(await scene.state(id)).toBe('in_review')
  })

  test('stands while the animal is only measured again: its facts are fixed', async () => {
    const id = await scene.entry('in_review')
    await scene.move(scene.cast.reviewer, id, { transition: 'recertify', comment: 'The spread reads wide.' })
    const { version, may } = (await entrant.get(`/api/entries/${id}`)).body
    expect(may.writeFacts).toBe(false)
    const answer = await entrant.patch(`/api/entries/${id}`).set('if-match', `"${version}"`).send({ method: 'crossbow' })
    expect(answer.body).toMatchObject({ status: 422, code: 'frozen_fact', errors: [{ path: 'method' }] })
    expect((await read(id)).signed).toMatchObject([{ stands: true }])
  })

  test('cannot be given once the office has the entry', async () => {
    const id = await scene.entry('in_review')
    expect((await sign(id, 'hunter', scene.cast.entrant.name)).body).toMatchObject({ status: 409, code: 'wrong_state' })
  })
})
