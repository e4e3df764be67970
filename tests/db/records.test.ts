import type { Knex } from 'knex'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { createRegistry, type Registry } from '../../server/composition'
import { readConfig } from '../../server/config'
import { listsVersion } from '../../server/read-models/records/names'
import { listRecords } from '../../server/services/records/listRecords'
import { RECORD_SORTS, recordsQuery, type RecordSort } from '../../shared/schemas/records'
import { countLists } from '../../seeds/demo'
import { useDatabase } from '../support/database'
import { aRegistry, NOW, type TestRegistry } from './fixtures'

const test = useDatabase()
/** Records of the one class, nearly all of them at three nets. */
const MANY = 6_000
const SORTS = RECORD_SORTS.flatMap(sort => [sort, `-${sort}`] as const)
let db: Knex
let registry: Registry
let kept: TestRegistry
let category: string

beforeAll(async () => {
  kept = await aRegistry(test.db)
  const { code } = (await test.db('classes').where({ id: kept.category }).first('code'))!
  category = code
  const other = await aRegistry(test.db)
  await fill(test.db, kept, MANY)
  await fill(test.db, { ...kept, category: other.category, species: other.species }, 500)
  await countLists(test.db)
  // Handler counters belong to a connection.
  registry = createRegistry(readConfig({ DATABASE_URL: test.url, HARTROLL_SECRET: 'a secret of the tests alone, long enough', HARTROLL_PUBLIC_URL: 'http://registry.example' }), { poolSize: 1 })
  db = registry.db
})
afterAll(() => registry.close())

/** Accepted records without a sheet, made by the server itself: three nets, two days of taking a net, names by the hundred. */
async function fill(on: Knex, { category, species, district, workflow }: TestRegistry, count: number) {
  const [{ first }] = await on('animals').select(on.raw('COALESCE(MAX(id), 0) AS first')) as unknown as [{ first: number }]
  await on.raw(`INSERT INTO animals (id, uid, species_id, created_at) SELECT seq + ?, UUID(), ?, ? FROM seq_1_to_${count}`, [first, species, NOW])
  await on.raw(`INSERT INTO entries (id, uid, animal_id, class_id, origin, source, workflow_version_id, state, state_since, taken_last_on, begun_at, created_at, net16, gross16, district_id)
    SELECT seq + ?, UUID(), seq + ?, ?, 'hunted', 'taken_over', ?, 'accepted', ?, '2020-01-02', ?, ?, 2400 + seq % 3 * 16, 2600, ? FROM seq_1_to_${count}`, [first, first, category, workflow, NOW, NOW, NOW, district])
  await on.raw(`INSERT INTO records (id, entry_id, animal_id, record_no, class_id, species_id, district_id, method, origin, net16, gross16, taken_first_on, taken_last_on, taken_precision,
      hunter_shown, hunter_sort, accepted_on, accepted_at, source)
    SELECT seq + ?, seq + ?, seq + ?, seq + ?, ?, ?, ?, 'rifle', 'hunted', 2400 + seq % 3 * 16, 2600 + seq % 5 * 2, '2020-01-01' + INTERVAL seq % 2 DAY, '2020-01-02', 'day',
      CONCAT('Wren ', seq % 60), CONCAT(seq % 60, ', Wren'), '2026-03-02' - INTERVAL seq % 7 DAY, ?, 'taken_over' FROM seq_1_to_${count}`,
  [first, first, first, first, category, species, district, NOW])
  await on.raw('INSERT INTO record_tokens (token, class_id, net16, record_id) SELECT \'wren\', class_id, net16, id FROM records WHERE class_id = ?', [category])
}

const list = async (query: Record<string, unknown>) => listRecords(registry, recordsQuery.parse(query), 'en', await listsVersion(db))

async function rowsRead(): Promise<number> {
  const [rows] = await db.raw('SHOW SESSION STATUS LIKE \'Handler_read%\'') as [{ Value: string }[]]
  return rows.reduce((sum, { Value }) => sum + Number(Value), 0)
}

/** Rows that a piece of work reads, less what the looking itself reads, and how many statements it sends. */
async function costOf(work: () => Promise<unknown>): Promise<{ rows: number, statements: number }> {
  const [first, second] = [await rowsRead(), await rowsRead()]
  let statements = 0
  const count = () => { statements++ }
  db.on('query', count)
  await work()
  db.removeListener('query', count)
  return { rows: await rowsRead() - second - (second - first), statements }
}

describe('a page of a list', () => {
  beforeAll(() => list({ category }))

  for (const limit of [1, 100]) {
    it(`of ${limit} by net reads at most three times the rows it returns, at the beginning and in the middle of thousands of ties, both ways`, async () => {
      const begin = await list({ category, limit })
      expect(begin.items).toHaveLength(limit)
      // Into the middle: behind two pages of 200 within the first tie of two thousand.
      const deep = await list({ category, limit: 200, cursor: (await list({ category, limit: 200 })).nextCursor! })
      const allowed = 3 * limit
      const first = await costOf(() => list({ category, limit }))
      expect(first.rows).toBeGreaterThanOrEqual(limit)
      expect(first.rows).toBeLessThanOrEqual(allowed)
      for (const cursor of [deep.nextCursor!, deep.prevCursor!]) {
        const cost = await costOf(async () => expect((await list({ category, limit, cursor })).items).toHaveLength(limit))
        expect(cost.rows).toBeLessThanOrEqual(allowed)
      }
    })
  }

  it('takes as many statements for a hundred rows as for one', async () => {
    const one = await costOf(() => list({ category, limit: 1 }))
    const hundred = await costOf(() => list({ category, limit: 100 }))
    expect(hundred.statements).toBe(one.statements)
    expect(one.statements).toBeLessThanOrEqual(2)
  })

  for (const sort of SORTS) {
    for (const scope of ['class', 'species', 'all'] as const) {
      it(`sorted by ${sort} within ${scope} reads no more than a few times what it returns`, async () => {
        const filters = scope === 'class' ? { category } : scope === 'species' ? { species: category.replace('class', 'species') } : {}
        const { nextCursor } = await list({ ...filters, sort, limit: 50 })
        const cost = await costOf(() => list({ ...filters, sort, limit: 50, cursor: nextCursor! }))
        // A page over two thousand equal values of the first column reads the tie by the columns behind it.
        expect(cost.rows).toBeLessThanOrEqual(scope === 'species' && sort.endsWith('district') ? 12 * 50 : 4 * 50)
      })
    }
  }
})

describe('paging', () => {
  const through = async (filters: Record<string, unknown>, sort: RecordSort, limit: number) => {
    const forth: number[] = []
    const back: number[] = []
    let page = await list({ ...filters, sort, limit })
    for (;;) {
      forth.push(...page.items.map(item => item.recordNo))
      if (!page.nextCursor) break
      page = await list({ ...filters, sort, limit, cursor: page.nextCursor })
    }
    for (;;) {
      back.unshift(...page.items.map(item => item.recordNo))
      if (!page.prevCursor) break
      page = await list({ ...filters, sort, limit, cursor: page.prevCursor })
    }
    return { forth, back }
  }

  for (const sort of SORTS) {
    it(`by ${sort} visits every record exactly once, forward and back, under thousands of ties`, async () => {
      const { forth, back } = await through({ category }, sort, 200)
      expect(new Set(forth).size).toBe(MANY)
      expect(forth).toHaveLength(MANY)
      // Going back, the first page is filled up again, so that it may overlap the second.
      expect(new Set(back).size).toBe(MANY)
      expect(back.slice(-5_800)).toEqual(forth.slice(-5_800))
    })
  }

  it('gives equal nets one rank and skips the next', async () => {
    const { items } = await list({ category, limit: 200 })
    expect(new Set(items.map(item => item.rank))).toEqual(new Set([1]))
    const last = await list({ category, sort: 'net', limit: 1 })
    expect(last.items[0]!.rank).toBe(4_001)
  })

  it('counts the place under filters that a list has no rank for, page by page', async () => {
    const first = await list({ category, minNet: '151', limit: 10 })
    const second = await list({ category, minNet: '151', limit: 10, cursor: first.nextCursor! })
    expect(second.items.map(item => item.position)).toEqual([11, 12, 13, 14, 15, 16, 17, 18, 19, 20])
    expect(first.total).toBe(4_000)
  })

  it('does not let the day of taking be found out by an order', async () => {
    const { items } = await list({ category, sort: 'takenOn', limit: 50 })
    expect(items.map(item => item.recordNo)).toEqual(items.map(item => item.recordNo).toSorted((a, b) => a - b))
  })

  it('says "at least" where counting would read too much, and exactly below that', async () => {
    expect(await list({ q: 'wren', limit: 1 })).toMatchObject({ total: MANY + 500 })
  })
})
