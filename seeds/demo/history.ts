import type { Knex } from 'knex'
import { addDays, type Day } from '#shared/domain/dates'
import { checksFor } from '#shared/domain/workflow/checks'
import { PAPERS } from '#shared/domain/workflow/origins'
import { isSecondMeasuringDue } from '#shared/domain/workflow/remeasuring'
import { DEFAULT_LIMITS } from '#shared/domain/workflow/limits'
import { nextId } from '../bulk'
import { Chains } from './chain'
import { measuredAgain } from './heads'
import { type DemoPerson, formerMeasurers, measurerFor, type People, type Staff } from './people'
import type { PaperDesk, PromisedPaper } from './paper-files'
import { castFor, ownerFor } from './persons'
import { type PlannedRecord, type Scorer, scorerFor } from './plan'
import { type Random, uidAt } from './random'
import { isOnTheLine, type Place, scoredSheet, type Subject } from './record-rows'
import { Rows } from './rows'
import type { PastSitting } from './sittings'
import { minimum16, type SocietyIds } from './society-data'
import { addTakenOver, TAKEN_OVER_AT } from './taken-over'
import { timelineOf } from './timeline'
import { addWholeWay, type Numbers, type WholeWay } from './whole-way'

/** Records that are written together. */
const AT_ONCE = 400

export interface HistoryFrame {
  readonly db: Knex
  readonly ids: SocietyIds
  readonly staff: Staff
  readonly people: People
  readonly sittings: ReadonlyMap<Day, PastSitting>
  readonly workflowVersion: number
  readonly statement: WholeWay['statement']
  readonly random: Random
  /** where papers are drawn and kept; without one there are none */
  readonly desk: PaperDesk | null
  readonly progress: (done: number, total: number) => void
}

/** Writes every planned record with all that lies under it. The plans have to be in the order of their acceptance. */
export async function writeHistory(plans: readonly PlannedRecord[], frame: HistoryFrame): Promise<void> {
  const writer = await HistoryWriter.begin(frame)
  for (let from = 0; from < plans.length; from += AT_ONCE) {
    const some = plans.slice(from, from + AT_ONCE)
    for (const plan of some) writer.add(plan)
    await writer.write()
    frame.progress(from + some.length, plans.length)
  }
  await frame.db('counters').where({ name: 'record_no' }).update({ value: plans.length })
}

/** Nets that stand in the lists of a class on a day, for saying what place a new one would take. */
class Standing {
  private readonly nets = new Map<string, number[]>()
  private coming: { category: string, net16: number, acceptedOn: Day }[] = []

  placeOn(category: string, day: Day, net16: number) {
    // Everything that one sitting accepts is measured against the lists before it.
    if (this.coming.some(one => one.acceptedOn < day)) {
      for (const one of this.coming) {
        const nets = this.nets.get(one.category)
        if (nets) nets.push(one.net16)
        else this.nets.set(one.category, [one.net16])
      }
      this.coming = []
    }
    const nets = this.nets.get(category) ?? []
    return { total: nets.length, higher: nets.filter(net => net > net16).length, equal: nets.filter(net => net === net16).length }
  }

  add(category: string, net16: number, acceptedOn: Day): void {
    this.coming.push({ category, net16, acceptedOn })
  }
}

class HistoryWriter {
  private readonly standing = new Standing()
  private readonly owners: DemoPerson[] = []
  private readonly former: { name: string, from: number, to: number }[]
  private readonly place: Place
  private readonly numbers: Numbers
  private written: number[] = []
  private papers: PromisedPaper[] = []
  private taken = 0
  private entrantsRecords = 0

  private constructor(
    private readonly frame: HistoryFrame, private readonly chains: Chains,
    private readonly next: { animal: number, entry: number, record: number, sheet: number, docketItem: number, checkout: number },
  ) {
    this.former = formerMeasurers(frame.random.fork('former measurers'))
    this.place = { rows: new Rows(), ids: frame.ids, workflowVersion: frame.workflowVersion }
    this.numbers = { sheet: () => next.sheet++, docketItem: () => next.docketItem++, checkout: () => next.checkout++ }
  }

  static async begin(frame: HistoryFrame): Promise<HistoryWriter> {
    const { db } = frame
    return new HistoryWriter(frame, await Chains.begin(db, frame.random.fork('salts')), {
      animal: await nextId(db, 'animals'), entry: await nextId(db, 'entries'), record: await nextId(db, 'records'),
      sheet: await nextId(db, 'sheets'), docketItem: await nextId(db, 'docket_items'), checkout: await nextId(db, 'checkouts'),
    })
  }

  add(plan: PlannedRecord): void {
    const random = this.frame.random.fork(`${plan.label}/people`)
    const scorer = scorerFor(plan.category)
    if (plan.way === 'certified') this.addCertified(plan, scorer, random)
    else this.addTakenOver(plan, scorer, random)
  }

  private subject(plan: PlannedRecord, owner: DemoPerson | null, begunAt: Date, random: Random): Subject {
    const entryId = this.next.entry++
    this.written.push(entryId)
    return {
      plan,
      animalId: this.next.animal++,
      entryId,
      entryUid: uidAt(begunAt, random),
      recordId: this.next.record++,
      recordNo: ++this.taken,
      cast: castFor(plan, owner, random),
      monthPublic: random.chance(0.3) && ['day', 'month'].includes(plan.taken.precision),
      random,
    }
  }

  private addTakenOver(plan: PlannedRecord, { definition }: Scorer, random: Random): void {
    const subject = this.subject(plan, null, TAKEN_OVER_AT, random)
    const sheet = scoredSheet(definition, plan.head)
    this.standing.add(plan.category, sheet.net16, plan.acceptedOn)
    const year = Number(plan.measuredOn.slice(0, 4))
    const fit = this.former.filter(one => one.from <= year && year <= one.to)
    addTakenOver({
      subject,
      sheet,
      measurerName: random.pick(fit.length > 0 ? fit : this.former).name,
      sheetId: plan.way === 'taken_over' ? this.numbers.sheet() : null,
      formerNo: `${plan.acceptedOn.slice(0, 4)}/${String(subject.recordNo).padStart(4, '0')}`,
      registrar: this.frame.staff.registrar,
    }, this.place, this.chains)
  }

  private addCertified(plan: PlannedRecord, scorer: Scorer, random: Random): void {
    const { frame } = this
    const sheet = scoredSheet(scorer.definition, plan.head)
    const second = isSecondMeasuringDue(this.standing.placeOn(plan.category, plan.acceptedOn, sheet.net16), DEFAULT_LIMITS)
    const timeline = timelineOf(plan, second, random)
    const term = frame.ids.terms.findLast(one => one.from <= plan.submittedOn)!
    const least = minimum16(plan.category, term.share, scorer.definition.step)
    const panel = second ? this.panelSheets(plan, scorer, least, random) : null
    this.standing.add(plan.category, (panel?.joint ?? sheet).net16, plan.acceptedOn)
    const subject = this.subject(plan, this.ownerOf(plan, random), timeline.begunAt, random)
    addWholeWay({
      subject,
      timeline,
      measurer: measurerFor(frame.staff, plan.district, plan.measuredOn, random),
      reviewer: random.pick(frame.staff.reviewers),
      registrar: frame.staff.registrar,
      sitting: frame.sittings.get(plan.acceptedOn)!,
      sheet,
      panel,
      termId: term.id,
      statement: frame.statement,
      checks: checksFor(plan.origin, isOnTheLine(plan)),
    }, this.place, this.chains, this.numbers)
    this.promisePapers(subject, timeline.submittedAt)
  }

  /** The papers that the origin asks for, as they came in with the submission. */
  private promisePapers({ plan, entryId, cast, random }: Subject, at: Date): void {
    for (const kind of PAPERS[plan.origin]) {
      this.papers.push({ entryId, category: plan.category, kind, at, by: cast.owner!.userId, random: random.fork(kind) })
    }
  }

  /** Two blind sheets and the one that both signed; it stays over the minimum, since these are accepted. */
  private panelSheets(plan: PlannedRecord, { definition }: Scorer, least16: number, random: Random) {
    const again = () => scoredSheet(definition, measuredAgain(plan.head, random))
    const [a, b] = [again(), again()]
    const joint = [a, b].find(sheet => sheet.net16 >= least16) ?? scoredSheet(definition, plan.head)
    return { a, b, joint }
  }

  private ownerOf(plan: PlannedRecord, random: Random): DemoPerson {
    if (plan.origin === 'hunted' && plan.acceptedOn > '2018' && this.entrantsRecords < 4 && random.chance(0.015)) {
      this.entrantsRecords++
      return this.frame.staff.byMail.entrant!
    }
    return ownerFor(plan, this.owners, this.frame.people, new Date(`${addDays(plan.measuredOn, -45)}T18:00:00Z`), random)
  }

  /** Writes what was added: people, rows, and what could not be said before the sheets were there. */
  async write(): Promise<void> {
    const { db, people } = this.frame
    await people.write(db, null)
    await this.place.rows.write(db)
    const range = [this.written[0]!, this.written.at(-1)!]
    await db.raw(`UPDATE entries e JOIN records r ON r.entry_id = e.id
      LEFT JOIN sheets s ON s.entry_id = e.id AND s.kind = 'entry' AND s.state = 'signed'
      SET e.state = 'accepted', e.signed_sheet_id = s.id, e.standing_sheet_id = r.sheet_id
      WHERE e.id BETWEEN ? AND ?`, range)
    await db.raw('UPDATE animals a JOIN entries e ON e.animal_id = a.id SET a.live_entry_id = e.id WHERE e.id BETWEEN ? AND ?', range)
    await this.frame.desk?.deliver(db, this.papers, false)
    this.written = []
    this.papers = []
  }
}
