import { beforeAll, describe, expect, test } from 'vitest'
import { createEntry, beginFor } from '../../../server/services/entries/create'
import { claimEntry } from '../../../server/services/entries/claim'
import { changeEntry } from '../../../server/services/entries/change'
import { clearStake, declareStake } from '../../../server/services/office/stakes'
import { useRegistry } from '../../support/registry'
import { DEER, makeScene, PASSWORD, type Scene } from '../../support/scene'

const on = useRegistry()
let scene: Scene
beforeAll(async () => {
  scene = await makeScene(on.registry)
})

const certify = (uid: string, actor = scene.cast.measurer) => scene.move(actor, uid, { transition: 'certify', password: PASSWORD })
const failing = (guard: string) => ({ code: 'guard_failed', fields: expect.arrayContaining([expect.objectContaining({ code: `guard_${guard}` })]) as unknown })

describe('asking a measurer', () => {
  test('facts that are missing are named', async () => {
    const { uid } = await createEntry(on.registry, scene.cast.entrant, { category: 'mule-deer-typical', origin: 'hunted' })
    await expect(scene.move(scene.cast.entrant, uid, { transition: 'ask_measurer', measurer: scene.cast.measurer.uid })).rejects.toMatchObject({
      code: 'guard_failed', details: { guards: [{ guard: 'animal_facts_complete', items: ['district', 'takenOn', 'method', 'sex', 'guided', 'hunter'] }] },
    })
  })

  test('a measurer without a right for the species or with a stake is refused', async () => {
    const uid = await scene.entry('draft', { people: [{ part: 'hunter', name: scene.cast.measurer2.name, isMinor: false, isMe: false }] })
    await expect(scene.move(scene.cast.entrant, uid, { transition: 'ask_measurer', measurer: scene.cast.reviewer.uid })).rejects.toMatchObject(failing('measurer_fit'))
    await expect(scene.move(scene.cast.entrant, uid, { transition: 'ask_measurer', measurer: scene.cast.measurer2.uid })).rejects.toMatchObject(failing('measurer_without_stake'))
    await expect(scene.move(scene.cast.entrant, uid, { transition: 'ask_measurer', measurer: 'not there' })).rejects.toMatchObject({ code: 'invalid_input', fields: [{ path: 'measurer' }] })
  })

  test('somebody else\'s entry is not there for a stranger', async () => {
    const uid = await scene.entry('draft')
    await expect(scene.move(scene.cast.other, uid, { transition: 'ask_measurer', measurer: scene.cast.measurer.uid })).rejects.toMatchObject({ code: 'not_found' })
  })
})

describe('certifying', () => {
  test('the password is asked for, and a wrong one signs nothing', async () => {
    const uid = await scene.entry('measuring')
    await scene.measure(uid)
    await expect(scene.move(scene.cast.measurer, uid, { transition: 'certify' })).rejects.toMatchObject(failing('signed_by_password'))
    await expect(scene.move(scene.cast.measurer, uid, { transition: 'certify', password: 'wrong' })).rejects.toMatchObject({ code: 'password_wrong' })
    expect(await scene.state(uid)).toBe('measuring')
  })

  test('day 60 is the first on which it may be measured', async () => {
    const uid = await scene.entry('measuring')
    await scene.measure(uid, DEER, { driedSince: '2025-12-23', measuredOn: '2026-02-20' })
    await expect(certify(uid)).rejects.toMatchObject(failing('dried_long_enough'))
    await scene.measure(uid, DEER, { driedSince: '2025-12-22', measuredOn: '2026-02-20' })
    await certify(uid)
  })

  test('a sheet with a line that was not measured is not certified', async () => {
    const uid = await scene.entry('measuring')
    const { insideSpread: _, ...rest } = DEER
    await scene.measure(uid, rest)
    await expect(certify(uid)).rejects.toMatchObject(failing('sheet_complete'))
  })

  test('a split skull where the spread counts is not certified', async () => {
    const uid = await scene.entry('measuring')
    await scene.measure(uid, DEER, { wholeSkull: false })
    await expect(certify(uid)).rejects.toMatchObject(failing('no_blocking_slip'))
  })

  test('the animal\'s own hunter certifies nothing, even when the stake came after the assignment', async () => {
    const uid = await scene.entry('measuring')
    await scene.measure(uid)
    await on.registry.db('entry_people as p').join('entries as e', 'e.id', 'p.entry_id').where({ 'e.uid': uid, 'p.part': 'hunter' }).update({ 'p.user_id': scene.cast.measurer.userId })
    await expect(certify(uid)).rejects.toMatchObject({ code: 'stake', status: 403, details: { stakes: ['part.hunter'] } })
  })

  test('only the assigned measurer certifies, from the version that they saw', async () => {
    const uid = await scene.entry('measuring')
    await scene.measure(uid)
    await expect(certify(uid, scene.cast.measurer2)).rejects.toMatchObject({ code: 'not_found' })
    await expect(scene.move(scene.cast.measurer, uid, { transition: 'certify', password: PASSWORD, version: 1 })).rejects.toMatchObject({ code: 'version_conflict', status: 409 })
  })

  test('an accreditation that was suspended before the day of measuring is none', async () => {
    const uid = await scene.entry('measuring')
    await scene.measure(uid)
    const { db } = on.registry
    await db('accreditations').where({ user_id: scene.cast.measurer.userId }).update({ suspended_at: '2026-02-20 12:00:00.000' })
    await expect(certify(uid)).rejects.toMatchObject(failing('accredited_when_measured'))
    await db('accreditations').where({ user_id: scene.cast.measurer.userId }).update({ suspended_at: null })
    await certify(uid)
  })
})

describe('stakes by likeness', () => {
  test('the same name needs a registrar\'s word, with a reason, never one\'s own', async () => {
    const uid = await scene.entry('draft', { people: [{ part: 'hunter', name: 'Someone Quite Else', isMinor: false, isMe: false }, { part: 'owner', name: scene.cast.measurer2.name.split(' ').reverse().join(', '), isMinor: false, isMe: false }] })
    const ask = () => scene.move(scene.cast.entrant, uid, { transition: 'ask_measurer', measurer: scene.cast.measurer2.uid })
    await expect(ask()).rejects.toMatchObject(failing('measurer_without_stake'))
    const person = await on.registry.db('entry_people as p').join('entries as e', 'e.id', 'p.entry_id').where({ 'e.uid': uid, 'p.part': 'owner' }).first('p.uid')
    const clearance = { account: scene.cast.measurer2.uid, person: person!.uid, kind: 'name' as const, reason: 'Two families.' }
    await expect(clearStake(on.registry, scene.cast.reviewer, uid, clearance)).rejects.toMatchObject({ code: 'forbidden' })
    await expect(clearStake(on.registry, scene.cast.registrar, uid, { ...clearance, account: scene.cast.registrar.uid })).rejects.toMatchObject({ code: 'stake' })
    await clearStake(on.registry, scene.cast.registrar, uid, clearance)
    await ask()
    expect(await scene.state(uid)).toBe('measuring')
  })

  test('a declared shop bars from then on', async () => {
    const uid = await scene.entry('measuring')
    await scene.measure(uid)
    await declareStake(on.registry, scene.cast.measurer, uid, { kind: 'shop', reason: 'My shop mounts it.' })
    await expect(certify(uid)).rejects.toMatchObject({ code: 'stake' })
  })
})

describe('walk-ins and claims', () => {
  const facts = { category: 'mule-deer-typical', origin: 'hunted' as const, takenOn: '2025-11-14', district: 'alderfall', method: 'rifle' as const, sex: 'male' as const, guided: false }

  test('a measurer begins at the bench; the code makes the entry its person\'s, once', async () => {
    const { uid, told } = await beginFor(on.registry, scene.cast.measurer, { ...facts, hunterName: scene.cast.other.name, toBench: true })
    expect(await scene.state(uid)).toBe('measuring')
    await scene.measure(uid)
    await certify(uid)
    expect(await claimEntry(on.registry, scene.cast.other, told.claimCode!.toLowerCase().replaceAll('-', ' '))).toBe(uid)
    await expect(claimEntry(on.registry, scene.cast.entrant, told.claimCode!)).rejects.toMatchObject({ code: 'link_spent' })
    const owner = await on.registry.db('entries').where({ uid }).first('owner_user_id')
    expect(owner!.owner_user_id).toBe(scene.cast.other.userId)
  })

  test('a measurer never puts an animal of their own on the bench', async () => {
    await expect(beginFor(on.registry, scene.cast.measurer, { ...facts, hunterName: scene.cast.measurer.name, toBench: true })).rejects.toMatchObject(failing('measurer_without_stake'))
  })

  test('a shop begins a draft and not a measuring', async () => {
    const { uid } = await beginFor(on.registry, scene.cast.shop, { ...facts, hunterName: 'Walk In', toBench: false })
    expect(await scene.state(uid)).toBe('draft')
    await expect(beginFor(on.registry, scene.cast.shop, { ...facts, hunterName: 'Walk In', toBench: true })).rejects.toMatchObject(failing('measurer_fit'))
    await expect(beginFor(on.registry, scene.cast.entrant, { ...facts, hunterName: 'Walk In', toBench: false })).rejects.toMatchObject({ code: 'forbidden' })
  })
})

describe('two at once', () => {
  test('of two people who save one entry the second is told, and loses nothing', async () => {
    const uid = await scene.entry('draft')
    const version = await scene.version(uid)
    await changeEntry(on.registry, scene.cast.entrant, uid, version, { sex: 'female' })
    await expect(changeEntry(on.registry, scene.cast.entrant, uid, version, { sex: 'unknown' })).rejects.toMatchObject({ code: 'precondition_failed', status: 412 })
  })

  test('the same transition sent twice at once happens once', async () => {
    const uid = await scene.entry('measuring')
    await scene.measure(uid)
    const version = await scene.version(uid)
    const both = await Promise.allSettled([1, 2].map(() => scene.move(scene.cast.measurer, uid, { transition: 'certify', password: PASSWORD, version })))
    expect(both.map(one => one.status).sort()).toEqual(['fulfilled', 'rejected'])
    expect(await on.registry.db('entry_events as v').join('entries as e', 'e.id', 'v.entry_id').where({ 'e.uid': uid, 'v.kind': 'certify' }).pluck('v.id')).toHaveLength(1)
  })

  test('ten acceptances at once take ten different numbers', async () => {
    const { db } = on.registry
    const uids: string[] = []
    const sitting = await scene.sitting(true)
    for (let n = 0; n < 5; n++) uids.push(await scene.entry('at_panel', { sitting }))
    await db('docket_items').update({ second_measuring_due: 0 })
    for (const uid of uids) await scene.vote(uid, ['accept', 'accept', 'accept'])
    await Promise.allSettled([scene.close(sitting), scene.close(sitting)])
    const { applyDecisions } = await import('../../../server/services/panel/close')
    await Promise.all([applyDecisions(on.registry), applyDecisions(on.registry)])
    for (const uid of uids) expect(await scene.state(uid)).toBe('accepted')
    const numbers = await db('records').pluck('record_no')
    expect(new Set(numbers).size).toBe(numbers.length)
  })

  test('an entry with an id of the client\'s own is begun once, however often it is sent', async () => {
    const id = '019aab10-1111-7111-8111-111111111111'
    const body = { id, category: 'mule-deer-typical', origin: 'hunted' as const }
    const both = await Promise.all([1, 2].map(() => createEntry(on.registry, scene.cast.entrant, body)))
    expect(both.map(one => one.uid)).toEqual([id, id])
    await expect(createEntry(on.registry, scene.cast.entrant, { ...body, origin: 'found' })).rejects.toMatchObject({ code: 'duplicate', status: 409 })
    await expect(createEntry(on.registry, scene.cast.other, body)).rejects.toMatchObject({ code: 'duplicate' })
  })
})
