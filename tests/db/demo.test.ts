import { beforeAll, describe, expect, it } from 'vitest'
import type { Knex } from 'knex'
import { migrateUp } from '../../db/migrate'
import { CATEGORIES, checkMeasurements, definitionById, score, slips, STEPS_PER_INCH } from '../../shared/domain/measuring'
import { STATES } from '../../shared/domain/workflow/states'
import { demoState, seedDemo } from '../../seeds/demo'
import { DEMO_ACCOUNTS } from '../../seeds/demo/accounts'
import { randomFor } from '../../seeds/demo/random'
import { planRecords } from '../../seeds/demo/plan'
import { DISTRICTS, FIRST_YEAR, NEIGHBOURS, OFFERED } from '../../seeds/demo/society'
import { seedReference } from '../../seeds/reference'
import { passwordFits } from '../../server/services/people/passwords'
import { useEmptyDatabase } from '../support/database'

const NOW = new Date('2026-11-30T12:00:00Z')
const SCALE = 0.05
const own = useEmptyDatabase()
let db: Knex
beforeAll(async () => {
  db = own.db
  await migrateUp(db)
  await seedReference(db, NOW)
  await seedDemo(db, { now: NOW, scale: SCALE })
})

const plans = (label: string, scale: number) => [...planRecords({ today: '2026-11-30', scale }, randomFor(label))]

describe('the plan of the demo', () => {
  it('is the same for the same day, and another for another seed', () => {
    expect(plans('one', 0.01)).toEqual(plans('one', 0.01))
    expect(plans('one', 0.01)).not.toEqual(plans('two', 0.01))
  })

  it('has at least six thousand records over fourteen classes, fourteen districts and the years since 1931', () => {
    const all = plans('ochre basin/records', 1)
    expect(all.length).toBeGreaterThanOrEqual(6_000)
    expect(new Set(all.map(plan => plan.category)).size).toBe(14)
    expect(new Set(all.map(plan => plan.district)).size).toBe(14)
    const years = new Set(all.filter(plan => plan.taken.precision !== 'unknown').map(plan => Number(plan.taken.first.slice(0, 4))))
    for (let year = FIRST_YEAR; year <= 2025; year++) expect(years, String(year)).toContain(year)
    for (const origin of ['found', 'road_killed', 'agency', 'inherited']) expect(all.filter(plan => plan.origin === origin).length).toBeGreaterThan(20)
    expect(all.filter(plan => plan.way === 'taken_over_bare').length).toBeGreaterThan(100)
    expect(all.every(plan => plan.acceptedOn < '2026-11-30' && plan.measuredOn < plan.acceptedOn)).toBe(true)
  }, 60_000)
})

describe('the demo', () => {
  it('offers the fourteen classes of the society and no other', async () => {
    expect((await db('classes').where({ offered: 1 }).pluck('code')).sort()).toEqual(Object.keys(OFFERED).sort())
    expect(CATEGORIES).toEqual(expect.arrayContaining(Object.keys(OFFERED)))
  })

  it('has fourteen districts, each beside at least two others', async () => {
    expect(await db('districts').count({ n: '*' })).toEqual([{ n: 14 }])
    for (const { code } of DISTRICTS) expect(NEIGHBOURS.filter(pair => pair.includes(code)).length).toBeGreaterThan(1)
  })

  it('lets the accounts of the start sign in, and no invented person', async () => {
    for (const { mail, roles } of DEMO_ACCOUNTS) {
      const user = (await db('users').where({ email: `${mail}@ochrebasin.example` }).first('id', 'password_hash'))!
      const held = await db('user_roles').where({ user_id: user.id }).whereNull('to_at').pluck('role')
      expect(held.sort()).toEqual(['entrant', ...roles].sort())
    }
    const [entrant] = await db('users').where({ email: 'entrant@ochrebasin.example' }).pluck('password_hash')
    expect(await passwordFits(entrant!, 'ochre-basin-demo')).toBe(true)
    expect(await db('users').where('email', 'like', '%@people.%').whereNotNull('password_hash')).toHaveLength(0)
  })

  it('has no record under the minimum of the term it was submitted in', async () => {
    const under = await db('records as r').join('entries as e', 'e.id', 'r.entry_id').join('minimums as m', { 'm.term_id': 'e.term_id', 'm.class_id': 'r.class_id' })
      .whereRaw('r.net16 < m.min16').select('r.record_no')
    expect(under).toEqual([])
  })

  it('keeps the present minimums of the society', async () => {
    const minimums = await db('minimums as m').join('classes as c', 'c.id', 'm.class_id').join('minimums_terms as t', 't.id', 'm.term_id')
      .whereNull('t.to_on').select('c.code', 'm.min16') as { code: string, min16: number }[]
    expect(Object.fromEntries(minimums.map(row => [row.code, row.min16 / 16]))).toEqual({
      'mule-deer-typical': 158, 'mule-deer-nontypical': 181, 'whitetail-typical': 127, 'whitetail-nontypical': 149, 'elk-typical': 292,
      'elk-nontypical': 317, moose: 136, pronghorn: 71, 'bighorn-sheep': 152, 'mountain-goat': 43.5, bison: 97,
      'black-bear': 18 + 3 / 16, 'grizzly-bear': 20 + 13 / 16, cougar: 13 + 5 / 16,
    })
  })

  it('has sheets that are complete, score to their figures and have no slip that would bar them', async () => {
    const sheets = await db('sheets').where({ state: 'signed' }).select('definition', 'measurements', 'net', 'net16', 'measured_on', 'dried_since')
    expect(sheets.length).toBeGreaterThan(100)
    for (const sheet of sheets) {
      const definition = definitionById(sheet.definition)!
      const measurements = checkMeasurements(definition, JSON.parse(sheet.measurements))
      const result = score(definition, measurements)
      expect(result).toMatchObject({ net: sheet.net, complete: true })
      expect(sheet.net! * 16 / STEPS_PER_INCH[definition.step]).toBe(sheet.net16)
      expect(result.net).toBeLessThanOrEqual(result.grossAll)
      const certifying = sheet.dried_since ? { measuredOn: sheet.measured_on!, driedSince: sheet.dried_since, wholeSkull: true } : undefined
      expect(slips(definition, measurements, certifying).filter(slip => slip.severity === 'blocking')).toEqual([])
    }
  })

  it('has at least forty entries under way, in every state of the workflow, with work for every desk', async () => {
    const states = await db('entries').groupBy('state').select('state').count({ n: '*' }) as { state: string, n: number }[]
    expect(states.map(row => row.state).sort()).toEqual([...STATES].sort())
    expect(states.filter(row => row.state !== 'accepted').reduce((sum, row) => sum + row.n, 0)).toBeGreaterThanOrEqual(40)
    const [id] = await db('users').where({ email: 'entrant@ochrebasin.example' }).pluck('id')
    const own = await db('entries').where({ owner_user_id: id }).distinct().pluck('state')
    expect(own).toEqual(expect.arrayContaining(['draft', 'measuring', 'certified', 'in_review', 'returned', 'at_panel', 'declined', 'lapsed']))
    const [measurer] = await db('users').where({ email: 'measurer@ochrebasin.example' }).pluck('id')
    expect((await db('entries').where({ measurer_user_id: measurer, state: 'measuring' })).length).toBeGreaterThan(3)
    expect(await db('sittings').whereIn('state', ['open', 'planned']).pluck('state')).toHaveLength(2)
    expect((await db('requests').whereNull('closed_at').whereNull('answered_at')).length).toBeGreaterThan(3)
    expect((await db('ballots as b').join('docket_items as d', 'd.id', 'b.docket_item_id').where('d.state', 'open')).length).toBeGreaterThan(4)
    expect(await db('challenges').distinct().pluck('state')).toHaveLength(4)
  })

  it('knows that it is whole, and is never put into a database with people in it', async () => {
    expect(await demoState(db)).toBe('whole')
    await expect(seedDemo(db, { now: NOW })).rejects.toThrow('empty')
  })
})
