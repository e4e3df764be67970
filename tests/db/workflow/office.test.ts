import { beforeAll, describe, expect, test } from 'vitest'
import { answerRequest, askRequest } from '../../../server/services/office/requests'
import { runClock } from '../../../server/services/entries/clock'
import { changeEntry } from '../../../server/services/entries/change'
import { DEER, makeScene, PASSWORD, type Scene } from '../../support/scene'
import { useRegistry } from '../../support/registry'

const START = '2026-03-02T15:00:00.000Z'
const on = useRegistry(START)
let scene: Scene
beforeAll(async () => {
  scene = await makeScene(on.registry)
})

const failing = (guard: string) => ({ code: 'guard_failed', fields: expect.arrayContaining([expect.objectContaining({ code: `guard_${guard}` })]) as unknown })
const rowOf = async (uid: string) => (await on.registry.db('entries').where({ uid }).first())!

describe('submitting', () => {
  test('everything that is missing is named at once', async () => {
    const uid = await scene.entry('certified')
    await expect(scene.move(scene.cast.entrant, uid, { transition: 'submit' })).rejects.toMatchObject({
      details: { guards: [
        { guard: 'papers_complete', items: ['photo_front', 'photo_left', 'photo_right', 'photo_field', 'tag_or_licence'] },
        { guard: 'statement_signed', items: ['hunter'] },
        { guard: 'fee_settled', params: { due: 4000, settled: 0 } },
      ] },
    })
  })

  test('a net at the minimum is enough, a step under it is not', async () => {
    const low = (spread: string) => ({ ...DEER, right: { ...DEER.right, mainBeam: '16 4/8' }, left: { ...DEER.left, mainBeam: '16 4/8' }, insideSpread: spread })
    const uid = await scene.entry('certified', { measurements: low('15 1/8') })
    const { net16 } = await rowOf(uid)
    expect(net16).toBeLessThan(158 * 16)
    await expect(scene.move(scene.cast.entrant, uid, { transition: 'submit' })).rejects.toMatchObject(failing('net_at_minimum'))
    await on.registry.db('minimums').where({ min16: 158 * 16 }).update({ min16: net16! })
    await expect(scene.move(scene.cast.entrant, uid, { transition: 'submit' })).rejects.not.toMatchObject(failing('net_at_minimum'))
    await on.registry.db('minimums').where({ min16: net16! }).update({ min16: net16! + 2 })
    await expect(scene.move(scene.cast.entrant, uid, { transition: 'submit' })).rejects.toMatchObject(failing('net_at_minimum'))
    await on.registry.db('minimums').where({ min16: net16! + 2 }).update({ min16: 158 * 16 })
  })

  test('the minimums term of the first submission stays with the entry', async () => {
    const uid = await scene.entry('in_review')
    expect((await rowOf(uid)).term_id).not.toBeNull()
  })

  test('facts are frozen after it, but for those a request names', async () => {
    const uid = await scene.entry('in_review')
    await askRequest(on.registry, scene.cast.reviewer, uid, { kind: 'fact', text: 'Male or female?', wants: ['sex'] })
    await scene.move(scene.cast.reviewer, uid, { transition: 'return' })
    await expect(changeEntry(on.registry, scene.cast.entrant, uid, await scene.version(uid), { method: 'crossbow' })).rejects.toMatchObject({ code: 'frozen_fact', fields: [{ path: 'method' }] })
    await changeEntry(on.registry, scene.cast.entrant, uid, await scene.version(uid), { sex: 'female' })
  })
})

describe('returning', () => {
  test('needs a request; comes back when every one is answered', async () => {
    const uid = await scene.entry('in_review')
    await expect(scene.move(scene.cast.reviewer, uid, { transition: 'return' })).rejects.toMatchObject(failing('open_request'))
    const request = await askRequest(on.registry, scene.cast.reviewer, uid, { kind: 'explain', text: 'Where is the tag?', wants: [] })
    await scene.move(scene.cast.reviewer, uid, { transition: 'return' })
    await expect(scene.move(scene.cast.entrant, uid, { transition: 'resubmit' })).rejects.toMatchObject(failing('every_request_answered'))
    await answerRequest(on.registry, scene.cast.entrant, uid, request, 'On the left antler.')
    await scene.move(scene.cast.entrant, uid, { transition: 'resubmit' })
    await scene.tickAll(uid)
    await expect(scene.move(scene.cast.reviewer, uid, { transition: 'put_before_panel' })).rejects.toMatchObject(failing('no_open_request'))
  })
})

describe('before the panel', () => {
  test('every check is ticked', async () => {
    const uid = await scene.entry('in_review')
    await expect(scene.move(scene.cast.reviewer, uid, { transition: 'put_before_panel' })).rejects.toMatchObject(failing('every_check_ticked'))
  })

  test('the measurer of the entry sheet does not review it', async () => {
    const uid = await scene.entry('in_review')
    const both = { ...scene.cast.measurer, roles: [...scene.cast.measurer.roles, 'reviewer' as const] }
    await expect(scene.move(both, uid, { transition: 'put_before_panel' })).rejects.toMatchObject({ code: 'stake', details: { stakes: ['measured'] } })
  })

  test('a new certificate is a new sheet; the old one stays, and the entry comes back to whoever asked', async () => {
    const uid = await scene.entry('in_review')
    await scene.move(scene.cast.reviewer, uid, { transition: 'recertify', comment: 'The spread reads wide.' })
    await scene.measure(uid, { ...DEER, insideSpread: '22 1/8' })
    await scene.move(scene.cast.measurer, uid, { transition: 'certify', password: PASSWORD })
    expect(await rowOf(uid)).toMatchObject({ state: 'in_review', return_to: null, net16: 170 * 16 + 14 })
    const sheets = await on.registry.db('sheets as s').join('entries as e', 'e.id', 's.entry_id').where('e.uid', uid).orderBy('s.number').select('s.state', 's.replaces_id', 's.id')
    expect(sheets.map(sheet => sheet.state)).toEqual(['replaced', 'signed'])
    expect(sheets[1]!.replaces_id).toBe(sheets[0]!.id)
  })

  test('a new certificate for the panel puts the entry on a docket again', async () => {
    const sitting = await scene.sitting(true)
    const uid = await scene.entry('at_panel', { sitting })
    await expect(scene.move(scene.cast.reviewer, uid, { transition: 'recertify', comment: 'Not mine to ask.' })).rejects.toMatchObject({ code: 'forbidden' })
    await scene.move(scene.cast.judges[0]!, uid, { transition: 'recertify', comment: 'Tape again.' })
    expect((await scene.itemOf(uid)).state).toBe('carried')
    await scene.measure(uid)
    await scene.move(scene.cast.measurer, uid, { transition: 'certify', password: PASSWORD })
    expect(await scene.state(uid)).toBe('at_panel')
    expect((await scene.itemOf(uid)).state).toBe('open')
  })

  test('reclassified with the entrant\'s consent, the same readings are scored by the other sheet', async () => {
    const uid = await scene.entry('in_review', { measurements: { ...DEER, abnormalPoints: [{ side: 'left', length: '2 0/8', width: '0 4/8' }] } })
    await expect(scene.move(scene.cast.reviewer, uid, { transition: 'reclassify', category: 'mule-deer-nontypical', comment: 'Better there.' })).rejects.toMatchObject(failing('entrant_consents'))
    const request = await askRequest(on.registry, scene.cast.reviewer, uid, { kind: 'reclassify', text: 'May it stand as non-typical?', wants: ['mule-deer-nontypical'] })
    await answerRequest(on.registry, scene.cast.entrant, uid, request, 'yes')
    await expect(scene.move(scene.cast.reviewer, uid, { transition: 'reclassify', category: 'black-bear', comment: 'No.' })).rejects.toMatchObject(failing('same_lines'))
    const before = (await rowOf(uid)).net16!
    await scene.move(scene.cast.reviewer, uid, { transition: 'reclassify', category: 'mule-deer-nontypical', comment: 'Better there.' })
    expect((await rowOf(uid)).net16).toBe(before + 2 * 2 * 16)
  })

  test('a ground that the facts contradict declines nothing', async () => {
    const uid = await scene.entry('in_review')
    await expect(scene.move(scene.cast.reviewer, uid, { transition: 'decline_ineligible', ground: 'under_minimum', reason: 'Low.' })).rejects.toMatchObject(failing('ground_fits'))
    await expect(scene.move(scene.cast.reviewer, uid, { transition: 'decline_ineligible' })).rejects.toMatchObject({ fields: [{ path: 'ground' }, { path: 'reason' }] })
    await scene.move(scene.cast.reviewer, uid, { transition: 'decline_ineligible', ground: 'in_velvet', reason: 'Velvet on both beams.' })
    expect(await rowOf(uid)).toMatchObject({ state: 'declined', due_on: '2026-04-01' })
  })
})

describe('withdrawing', () => {
  test('asks for a yes, and asks the fee back', async () => {
    const uid = await scene.entry('in_review')
    await expect(scene.move(scene.cast.entrant, uid, { transition: 'withdraw' })).rejects.toMatchObject(failing('confirmed'))
    await scene.move(scene.cast.entrant, uid, { transition: 'withdraw', confirm: true })
    expect(await scene.state(uid)).toBe('withdrawn')
    expect(await on.registry.db('payment_commands as c').join('entries as e', 'e.id', 'c.entry_id').where({ 'e.uid': uid, 'c.kind': 'refund' }).first('c.kind', 'c.state')).toEqual({ kind: 'refund', state: 'waiting' })
    expect(await on.registry.db('animals as a').join('entries as e', 'e.animal_id', 'a.id').where('e.uid', uid).first('a.live_entry_id')).toEqual({ live_entry_id: null })
  })

  test('during a hold it takes the chair, after the entrant asked', async () => {
    const sitting = await scene.sitting(true)
    const uid = await scene.entry('at_panel', { sitting })
    const [chair] = scene.cast.judges
    await scene.move(scene.cast.registrar, uid, { transition: 'hold', comment: 'A case.' })
    await expect(scene.move(scene.cast.entrant, uid, { transition: 'withdraw', confirm: true })).rejects.toMatchObject(failing('withdrawal_agreed'))
    await expect(scene.move(chair!, uid, { transition: 'withdraw', confirm: true })).rejects.toMatchObject(failing('withdrawal_agreed'))
    on.registry.at('2026-03-02T15:00:01.000Z')
    await scene.move(scene.cast.entrant, uid, { transition: 'ask_withdrawal', text: 'I want it back.' })
    await scene.move(chair!, uid, { transition: 'withdraw', confirm: true })
    expect(await scene.state(uid)).toBe('withdrawn')
    expect((await scene.itemOf(uid)).state).toBe('removed')
    on.registry.at(START)
  })
})

describe('amending', () => {
  test('changes facts and lists, never a score; before and after stay in the history', async () => {
    const uid = await scene.entry('accepted')
    await scene.move(scene.cast.registrar, uid, { transition: 'amend', comment: 'The tag says so.', changes: { district: 'brackwater', hunterName: 'Wren Tarnley', method: 'muzzleloader' } })
    const record = await on.registry.db('records as r').join('entries as e', 'e.id', 'r.entry_id').join('districts as d', 'd.id', 'r.district_id').where('e.uid', uid).first('r.hunter_shown', 'd.code', 'r.method', 'r.id')
    expect(record).toMatchObject({ hunter_shown: 'Wren Tarnley', code: 'brackwater', method: 'muzzleloader' })
    expect(await on.registry.db('record_tokens').where({ record_id: record!.id, token: 'tarnley' }).pluck('token')).toEqual(['tarnley'])
    await expect(scene.move(scene.cast.reviewer, uid, { transition: 'amend', comment: 'No.', changes: { sex: 'female' } })).rejects.toMatchObject({ code: 'forbidden' })
    await expect(scene.move(scene.cast.registrar, uid, { transition: 'amend', comment: 'No.', changes: { net16: 9999 } as never })).rejects.toMatchObject(failing('facts_only'))
  })
})

describe('the clock', () => {
  test('reminds after 14 and 75 days, lapses after 90, and is taken up again once', async () => {
    const uid = await scene.entry('certified')
    const { db } = on.registry
    const reminders = async () => (await db('notices as n').join('entries as e', 'e.id', 'n.entry_id').where({ 'e.uid': uid, 'n.template': 'untouched_certified' }).pluck('n.id')).length
    const at = async (day: number) => {
      on.registry.at(START)
      on.registry.pass(day)
      await runClock(on.registry)
      return { state: await scene.state(uid), reminders: await reminders() }
    }
    expect(await at(13)).toEqual({ state: 'certified', reminders: 0 })
    expect(await at(14)).toEqual({ state: 'certified', reminders: 1 })
    expect(await at(20)).toEqual({ state: 'certified', reminders: 1 })
    expect(await at(75)).toEqual({ state: 'certified', reminders: 2 })
    expect(await at(90)).toEqual({ state: 'certified', reminders: 2 })
    expect(await at(91)).toEqual({ state: 'lapsed', reminders: 2 })
    await scene.move(scene.cast.entrant, uid, { transition: 'revive' })
    expect(await scene.state(uid)).toBe('certified')
    expect(await at(91 + 91)).toMatchObject({ state: 'lapsed' })
    await expect(scene.move(scene.cast.entrant, uid, { transition: 'revive' })).rejects.toMatchObject(failing('not_revived_before'))
    on.registry.at(START)
  })

  test('a hold stops it, and the days of the hold are given back', async () => {
    const uid = await scene.entry('certified')
    await scene.move(scene.cast.registrar, uid, { transition: 'hold', comment: 'A case.' })
    on.registry.pass(100)
    await runClock(on.registry)
    expect(await scene.state(uid)).toBe('certified')
    await scene.move(scene.cast.registrar, uid, { transition: 'lift_hold', comment: 'Over.' })
    expect((await rowOf(uid)).due_on).toBe('2026-09-08')
    on.registry.at(START)
  })

  test('two workers at once remind once', async () => {
    const uid = await scene.entry('certified')
    on.registry.pass(14)
    await Promise.all([runClock(on.registry), runClock(on.registry)])
    expect(await on.registry.db('notices as n').join('entries as e', 'e.id', 'n.entry_id').where({ 'e.uid': uid, 'n.template': 'untouched_certified' }).pluck('n.id')).toHaveLength(1)
    on.registry.at(START)
  })
})
