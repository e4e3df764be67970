import type { Knex } from 'knex'
import { addDays, type Day, parseInexactDate } from '#shared/domain/dates'
import { STEPS_PER_INCH } from '#shared/domain/measuring/index'
import { sqlTime } from '../../db/time'
import { insertMany, nextId } from '../bulk'
import { Chains } from './chain'
import { writeContested } from './contested'
import { growHead, type Head } from './heads'
import { type DemoPerson, measurerFor, type People, type Staff } from './people'
import type { PromisedPaper } from './paper-files'
import { castFor } from './persons'
import { latestDayInSeason, type PlannedRecord, scorerFor } from './plan'
import { type Random, uidAt } from './random'
import { scoredSheet, type Subject } from './record-rows'
import { Rows } from './rows'
import { type Players, type Scene, SCENES } from './scenes'
import type { PastSitting } from './sittings'
import { type DemoClass, OFFERED } from './society'
import type { SocietyIds } from './society-data'
import { type DemoSitting, type Stage, Story } from './story'
import type { WholeWay } from './whole-way'

export interface OpenFrame {
  readonly db: Knex
  readonly ids: SocietyIds
  readonly staff: Staff
  readonly people: People
  readonly past: ReadonlyMap<Day, PastSitting>
  readonly workflowVersion: number
  readonly statement: WholeWay['statement']
  readonly random: Random
  readonly now: Date
  readonly today: Day
}

const DAY = 86_400_000

/** Writes the entries that are under way. Returns the papers that they have. */
export async function writeOpenEntries(frame: OpenFrame): Promise<PromisedPaper[]> {
  const { db, random } = frame
  const papers: PromisedPaper[] = []
  const rows = new Rows()
  const next = { animal: await nextId(db, 'animals'), entry: await nextId(db, 'entries'), sheet: await nextId(db, 'sheets'), item: await nextId(db, 'docket_items'), checkout: await nextId(db, 'checkouts') }
  const { open, planned } = await seedComingSittings(frame)
  const stage: Stage = {
    place: { rows, ids: frame.ids, workflowVersion: frame.workflowVersion },
    numbers: { sheet: () => next.sheet++, docketItem: () => next.item++, checkout: () => next.checkout++ },
    now: frame.now,
    statement: frame.statement,
    registrar: frame.staff.registrar,
    addPaper: (subject, kind, at, by) => papers.push({ entryId: subject.entryId, category: subject.plan.category, kind, at, by: by.userId, random: subject.random.fork(`paper ${kind}`) }),
  }
  const closed = lastSitting(frame)
  const chains = await Chains.begin(db, random.fork('salts'))
  const finished = []
  for (const [turn, scene] of SCENES.entries()) {
    const story = await beginStory(scene, turn, frame, stage, next)
    scene.tell(story, playersFor(scene, frame, open, planned, closed))
    finished.push(story.finish(chains))
  }
  await frame.people.write(db, null)
  await rows.write(db)
  for (const { entryId, animalId, patch, live } of finished) {
    await db('entries').where({ id: entryId }).update(patch as object)
    if (live) await db('animals').where({ id: animalId }).update({ live_entry_id: entryId })
  }
  await writeContested(frame, planned)
  return papers
}

function lastSitting({ past, now }: OpenFrame): Players['closed'] {
  const sitting = [...past.values()].at(-1)!
  return { ...sitting, items: sitting.items, daysAgo: Math.max(1, Math.round((now.getTime() - Date.parse(`${sitting.day}T21:00:00Z`)) / DAY)) }
}

function playersFor(scene: Scene, { staff, random, today, now }: OpenFrame, open: DemoSitting, planned: DemoSitting, closed: Players['closed']): Players {
  const measurer = staff.measurers[0]!
  const others: Staff = { ...staff, measurers: staff.measurers.slice(1) }
  return {
    measurer,
    near: measurerFor(others, scene.district, addDays(today, -30), random.fork(`measurer ${scene.category} ${scene.begun}`)),
    shop: staff.byMail.shop!,
    reviewer: staff.reviewers[0]!,
    reviewer2: staff.reviewers[1]!,
    judges: staff.judges,
    registrar: staff.registrar,
    open,
    planned,
    closed,
    inDays: days => addDays(new Date(now.getTime() - 7 * 3600_000).toISOString().slice(0, 10), days),
  }
}

/** The sitting of today, which is open, and the next one. */
async function seedComingSittings({ db, staff, now, today, random }: OpenFrame): Promise<{ open: DemoSitting, planned: DemoSitting }> {
  const first = await nextId(db, 'sittings')
  const made = sqlTime(new Date(now.getTime() - 30 * DAY))
  const sittings = [
    { id: first, day: today, chair: staff.judges[0]!, judges: staff.judges.slice(0, 5), state: 'open' as const },
    { id: first + 1, day: addDays(today, 18), chair: staff.judges[1]!, judges: staff.judges, state: 'planned' as const },
  ]
  await insertMany(db, 'sittings', sittings.map(({ id, day, chair, state }) => ({
    id, uid: uidAt(now, random), held_on: day, place: 'Office of the society, Varrowmere', chair_user_id: chair.userId, state,
    created_at: made, opened_at: state === 'open' ? sqlTime(new Date(now.getTime() - 2 * 3600_000)) : null,
  })))
  await insertMany(db, 'sitting_judges', sittings.flatMap(({ id, judges, state }) => judges.map(judge => ({
    sitting_id: id, user_id: judge.userId, invited_at: made, present: state === 'open' ? 1 : 0,
  }))))
  const [open, planned] = sittings.map(({ id, judges }): DemoSitting => ({ id, judges, items: 0 }))
  return { open: open!, planned: planned! }
}

async function beginStory(scene: Scene, turn: number, frame: OpenFrame, stage: Stage, next: { animal: number, entry: number }): Promise<Story> {
  const random = frame.random.fork(`scene ${turn}`)
  const { definition, netOf } = scorerFor(scene.category)
  const target16 = scene.over === 'top'
    ? await topNet16(frame, scene.category)
    : OFFERED[scene.category].min16 * (1 + (scene.over ?? 0.01 + 0.04 * random.exponential()))
  const head = scene.twice ? await headOfRecord(frame, scene.category) : growHead(scene.category, Math.ceil(target16 * STEPS_PER_INCH[definition.step] / 16), random.fork('head'), netOf)
  const hunted = (scene.origin ?? 'hunted') === 'hunted'
  const takenOn = hunted ? latestDayInSeason(definition.species, addDays(frame.today, -scene.taken), random) : addDays(frame.today, -scene.taken)
  const plan: PlannedRecord = {
    label: `scene ${turn}`, category: scene.category, way: 'certified', district: scene.district, origin: scene.origin ?? 'hunted', originalOrigin: null,
    method: hunted ? random.weighted({ rifle: 60, compound_bow: 25, muzzleloader: 10, crossbow: 5 }) : null, sex: 'male',
    taken: parseInexactDate(takenOn)!, measuredOn: addDays(frame.today, -scene.begun), submittedOn: frame.today, acceptedOn: frame.today, head, bare: scene.bare ?? false,
  }
  const begunAt = new Date(frame.now.getTime() - scene.begun * DAY)
  const owner = ownerOf(scene, frame, begunAt)
  const holder = owner ?? frame.people.add(scene.district, begunAt)
  const entryId = next.entry++
  const subject: Subject = {
    plan, animalId: next.animal++, entryId, entryUid: uidAt(begunAt, random), recordId: 0, recordNo: 0,
    cast: { ...castFor(plan, holder, random), owner }, monthPublic: random.chance(0.3), random,
  }
  return new Story(subject, stage, owner, scoredSheet(definition, head), scene.begun)
}

function ownerOf(scene: Scene, { staff, people }: OpenFrame, at: Date): DemoPerson | null {
  switch (scene.owner) {
    case 'entrant': return staff.byMail.entrant!
    case 'other': return people.add(scene.district, at)
    case 'nobody': return null
  }
}

/** The head of a record of the class that stands in the lists already, as it was measured. */
async function headOfRecord({ db, ids }: OpenFrame, category: string): Promise<Head> {
  const sheet = await db('records as r').join('sheets as s', 's.id', 'r.sheet_id').where({ 'r.class_id': ids.category.get(category)!.id })
    .where('r.net16', '>=', OFFERED[category as DemoClass].min16).orderBy('r.record_no', 'desc').first('s.measurements') as { measurements: string }
  return JSON.parse(sheet.measurements) as Head
}

/** A net that would be among the first five of its class, but for the best. */
async function topNet16({ db, ids }: OpenFrame, category: string): Promise<number> {
  const nets: number[] = await db('records').where({ class_id: ids.category.get(category)!.id }).orderBy('net16', 'desc').limit(3).pluck('net16')
  return (nets.at(-1) ?? OFFERED[category as DemoClass].min16) + 4
}
