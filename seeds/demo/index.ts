import type { Knex } from 'knex'
import { hashPassword } from '../../server/services/people/passwords'
import { STATEMENT_TEXTS } from '../reference/statement-texts'
import { DEMO_PASSWORD } from './accounts'
import { writeHistory } from './history'
import { writeOpenEntries } from './open-entries'
import { PaperDesk, type PaperStore } from './paper-files'
import { People, seedStaff } from './people'
import { planRecords, type PlannedRecord } from './plan'
import { randomFor } from './random'
import { seedPastSittings } from './sittings'
import { seedSociety } from './society-data'

export interface DemoOptions {
  readonly now: Date
  /** share of the full number of records; 1 for the demo, little for tests */
  readonly scale?: number
  readonly progress?: (text: string) => void
  /** where papers are kept; without it entries have none */
  readonly files?: PaperStore
}

/** How far a database has got with the demo; `half` is one whose seeding was stopped and has to be made anew. */
export async function demoState(db: Knex): Promise<'none' | 'half' | 'whole'> {
  const row = await db('settings').where({ name: 'demoSeeded' }).first('value')
  if (!row) return await db('users').first('id') ? 'whole' : 'none'
  return row.value === 'true' ? 'whole' : 'half'
}

/** Day in the society's zone, which is seven hours behind or six. */
const dayOf = (at: Date) => new Date(at.getTime() - 7 * 3600_000).toISOString().slice(0, 10)

/**
 * Fills an empty, migrated and reference-seeded database with the invented society: the same society, people and records
 * for the same day, whatever the machine.
 */
export async function seedDemo(db: Knex, { now, scale = 1, progress = () => {}, files }: DemoOptions): Promise<void> {
  if (await db('users').first('id')) throw new Error('Demo data goes into an empty database only')
  const random = randomFor('ochre basin')
  const today = dayOf(now)
  await db('settings').insert({ name: 'demoSeeded', value: 'false' })

  progress('The society, its districts and its accounts')
  const ids = await seedSociety(db)
  const people = new People(random.fork('people'), ids)
  await people.begin(db)
  const password = await hashPassword(DEMO_PASSWORD)
  const staff = await seedStaff(db, people, ids, password, today, random.fork('staff'))
  const sittings = await seedPastSittings(db, staff, today, random.fork('sittings'))
  const { id: workflowVersion } = (await db('workflow_versions').orderBy('number', 'desc').first('id'))!

  progress('Measuring heads for the lists')
  const plans: { plan: PlannedRecord, turn: number }[] = []
  for (const plan of planRecords({ today, scale }, random.fork('records'))) plans.push({ plan, turn: random.fork(plan.label).next() })
  // By the day of acceptance; within one sitting the classes come as they lie in the pile.
  plans.sort((a, b) => (a.plan.acceptedOn === b.plan.acceptedOn ? a.turn - b.turn : a.plan.acceptedOn < b.plan.acceptedOn ? -1 : 1))

  const desk = files ? await PaperDesk.begin(db, files, now) : null
  await writeHistory(plans.map(({ plan }) => plan), {
    db, ids, staff, people, sittings, workflowVersion, statement: STATEMENT_TEXTS[0], random: random.fork('history'), desk,
    progress: (done, total) => progress(`Writing records: ${done} of ${total}`),
  })
  progress('Entries that are under way')
  const papers = await writeOpenEntries({
    db, ids, staff, people, past: sittings, workflowVersion, statement: STATEMENT_TEXTS[0], random: random.fork('open'), now, today,
  })
  progress('Drawing their papers')
  await desk?.deliver(db, papers, true)
  await countLists(db)
  // Ten thousand rows came at once; the optimizer should know before the first reader does.
  await db.raw('ANALYZE TABLE records, record_tokens, list_counts, facet_counts, entries, entry_people, entry_events, sheets, documents, users, ballots, docket_items')
  await db('settings').where({ name: 'demoSeeded' }).update({ value: 'true' })
}

/** The counts that ranks and facets are read from, made anew from the records. */
export async function countLists(db: Knex): Promise<void> {
  for (const [district, method, filter] of [
    ['0', '\'\'', ''], ['district_id', '\'\'', ''], ['0', 'method', 'AND method IS NOT NULL'], ['district_id', 'method', 'AND method IS NOT NULL'],
  ] as const) {
    await db.raw(`INSERT INTO list_counts (class_id, district_id, method, net16, n)
      SELECT class_id, ${district} AS district, ${method} AS one_method, net16, COUNT(*) FROM records
      WHERE status IN ('accepted', 'challenged') ${filter} GROUP BY class_id, district, one_method, net16`)
  }
  await db.raw(`INSERT INTO facet_counts (class_id, district_id, method, year, n)
    SELECT class_id, district_id, IFNULL(method, '') AS one_method, IF(taken_precision = 'unknown', 0, YEAR(taken_first_on)) AS one_year, COUNT(*)
    FROM records WHERE status IN ('accepted', 'challenged') GROUP BY class_id, district_id, one_method, one_year`)
  await db('counters').where({ name: 'lists_version' }).increment('value', 1)
}
