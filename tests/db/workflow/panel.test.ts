import { beforeAll, describe, expect, test } from 'vitest'
import { applyDecisions } from '../../../server/services/panel/close'
import { answerChallenge, checkReport, reportRecord } from '../../../server/services/panel/challenges'
import { askSecondMeasuring, castBallot, namePair } from '../../../server/services/panel/ballots'
import { planSitting } from '../../../server/services/panel/sittings'
import { readSecondMeasuring, saveJointSheet, savePanelSheet, signJointSheet, signPanelSheet } from '../../../server/services/panel/panelSheets'
import { useRegistry } from '../../support/registry'
import { DEER, makeScene, PASSWORD, type Scene } from '../../support/scene'

const on = useRegistry()
let scene: Scene
beforeAll(async () => {
  scene = await makeScene(on.registry)
})

/** An entry on the docket of a sitting that takes votes. */
async function beforeOpenPanel(): Promise<{ uid: string, sitting: string, item: string }> {
  const sitting = await scene.sitting(true)
  const uid = await scene.entry('at_panel', { sitting })
  await on.registry.db('docket_items').where({ uid: (await scene.itemOf(uid)).uid }).update({ second_measuring_due: 0 })
  return { uid, sitting, item: (await scene.itemOf(uid)).uid }
}

async function challenged(): Promise<{ uid: string, sitting: string }> {
  const uid = await scene.entry('accepted')
  const { record_no: recordNo } = (await on.registry.db('records as r').join('entries as e', 'e.id', 'r.entry_id').where('e.uid', uid).first('r.record_no'))!
  const report = await reportRecord(on.registry, scene.cast.other, recordNo, { text: 'I saw it behind a fence.', signature: scene.cast.other.name })
  await checkReport(on.registry, scene.cast.reviewer, report, true)
  // the chair of the next sitting voted on nothing here
  const others = scene.cast.judges.slice(3)
  const sitting = await scene.sitting(true, others)
  await scene.move(others[0]!, uid, { transition: 'challenge', comment: 'A signed report.', sitting })
  return { uid, sitting }
}

describe('votes', () => {
  test.each([
    ['three of three', ['accept', 'accept', 'accept'], 'accepted'],
    ['two of three', ['accept', 'accept', 'decline'], 'accepted'],
    ['two of four is no majority and returns', ['accept', 'accept', 'decline', 'decline'], 'returned'],
    ['three ways return', ['accept', 'decline', 'return'], 'returned'],
    ['more than half decline', ['decline', 'decline', 'accept'], 'declined'],
  ])('%s', async (_, votes, state) => {
    const { uid, sitting } = await beforeOpenPanel()
    await scene.vote(uid, votes)
    await scene.close(sitting)
    expect(await scene.state(uid)).toBe(state)
  })

  test('without a quorum the item is carried over and waits for another sitting', async () => {
    const { uid, sitting } = await beforeOpenPanel()
    await scene.vote(uid, ['accept', 'accept', 'stand_aside', 'stand_aside'])
    await scene.close(sitting)
    expect(await scene.state(uid)).toBe('at_panel')
    expect(await scene.itemOf(uid)).toMatchObject({ state: 'open', sitting: null })
  })

  test('a return carries the requests of the ballots, or what stood against the entry', async () => {
    const { uid, sitting } = await beforeOpenPanel()
    await scene.vote(uid, [{ vote: 'return', reason: 'unclear', requests: ['A sharper photograph'] }, { vote: 'return', reason: 'unclear', requests: [] }, 'accept'])
    await scene.close(sitting)
    const requests = await on.registry.db('requests as r').join('entries as e', 'e.id', 'r.entry_id').where('e.uid', uid).pluck('r.text')
    expect(requests).toEqual(['A sharper photograph'])
  })

  test('a later ballot takes the place of an earlier one while the sitting is open', async () => {
    const { uid, sitting } = await beforeOpenPanel()
    await scene.vote(uid, ['decline', 'accept', 'accept'])
    await scene.vote(uid, ['accept'])
    await scene.close(sitting)
    expect(await scene.state(uid)).toBe('accepted')
  })

  test('a vote after the sitting closed is refused', async () => {
    const { uid, sitting, item } = await beforeOpenPanel()
    await scene.vote(uid, ['accept', 'accept', 'accept'])
    await scene.close(sitting)
    await expect(castBallot(on.registry, scene.cast.judges[3]!, sitting, item, { vote: 'accept' })).rejects.toMatchObject({ code: 'sitting_closed' })
    await expect(scene.close(sitting)).rejects.toMatchObject({ code: 'sitting_closed' })
  })

  test('only judges of the sitting vote, and only the chair opens and closes', async () => {
    const sitting = await scene.sitting(true, scene.cast.judges.slice(0, 3))
    const uid = await scene.entry('at_panel', { sitting })
    const { uid: item } = await scene.itemOf(uid)
    await expect(castBallot(on.registry, scene.cast.judges[4]!, sitting, item, { vote: 'accept' })).rejects.toMatchObject({ code: 'forbidden' })
    await expect(castBallot(on.registry, scene.cast.reviewer, sitting, item, { vote: 'accept' })).rejects.toMatchObject({ code: 'forbidden' })
  })

  test.each([
    ['decline without a ground', { vote: 'decline', reason: 'no' }, 'ground'],
    ['decline without a reason', { vote: 'decline', ground: 'altered_parts' as const }, 'reason'],
    ['a vote of the other kind', { vote: 'strike', reason: 'no', ground: 'altered_parts' as const }, 'vote'],
  ])('%s is refused', async (_, ballot, path) => {
    const { sitting, item } = await beforeOpenPanel()
    await expect(castBallot(on.registry, scene.cast.judges[1]!, sitting, item, ballot)).rejects.toMatchObject({ code: 'invalid_input', fields: [{ path }] })
  })

  test('whoever has a stake may only stand aside', async () => {
    const sitting = await scene.sitting(true)
    const judge = scene.cast.judges[2]!
    const uid = await scene.entry('draft', { people: [{ part: 'hunter', name: scene.cast.entrant.name, isMinor: false, isMe: true }, { part: 'guide', name: judge.name, isMinor: false, isMe: false }] })
    await on.registry.db('entry_people').where({ part: 'guide' }).update({ user_id: judge.userId })
    await scene.move(scene.cast.entrant, uid, { transition: 'ask_measurer', measurer: scene.cast.measurer.uid })
    await scene.measure(uid)
    await scene.move(scene.cast.measurer, uid, { transition: 'certify', password: PASSWORD })
    await scene.papers(uid, ['photo_front', 'photo_left', 'photo_right', 'photo_field', 'tag_or_licence'])
    await scene.statement(uid)
    await scene.pay(uid)
    await scene.move(scene.cast.entrant, uid, { transition: 'submit' })
    await scene.tickAll(uid)
    await scene.move(scene.cast.reviewer, uid, { transition: 'put_before_panel', sitting })
    const { uid: item } = await scene.itemOf(uid)
    await expect(castBallot(on.registry, judge, sitting, item, { vote: 'accept' })).rejects.toMatchObject({ code: 'stake', status: 403 })
    await castBallot(on.registry, judge, sitting, item, { vote: 'stand_aside', reason: 'I guided the hunter' })
  })

  test('a stake that comes to light after the vote takes the ballot out of the count', async () => {
    const { uid, sitting } = await beforeOpenPanel()
    await scene.vote(uid, ['accept', 'accept', 'accept'])
    const judge = scene.cast.judges[1]!
    const { id } = (await on.registry.db('entries').where({ uid }).first('id'))!
    await on.registry.db('stake_declarations').insert({ entry_id: id, user_id: judge.userId, kind: 'shop', declared_at: '2026-03-02 15:00:00.000' })
    await scene.close(sitting)
    expect(await scene.state(uid)).toBe('at_panel')
  })

  test('closing is safe to repeat: decisions that were not carried out are carried out once', async () => {
    const { uid, sitting } = await beforeOpenPanel()
    await scene.vote(uid, ['accept', 'accept', 'accept'])
    const { db } = on.registry
    // as if the process was killed between the closing and the first decision
    const { id } = (await db('sittings').where({ uid: sitting }).first('id'))!
    await db('docket_items').where({ sitting_id: id }).update({ state: 'decided', outcome: 'accept', decided_at: '2026-03-02 15:00:00.000' })
    await db('sittings').where({ id }).update({ state: 'closed', closed_at: '2026-03-02 15:00:00.000' })
    expect(await applyDecisions(on.registry)).toBe(1)
    expect(await applyDecisions(on.registry)).toBe(0)
    expect(await scene.state(uid)).toBe('accepted')
    expect(await db('records as r').join('entries as e', 'e.id', 'r.entry_id').where('e.uid', uid).pluck('r.id')).toHaveLength(1)
  })

  test('a hold stops the panel: no vote, and what was decided waits', async () => {
    const { uid, sitting, item } = await beforeOpenPanel()
    await scene.vote(uid, ['accept', 'accept', 'accept'])
    await scene.move(scene.cast.registrar, uid, { transition: 'hold', comment: 'A court case' })
    await expect(castBallot(on.registry, scene.cast.judges[3]!, sitting, item, { vote: 'accept' })).rejects.toMatchObject({ code: 'on_hold' })
    await scene.close(sitting)
    expect(await scene.state(uid)).toBe('at_panel')
    expect((await scene.itemOf(uid)).sitting).toBeNull()
  })

  test('a sitting has at least three judges and a day that is not over', async () => {
    const [a, b] = scene.cast.judges
    const plan = { heldOn: '2027-01-01', place: 'Hall', chair: a!.uid, judges: [b!.uid], items: [] }
    await expect(planSitting(on.registry, scene.cast.reviewer, plan)).rejects.toMatchObject({ fields: [{ path: 'judges', code: 'too_few_judges' }] })
    await expect(planSitting(on.registry, scene.cast.reviewer, { ...plan, heldOn: '2026-03-01' })).rejects.toMatchObject({ fields: [{ path: 'heldOn' }] })
    await expect(planSitting(on.registry, scene.cast.judges[0]!, plan)).rejects.toMatchObject({ code: 'forbidden' })
  })
})

describe('declined', () => {
  async function declined() {
    const { uid, sitting } = await beforeOpenPanel()
    await scene.vote(uid, ['decline', 'decline', 'decline'])
    await scene.close(sitting)
    return uid
  }

  test('the event keeps the ground of the ballots beside the reason', async () => {
    const uid = await declined()
    const event = (await on.registry.db('entry_events as v').join('entries as e', 'e.id', 'v.entry_id').where({ 'e.uid': uid, 'v.kind': 'decline' }).first('v.args'))!
    expect(JSON.parse(event.args)).toMatchObject({ ground: 'altered_parts' })
  })

  test('the appeal goes to another reviewer and other judges, once', async () => {
    const uid = await declined()
    await scene.move(scene.cast.entrant, uid, { transition: 'appeal', text: 'The parts are as grown.' })
    expect(await scene.state(uid)).toBe('in_review')
    await expect(scene.move(scene.cast.reviewer, uid, { transition: 'put_before_panel' })).rejects.toMatchObject({ code: 'stake' })
    await scene.tickAll(uid, scene.cast.reviewer2)
    const sitting = await scene.sitting(true)
    await scene.move(scene.cast.reviewer2, uid, { transition: 'put_before_panel', sitting })
    const item = await scene.itemOf(uid)
    await on.registry.db('docket_items').where({ uid: item.uid }).update({ second_measuring_due: 0 })
    await expect(castBallot(on.registry, scene.cast.judges[0]!, sitting, item.uid, { vote: 'accept' })).rejects.toMatchObject({ code: 'stake', details: { stakes: ['decided_before'] } })
    await scene.vote(uid, ['decline', 'decline', 'decline'], scene.cast.judges.slice(3))
    await scene.close(sitting)
    expect(await scene.state(uid)).toBe('declined')
    await expect(scene.move(scene.cast.entrant, uid, { transition: 'appeal', text: 'Once more.' })).rejects.toMatchObject({ code: 'guard_failed' })
  })

  test('the last day of the appeal is day 30 in the registry\'s zone', async () => {
    const uid = await declined()
    const other = await declined()
    const due = (await on.registry.db('entries').where({ uid }).first('due_on'))!.due_on
    expect(due).toBe('2026-04-01')
    on.registry.at('2026-04-02T05:59:59.000Z') // 23:59:59 of 1 April in Denver
    await scene.move(scene.cast.entrant, uid, { transition: 'appeal', text: 'In time.' })
    on.registry.at('2026-04-02T06:00:00.000Z') // 24:00
    await expect(scene.move(scene.cast.entrant, other, { transition: 'appeal', text: 'Too late.' })).rejects.toMatchObject({
      code: 'guard_failed', fields: [expect.objectContaining({ code: 'guard_within_appeal_days' })],
    })
    on.registry.at('2026-03-02T15:00:00.000Z')
  })

  test('a vote before a return bars nobody', async () => {
    const { uid, sitting } = await beforeOpenPanel()
    await scene.vote(uid, ['return', 'return', 'return'])
    await scene.close(sitting)
    const { db } = on.registry
    const { id } = (await db('entries').where({ uid }).first('id'))!
    await db('requests').where({ entry_id: id }).update({ answered_at: '2026-03-02 15:00:00.000', answered_by: scene.cast.entrant.userId })
    await scene.move(scene.cast.entrant, uid, { transition: 'resubmit' })
    await db('requests').where({ entry_id: id }).update({ closed_at: '2026-03-02 15:00:00.000' })
    const again = await scene.sitting(true)
    await scene.move(scene.cast.reviewer, uid, { transition: 'put_before_panel', sitting: again })
    await db('docket_items').where({ entry_id: id, state: 'open' }).update({ second_measuring_due: 0 })
    await scene.vote(uid, ['accept', 'accept', 'accept'])
    await scene.close(again)
    expect(await scene.state(uid)).toBe('accepted')
  })
})

describe('challenges', () => {
  test('a challenged record keeps its place with a mark; upheld it stands as before', async () => {
    const { uid, sitting } = await challenged()
    const { db } = on.registry
    expect(await scene.state(uid)).toBe('challenged')
    const status = async () => (await db('records as r').join('entries as e', 'e.id', 'r.entry_id').where('e.uid', uid).first('r.status'))!.status
    expect(await status()).toBe('challenged')
    await scene.vote(uid, ['uphold', 'uphold', 'uphold'], scene.cast.judges.slice(3))
    await closeBy(sitting)
    expect(await scene.state(uid)).toBe('accepted')
    expect(await status()).toBe('accepted')
  })

  test('no majority upholds the record', async () => {
    const { uid, sitting } = await challenged()
    await answerChallenge(on.registry, scene.cast.entrant, uid, 'It was wild.')
    await scene.vote(uid, ['uphold', 'uphold', 'strike', 'strike'], scene.cast.judges.slice(3))
    await closeBy(sitting)
    expect(await scene.state(uid)).toBe('accepted')
  })

  test('nobody strikes before the entrant answered or the time is over', async () => {
    const { uid, sitting } = await challenged()
    await scene.vote(uid, ['strike', 'strike', 'strike'], scene.cast.judges.slice(3))
    await closeBy(sitting)
    expect(await scene.state(uid)).toBe('challenged')
  })

  test('struck, a record leaves lists and counts; on appeal other judges may reinstate it under its number', async () => {
    const { uid, sitting } = await challenged()
    const { db } = on.registry
    const listed = async () => Number(((await db('list_counts').where({ district_id: 0, method: '' }).sum({ n: 'n' }).first()) as { n: number }).n)
    const before = await listed()
    const number = async () => (await db('records as r').join('entries as e', 'e.id', 'r.entry_id').where('e.uid', uid).first('r.record_no', 'r.status'))!
    const first = await number()
    await answerChallenge(on.registry, scene.cast.entrant, uid, 'It was wild.')
    await scene.vote(uid, ['strike', 'strike', 'strike'], scene.cast.judges.slice(3))
    await closeBy(sitting)
    expect(await scene.state(uid)).toBe('struck')
    expect(await listed()).toBe(before - 1)
    const again = await scene.sitting(true)
    await scene.move(scene.cast.entrant, uid, { transition: 'appeal_strike', text: 'Hear others.' })
    await db('docket_items').where({ uid: (await scene.itemOf(uid)).uid }).update({ sitting_id: (await db('sittings').where({ uid: again }).first('id'))!.id })
    await expect(castBallot(on.registry, scene.cast.judges[3]!, again, (await scene.itemOf(uid)).uid, { vote: 'uphold', reason: 'again' })).rejects.toMatchObject({ code: 'stake' })
    await scene.vote(uid, ['uphold', 'uphold', 'uphold'])
    await scene.close(again)
    expect(await scene.state(uid)).toBe('accepted')
    expect(await number()).toEqual({ record_no: first.record_no, status: 'accepted' })
    expect(await listed()).toBe(before)
  })

  test('judges who accepted a record do not judge its challenge, and the chair who did does not take it up', async () => {
    const uid = await scene.entry('accepted')
    const { record_no: recordNo } = (await on.registry.db('records as r').join('entries as e', 'e.id', 'r.entry_id').where('e.uid', uid).first('r.record_no'))!
    const report = await reportRecord(on.registry, scene.cast.other, recordNo, { text: 'No.', signature: scene.cast.other.name })
    await checkReport(on.registry, scene.cast.reviewer, report, true)
    await scene.sitting(false)
    await expect(scene.move(scene.cast.judges[0]!, uid, { transition: 'challenge', comment: 'x' })).rejects.toMatchObject({ code: 'stake' })
  })

  test('a report is signed with the reporter\'s own name, by somebody else than the owner', async () => {
    const uid = await scene.entry('accepted')
    const { record_no: recordNo } = (await on.registry.db('records as r').join('entries as e', 'e.id', 'r.entry_id').where('e.uid', uid).first('r.record_no'))!
    await expect(reportRecord(on.registry, scene.cast.other, recordNo, { text: 'No.', signature: 'Somebody Else' })).rejects.toMatchObject({ fields: [{ path: 'signature' }] })
    await expect(reportRecord(on.registry, scene.cast.entrant, recordNo, { text: 'No.', signature: scene.cast.entrant.name })).rejects.toMatchObject({ code: 'forbidden' })
  })
})

const closeBy = async (sitting: string) => {
  const { closeSitting } = await import('../../../server/services/panel/close')
  await closeSitting(on.registry, scene.cast.judges[3]!, sitting)
}

describe('second measuring', () => {
  async function remeasuring() {
    const sitting = await scene.sitting(true)
    const uid = await scene.entry('at_panel', { sitting })
    const { uid: item } = await scene.itemOf(uid)
    await on.registry.db('docket_items').where({ uid: item }).update({ second_measuring_due: 1 })
    const [chair, a, b] = scene.cast.judges
    await namePair(on.registry, chair!, sitting, item, [a!.uid, b!.uid])
    await scene.move(chair!, uid, { transition: 'order_remeasure', comment: 'Among the first five.', place: 'Town hall', at: '2026-03-20T16:00:00.000Z' })
    return { uid, sitting, item, a: a!, b: b! }
  }
  const sheetOf = (measurements: object) => ({ measurements: measurements as Record<string, unknown>, measuredOn: '2026-03-02', wholeSkull: true })
  const proof = { password: PASSWORD }

  test('two judges measure blind; what lies within the limits is joined, both sign, and the panel\'s net stands', async () => {
    const { uid, a, b } = await remeasuring()
    const theirs = { ...DEER, insideSpread: '22 1/8' }
    await savePanelSheet(on.registry, a, uid, sheetOf(DEER), 'en')
    expect((await readSecondMeasuring(on.registry, b, uid)).comparison).toBeNull()
    await signPanelSheet(on.registry, a, uid, proof)
    await savePanelSheet(on.registry, b, uid, sheetOf(theirs), 'en')
    expect((await readSecondMeasuring(on.registry, b, uid)).own).not.toBeNull()
    await expect(saveJointSheet(on.registry, b, uid, sheetOf(theirs), 'en')).rejects.toMatchObject({ code: 'wrong_state' })
    await signPanelSheet(on.registry, b, uid, proof)
    const view = await readSecondMeasuring(on.registry, a, uid)
    expect(view.comparison!.beyond).toEqual([])
    await expect(saveJointSheet(on.registry, a, uid, sheetOf({ ...DEER, insideSpread: '22 4/8' }), 'en')).rejects.toMatchObject({ fields: [{ path: 'measurements.insideSpread', code: 'not_between' }] })
    const version = await saveJointSheet(on.registry, a, uid, sheetOf({ ...DEER, insideSpread: '22 2/8' }), 'en')
    expect(await signJointSheet(on.registry, a, uid, version, proof)).toBe(false)
    expect(await scene.state(uid)).toBe('remeasuring')
    expect(await signJointSheet(on.registry, b, uid, version, proof)).toBe(true)
    const entry = await on.registry.db('entries').where({ uid }).first('state', 'net16', 'standing_sheet_id', 'signed_sheet_id')
    expect(entry).toMatchObject({ state: 'at_panel', net16: 171 * 16 })
    expect(entry!.standing_sheet_id).not.toBe(entry!.signed_sheet_id)
  })

  test('a change of the joint sheet takes back the signature that was on it', async () => {
    const { uid, a, b } = await remeasuring()
    for (const judge of [a, b]) {
      await savePanelSheet(on.registry, judge, uid, sheetOf(DEER), 'en')
      await signPanelSheet(on.registry, judge, uid, proof)
    }
    const first = await saveJointSheet(on.registry, a, uid, sheetOf(DEER), 'en')
    await signJointSheet(on.registry, a, uid, first, proof)
    const second = await saveJointSheet(on.registry, b, uid, sheetOf(DEER), 'en')
    await expect(signJointSheet(on.registry, b, uid, first, proof)).rejects.toMatchObject({ code: 'version_conflict' })
    expect(await signJointSheet(on.registry, b, uid, second, proof)).toBe(false)
    expect(await signJointSheet(on.registry, a, uid, second, proof)).toBe(true)
  })

  test('an animal that is not presented by the day goes back with that ground', async () => {
    const { uid } = await remeasuring()
    const [chair] = scene.cast.judges
    await expect(scene.move(chair!, uid, { transition: 'not_presented', comment: 'Nobody came.' })).rejects.toMatchObject({ code: 'guard_failed' })
    on.registry.at('2026-03-21T16:00:00.000Z')
    await scene.move(chair!, uid, { transition: 'not_presented', comment: 'Nobody came.' })
    on.registry.at('2026-03-02T15:00:00.000Z')
    expect(await scene.state(uid)).toBe('at_panel')
  })

  test('accept waits for a second measuring that is due', async () => {
    const sitting = await scene.sitting(true)
    const uid = await scene.entry('at_panel', { sitting })
    await on.registry.db('docket_items').where({ uid: (await scene.itemOf(uid)).uid }).update({ second_measuring_due: 1 })
    await scene.vote(uid, ['accept', 'accept', 'accept'])
    await scene.close(sitting)
    expect(await scene.state(uid)).toBe('at_panel')
    expect((await scene.itemOf(uid)).sitting).toBeNull()
  })

  test('it is due when two judges ask, not when one asks twice', async () => {
    const sitting = await scene.sitting(true)
    const uid = await scene.entry('at_panel', { sitting })
    const { uid: item } = await scene.itemOf(uid)
    await on.registry.db('docket_items').where({ uid: item }).update({ second_measuring_due: 0 })
    const [chair, a, b, c, d] = scene.cast.judges
    await namePair(on.registry, chair!, sitting, item, [c!.uid, d!.uid])
    const order = () => scene.move(chair!, uid, { transition: 'order_remeasure', comment: 'Asked.', place: 'Hall', at: '2026-03-20T16:00:00.000Z' })
    await askSecondMeasuring(on.registry, a!, sitting, item, 'The spread looks wide.')
    await askSecondMeasuring(on.registry, a!, sitting, item, 'I said so.')
    await expect(order()).rejects.toMatchObject({ code: 'guard_failed' })
    await askSecondMeasuring(on.registry, b!, sitting, item, 'Agreed.')
    await order()
    expect(await scene.state(uid)).toBe('remeasuring')
  })

  test('a judge who opened the file cannot be one of the pair', async () => {
    const sitting = await scene.sitting(true)
    const uid = await scene.entry('at_panel', { sitting })
    const { uid: item } = await scene.itemOf(uid)
    const { id } = (await on.registry.db('entries').where({ uid }).first('id'))!
    const [chair, a, b] = scene.cast.judges
    await on.registry.db('file_openings').insert({ entry_id: id, user_id: a!.userId, first_at: '2026-03-02 15:00:00.000', last_at: '2026-03-02 15:00:00.000' })
    await expect(namePair(on.registry, chair!, sitting, item, [a!.uid, b!.uid])).rejects.toMatchObject({ fields: [{ path: 'judges.0', code: 'opened_file' }] })
  })
})
