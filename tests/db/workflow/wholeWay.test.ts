import { beforeAll, describe, expect, test } from 'vitest'
import { useRegistry } from '../../support/registry'
import { DEER, makeScene, PASSWORD, type Scene } from '../../support/scene'
import { chainFaults, type StoredEvent } from '../../../server/services/events/hash'
import { isoTime } from '../../../db/time'

const on = useRegistry()
let scene: Scene
beforeAll(async () => {
  scene = await makeScene(on.registry)
})

async function chainOf(uid: string): Promise<StoredEvent[]> {
  const { db } = on.registry
  const rows = await db('entry_events as e').join('entries as n', 'n.id', 'e.entry_id').leftJoin('users as u', 'u.id', 'e.actor_user_id')
    .where('n.uid', uid).orderBy('e.seq').select('e.*', 'u.uid as actor_uid')
  const texts = await db('event_texts')
  return rows.map(row => ({
    entry: uid, seq: row.seq, at: isoTime(row.at), kind: row.kind, from: row.from_state, to: row.to_state, actor: row.actor_uid,
    args: JSON.parse(row.args), commitments: JSON.parse(row.commitments), prev: row.prev_hash, hash: row.hash, texts: texts.filter(text => text.event_id === row.id),
  }))
}

describe('the whole way', () => {
  test('from draft to the lists, each step an event in one whole chain', async () => {
    const uid = await scene.entry('accepted')
    const chain = await chainOf(uid)
    expect(chain.map(event => event.kind)).toEqual(['begin', 'ask_measurer', 'certify', 'submit', 'put_before_panel', 'accept'])
    expect(chainFaults(chain)).toEqual([])
  })

  test('an accepted entry stands in the lists with number, counts, facets and words', async () => {
    const { db } = on.registry
    const before = await db('list_counts').where({ district_id: 0, method: '' }).sum({ n: 'n' }).first() as { n: number }
    const uid = await scene.entry('accepted')
    const record = await db('records as r').join('entries as e', 'e.id', 'r.entry_id').where('e.uid', uid).first('r.*')
    expect(record).toMatchObject({ net16: 171 * 16 + 2, status: 'accepted', hunter_shown: scene.cast.entrant.name, taken_public: 'year', accepted_on: '2026-03-02' })
    const after = await db('list_counts').where({ district_id: 0, method: '' }).sum({ n: 'n' }).first() as { n: number }
    expect(Number(after.n)).toBe(Number(before.n) + 1)
    expect(await db('record_tokens').where({ record_id: record!.id }).pluck('token')).toContain(String(record!.record_no))
    expect(await db('facet_counts').where({ year: 2025, method: 'rifle' }).first()).toBeDefined()
  })

  test('record numbers follow each other and are never given twice', async () => {
    const { db } = on.registry
    await scene.entry('accepted')
    await scene.entry('accepted')
    const numbers = await db('records').orderBy('id').pluck('record_no') as number[]
    expect(new Set(numbers).size).toBe(numbers.length)
    expect(numbers.at(-1)! - numbers.at(-2)!).toBe(1)
  })

  test('each step tells whom it should and nobody of their own act, receipts apart', async () => {
    const { db } = on.registry
    const uid = await scene.entry('accepted')
    const told = await db('notices as n').join('entries as e', 'e.id', 'n.entry_id').where('e.uid', uid).orderBy('n.id').select('n.template', 'n.user_id')
    const { entrant, measurer, reviewer, reviewer2, judges } = scene.cast
    const to = (template: string) => told.filter(row => row.template === template).map(row => row.user_id)
    expect(to('ask_measurer_measurer')).toEqual([measurer.userId])
    expect(to('certify_entrant')).toEqual([entrant.userId])
    expect(to('submit_entrant')).toEqual([entrant.userId])
    expect(to('submit_office')).toEqual([reviewer.userId, reviewer2.userId])
    expect(to('put_before_panel_entrant')).toEqual([entrant.userId])
    expect(to('accept_entrant')).toEqual([entrant.userId])
    expect(to('accept_measurer')).toEqual([measurer.userId])
    expect(told.some(row => row.user_id === judges[0]!.userId && row.template.startsWith('submit'))).toBe(false)
  })

  test('the certified sheet is locked by the database itself', async () => {
    const { db } = on.registry
    const uid = await scene.entry('certified')
    const sheet = await db('sheets as s').join('entries as e', 'e.id', 's.entry_id').where({ 'e.uid': uid, 's.kind': 'entry' }).first('s.id', 's.state', 's.hash')
    expect(sheet).toMatchObject({ state: 'signed', hash: expect.stringMatching(/^[0-9a-f]{64}$/) as unknown })
    await expect(db('sheets').where({ id: sheet!.id }).update({ net: 1 })).rejects.toThrow(/signed_sheet_unchanged/)
    await expect(scene.measure(uid, DEER)).rejects.toThrow()
    await expect(scene.move(scene.cast.measurer, uid, { transition: 'certify', password: PASSWORD })).rejects.toMatchObject({ code: 'wrong_state' })
  })
})
