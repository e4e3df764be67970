import { createHash, randomUUID } from 'node:crypto'
import type { Knex } from 'knex'
import type { EntriesInsert, RecordsInsert, SheetsInsert, UsersInsert } from '../../db/tables'

export const NOW = '2026-03-02 10:00:00.000'
export const hash = (text: string) => createHash('sha256').update(text).digest('hex')
export const uid = () => randomUUID()

async function only(db: Knex, table: string, row: Record<string, unknown>): Promise<number> {
  const [id] = await db(table).insert(row)
  return id!
}

export const aUser = (db: Knex, row: Partial<UsersInsert> = {}) =>
  only(db, 'users', { uid: uid(), email: `${uid()}@people.example`, name: 'Wren Tarnley', created_at: NOW, ...row })

/** A species with one class, a district, a term and a workflow with the states that tests use. */
export async function aRegistry(db: Knex) {
  const tag = uid().slice(0, 8)
  const species = await only(db, 'species', { code: `species-${tag}`, scientific_name: 'Cervus testis', family: 'deer' })
  const category = await only(db, 'classes', {
    code: `class-${tag}`, species_id: species, definition: `class-${tag}@1`, step: '1/8', typicality: 'single',
  })
  const district = await only(db, 'districts', { code: `district-${tag}`, name: `District ${tag}` })
  const days = 1 + Number.parseInt(tag.slice(0, 4), 16)
  const term = await only(db, 'minimums_terms', { label: tag, from_on: new Date(days * 86_400_000).toISOString().slice(0, 10) })
  const workflow = await only(db, 'workflow_versions', { number: Number.parseInt(tag.slice(0, 7), 16), created_at: NOW })
  const turn = { draft: 'entrant', measuring: 'measurer', certified: 'entrant', in_review: 'reviewer', at_panel: 'panel', accepted: 'nobody', withdrawn: 'nobody' }
  await db('workflow_states').insert(Object.entries(turn).map(([code, whose]) => ({ version_id: workflow, code, turn: whose as 'entrant' })))
  return { species, category, district, term, workflow }
}
export type TestRegistry = Awaited<ReturnType<typeof aRegistry>>

export const anAnimal = (db: Knex, registry: TestRegistry) =>
  only(db, 'animals', { uid: uid(), species_id: registry.species, created_at: NOW })

export async function anEntry(db: Knex, registry: TestRegistry, row: Partial<EntriesInsert> = {}) {
  const animal = row.animal_id ?? await anAnimal(db, registry)
  const id = await only(db, 'entries', {
    uid: uid(), animal_id: animal, class_id: registry.category, origin: 'hunted', workflow_version_id: registry.workflow,
    state: 'draft', state_since: NOW, taken_last_on: '2026-03-02', begun_at: NOW, created_at: NOW, ...row,
  })
  return { id, animal: Number(animal) }
}

export const aSheet = (db: Knex, row: Partial<SheetsInsert>) =>
  only(db, 'sheets', { uid: uid(), kind: 'entry', definition: 'x@1', measurements: '{}', created_at: NOW, ...row })

export const SIGNED = {
  state: 'signed', signed_at: NOW, hash: hash('sheet'), measured_on: '2026-03-01', measurer_name: 'Abren Stonewick',
  gross: 1300, gross_all: 1320, net: 1290, net16: 2580, gross16: 2640,
} as const

/** An accepted record taken over without a sheet, with its entry and animal. */
export async function aRecord(db: Knex, registry: TestRegistry, row: Partial<RecordsInsert> = {}) {
  const entry = await anEntry(db, registry, { state: 'accepted', source: 'taken_over', net16: 2580, gross16: 2640 })
  const id = await only(db, 'records', {
    entry_id: entry.id, animal_id: entry.animal, record_no: Number.parseInt(uid().slice(0, 7), 16), class_id: registry.category,
    species_id: registry.species, district_id: registry.district, origin: 'hunted', net16: 2580, gross16: 2640,
    taken_first_on: '1951-01-01', taken_last_on: '1951-12-31', taken_precision: 'year', accepted_on: '2026-03-02', accepted_at: NOW,
    source: 'taken_over', ...row,
  })
  return { id, entry: entry.id, animal: entry.animal }
}

/** The name of the constraint that refused, or 'accepted'. */
export async function refusal(work: Promise<unknown>, refusedBy: (error: unknown) => string | undefined): Promise<string> {
  try {
    await work
    return 'accepted'
  }
  catch (error) {
    return refusedBy(error) ?? (error as Error).message
  }
}

/** The address of an open pool, for a second one with other time-outs. */
export async function whereIs(open: Knex) {
  const { connection } = (open.client as { config: { connection: { host: string, port: number, user: string, password: string } } }).config
  const [[row]] = await open.raw('SELECT DATABASE() AS name') as [{ name: string }[]]
  return { host: connection.host, port: connection.port, user: connection.user, password: connection.password, database: row!.name }
}
