import { afterEach, beforeAll, describe, expect, it } from 'vitest'
import type { Knex } from 'knex'
import { migrateUp } from '../../db/migrate'
import { seedDemo } from '../../seeds/demo'
import { seedReference } from '../../seeds/reference'
import { checkRegistry, type Finding } from '../../server/services/integrity/check'
import { useEmptyDatabase } from '../support/database'

const NOW = new Date('2026-11-30T12:00:00Z')
const own = useEmptyDatabase()
let db: Knex
beforeAll(async () => {
  db = own.db
  await migrateUp(db)
  await seedReference(db, NOW)
  await seedDemo(db, { now: NOW, scale: 0.02 })
  // Nothing but a hand in the database could do what is done below; the triggers would stop even that.
  for (const trigger of ['sheets_signed_unchanged', 'entry_events_no_update', 'entry_events_no_delete', 'event_texts_only_erased', 'ledger_no_delete']) {
    await db.raw(`DROP TRIGGER ${trigger}`)
  }
})

async function findings(fileSize: ((key: string) => Promise<number | null>) | null = null): Promise<Finding[]> {
  const all: Finding[] = []
  for await (const finding of checkRegistry(db, fileSize)) all.push(finding)
  return all
}
const codes = async () => (await findings()).map(finding => finding.code)

let mend: (() => Promise<unknown>) | undefined
afterEach(async () => {
  await mend?.()
  mend = undefined
  expect(await findings()).toEqual([])
})

/** Changes one row and remembers how to change it back. */
async function spoil<Row extends object>(table: string, where: Row, change: Record<string, unknown>): Promise<void> {
  const before = await db(table).where(where).first(Object.keys(change)) as Record<string, unknown>
  await db(table).where(where).update(change)
  mend = () => db(table).where({ ...where, ...Object.fromEntries(Object.keys(where).filter(key => key in change).map(key => [key, change[key]])) }).update(before)
}

describe('the integrity check', () => {
  it('finds nothing in a registry that is whole', async () => {
    expect(await findings()).toEqual([])
  })

  it('finds a net that is not the score of its sheet', async () => {
    const sheet = (await db('sheets').where({ state: 'signed' }).first('id', 'net'))!
    await spoil('sheets', { id: sheet.id }, { net: sheet.net! - 1 })
    expect(await codes()).toEqual(['sheet_score'])
  })

  it('finds measurements that were changed under their score', async () => {
    const sheet = (await db('sheets').where('definition', 'like', 'mule-deer%').first('id', 'measurements'))!
    const measurements = JSON.parse(sheet.measurements) as { right: { mainBeam: number } }
    measurements.right.mainBeam -= 16
    await spoil('sheets', { id: sheet.id }, { measurements: JSON.stringify(measurements) })
    expect(await codes()).toEqual(['sheet_score'])
  })

  it('finds a signed sheet that no longer says what was signed', async () => {
    const sheet = (await db('sheets').where({ state: 'signed' }).first('id'))!
    await spoil('sheets', { id: sheet.id }, { measured_on: '2001-01-01' })
    expect(await codes()).toEqual(['sheet_hash'])
  })

  it('finds a sheet that its definition cannot read, and one whose definition nobody knows', async () => {
    const sheet = (await db('sheets').where({ state: 'signed' }).first('id'))!
    await spoil('sheets', { id: sheet.id }, { measurements: '{"single":{}}' })
    expect(await codes()).toEqual(['sheet_unreadable'])
    await mend?.()
    await spoil('sheets', { id: sheet.id }, { definition: 'unicorn@1' })
    expect(await codes()).toEqual(['sheet_unreadable'])
  })

  it('finds a record whose net is not its entry’s', async () => {
    const record = (await db('records').first('id', 'net16', 'gross16'))!
    await spoil('records', { id: record.id }, { net16: record.net16 - 2 })
    expect(new Set(await codes())).toEqual(new Set(['record_figures', 'list_count', 'record_tokens']))
  })

  it('finds a record that stands otherwise than its entry', async () => {
    const record = (await db('records').first('id'))!
    await spoil('records', { id: record.id }, { status: 'challenged' })
    expect(await codes()).toEqual(['record_figures'])
  })

  it('finds a count that is off, one that is missing and one that is too many', async () => {
    const cell = (await db('list_counts').first())!
    const where = { class_id: cell.class_id, district_id: cell.district_id, method: cell.method, net16: cell.net16 }
    await spoil('list_counts', where, { n: cell.n + 1 })
    expect(await findings()).toEqual([{ code: 'list_count', where: Object.values(where).join('/'), detail: `kept ${cell.n + 1}, counted ${cell.n}` }])
    await mend?.()
    await db('list_counts').where(where).delete()
    mend = () => db('list_counts').insert(cell)
    expect(await codes()).toEqual(['list_count'])
    await mend()
    await db('list_counts').insert({ ...where, net16: 5, n: 1 })
    mend = () => db('list_counts').where({ ...where, net16: 5 }).delete()
    expect(await codes()).toEqual(['list_count'])
  })

  it('finds a facet that is off', async () => {
    const cell = (await db('facet_counts').first())!
    await spoil('facet_counts', { class_id: cell.class_id, district_id: cell.district_id, method: cell.method, year: cell.year }, { n: cell.n + 3 })
    expect(await codes()).toEqual(['facet_count'])
  })

  it('finds a token that is missing and one that does not belong', async () => {
    const token = (await db('record_tokens').first())!
    await db('record_tokens').where({ record_id: token.record_id, token: token.token }).delete()
    mend = () => db('record_tokens').insert(token)
    expect(await codes()).toEqual(['record_tokens'])
    await mend()
    await db('record_tokens').insert({ ...token, token: 'zzzz' })
    mend = () => db('record_tokens').where({ record_id: token.record_id, token: 'zzzz' }).delete()
    expect(await codes()).toEqual(['record_tokens'])
  })

  it('finds an event that was changed, one that was taken out, and a text that was replaced, but not one that was erased', async () => {
    const event = (await db('entry_events').where({ kind: 'submit' }).first())!
    await spoil('entry_events', { id: event.id }, { args: '{"term":999}' })
    expect(await codes()).toEqual(['event_chain'])
    await mend?.()
    await db('entry_events').where({ id: event.id }).delete()
    mend = () => db('entry_events').insert(event)
    expect(new Set(await codes())).toEqual(new Set(['event_chain']))
    await mend()
    const text = await db('event_texts').whereNotNull('body').first()
    expect(text).toBeDefined()
    if (text) {
      await spoil('event_texts', { event_id: text.event_id, field: text.field }, { body: 'something else' })
      expect(await codes()).toEqual(['event_chain'])
      await mend?.()
      await spoil('event_texts', { event_id: text.event_id, field: text.field }, { body: null })
      expect(await codes()).toEqual([])
    }
  })

  it('finds an entry whose state is not where its events led', async () => {
    const record = (await db('records').where({ source: 'taken_over' }).first('entry_id'))!
    await spoil('entries', { id: record.entry_id }, { state: 'withdrawn' })
    expect(new Set(await codes())).toEqual(new Set(['record_figures', 'event_state']))
  })

  it('finds a counter that would give a record number twice', async () => {
    await spoil('counters', { name: 'record_no' }, { value: 3 })
    expect(await codes()).toEqual(['record_number'])
  })

  it('finds a paid checkout without its charge', async () => {
    const charge = (await db('ledger').where({ kind: 'charge' }).first())!
    await db('ledger').where({ id: charge.id }).delete()
    mend = () => db('ledger').insert(charge)
    expect(await codes()).toEqual(['paid_without_charge'])
  })

  it('finds a file that is missing and one of another size', async () => {
    const row = { sha256: 'ab'.repeat(32), size: 10, mime: 'image/jpeg', storage_key: 'files/missing', created_at: '2026-01-01 00:00:00.000' }
    await db('files').insert(row)
    mend = () => db('files').where({ storage_key: row.storage_key }).delete()
    const told = async (size: number | null) =>
      (await findings(key => Promise.resolve(key === row.storage_key ? size : 1))).filter(finding => finding.where === row.storage_key).map(finding => finding.code)
    expect(await told(null)).toEqual(['file_missing'])
    expect(await told(11)).toEqual(['file_size'])
    expect(await told(10)).toEqual([])
  })
})
