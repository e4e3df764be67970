import { createHash } from 'node:crypto'
import { addDays, type Day } from '#shared/domain/dates'
import { NOTHING_MEASURED, type SheetDefinition } from '#shared/domain/measuring/index'
import type { CheckCode } from '#shared/domain/workflow/checks'
import type { Ground } from '#shared/domain/workflow/eligibility'
import { DEFAULT_LIMITS } from '#shared/domain/workflow/limits'
import { type DocumentKind, PAPERS } from '#shared/domain/workflow/origins'
import type { Vote } from '#shared/domain/workflow/panel'
import { isLive, type State } from '#shared/domain/workflow/states'
import { termOf } from '#shared/domain/workflow/transition'
import { sqlTime } from '../../db/time'
import type { Chains, DemoEvent } from './chain'
import type { DemoPerson } from './people'
import { addEntry, addPeople, addSheet, type Place, type ScoredSheet, SLIP_ANSWERS, type Subject } from './record-rows'
import { uidAt } from './random'
import type { Row } from './rows'
import { SOCIETY_SETTINGS } from './society'
import { feeOf, type Numbers, type WholeWay } from './whole-way'

/** What a story is told with. */
export interface Stage {
  readonly place: Place
  readonly numbers: Numbers
  readonly now: Date
  readonly statement: WholeWay['statement']
  readonly registrar: DemoPerson
  /** puts a paper of this kind into the storage and under the entry */
  readonly addPaper: (subject: Subject, kind: DocumentKind, at: Date, by: DemoPerson) => void
}

/** A sitting that is planned or open, and how many entries its docket has so far. */
export interface DemoSitting {
  readonly id: number
  readonly judges: readonly DemoPerson[]
  items: number
}

const DAY = 86_400_000

/** The days of an instant in the society's zone. */
const dayOf = (at: Date): Day => new Date(at.getTime() - 7 * 3600_000).toISOString().slice(0, 10)

/**
 * One entry that is still open, told step by step. Every step says how many days ago it was; steps go forward in time.
 * What the services would have written is written, down to the events and their chain.
 */
export class Story {
  readonly events: DemoEvent[] = []
  private state: State | null = null
  private patch: Row<'entries'> = {}
  private sheetId: number | null = null
  private begunAt: Date
  private docketItemId: number | null = null
  private docketItem: Row<'docket_items'> | null = null
  private readonly ballots: Row<'ballots'>[] = []

  constructor(readonly subject: Subject, private readonly stage: Stage, private readonly owner: DemoPerson | null, private readonly sheet: ScoredSheet, begunDaysAgo: number) {
    this.begunAt = this.at(begunDaysAgo)
  }

  private at(daysAgo: number): Date {
    return new Date(this.stage.now.getTime() - daysAgo * DAY - this.subject.random.whole(0, 3 * 3600) * 1000)
  }

  private move(kind: string, to: State, at: Date, by: DemoPerson | null, args?: DemoEvent['args'], texts?: DemoEvent['texts']): void {
    this.events.push({ kind, from: this.state, to, at, by, ...(args ? { args } : {}), ...(texts ? { texts } : {}) })
    if (this.state !== to) {
      this.patch.state_since = sqlTime(at)
      this.patch.due_on = termOf(to, dayOf(at), DEFAULT_LIMITS)
    }
    this.state = to
    this.patch.version = this.events.length
  }

  begin(): this {
    const { plan } = this.subject
    this.move('begin', 'draft', this.begunAt, this.owner, { category: plan.category, origin: plan.origin })
    return this
  }

  beginFor(by: DemoPerson): this {
    const { plan } = this.subject
    this.patch.begun_by_user_id = by.userId
    this.move('begin_for', 'draft', this.begunAt, by, { category: plan.category, origin: plan.origin })
    return this
  }

  askMeasurer(daysAgo: number, measurer: DemoPerson): this {
    this.patch.measurer_user_id = measurer.userId
    this.move('ask_measurer', 'measuring', this.at(daysAgo), this.owner, { measurer: measurer.uid })
    return this
  }

  /** The sheet on the bench: empty, or with what has been read so far. */
  openSheet(daysAgo: number, measurer: DemoPerson, read: 'nothing' | 'half' | 'all'): this {
    const at = this.at(daysAgo)
    const { definition, measurements } = this.sheet.sheet
    const half = { ...measurements, left: {}, lists: {} }
    this.stage.place.rows.add('sheets', {
      ...this.sheetRow(definition, at, measurer),
      measurements: JSON.stringify(read === 'nothing' ? NOTHING_MEASURED : read === 'half' ? half : measurements),
      dried_since: this.driedSince(),
      ...(read === 'all'
        ? {
            gross: this.sheet.score.gross, gross_all: this.sheet.score.grossAll, net: this.sheet.score.net,
            net16: this.sheet.net16, gross16: this.sheet.gross16, measured_on: dayOf(at), slip_answers: JSON.stringify(SLIP_ANSWERS),
          }
        : {}),
    })
    return this
  }

  private sheetRow(definition: SheetDefinition, at: Date, measurer: DemoPerson): Row<'sheets'> {
    return {
      id: this.stage.numbers.sheet(), uid: uidAt(at, this.subject.random), entry_id: this.subject.entryId, kind: 'entry', number: 1,
      definition: definition.id, measurements: '{}', gross: null, gross_all: null, net: null, net16: null, gross16: null, measured_on: null,
      measurer_user_id: measurer.userId, measurer_name: null, dried_since: null, state: 'open', signed_at: null, hash: null,
      slip_answers: '{}', created_at: sqlTime(at),
    }
  }

  private driedSince(): Day {
    const { plan } = this.subject
    return plan.taken.precision === 'day' ? plan.taken.first : addDays(plan.measuredOn, -75)
  }

  certify(daysAgo: number, measurer: DemoPerson): this {
    const at = this.at(daysAgo)
    this.sheetId = this.stage.numbers.sheet()
    addSheet(this.subject, this.stage.place, this.sheet, {
      id: this.sheetId, kind: 'entry', measuredOn: dayOf(at), driedSince: this.driedSince(), signedAt: at, measurer,
    })
    Object.assign(this.patch, {
      signed_sheet_id: this.sheetId, standing_sheet_id: this.sheetId, net16: this.sheet.net16, gross16: this.sheet.gross16, dried_since: this.driedSince(), dried_from: 'taken',
    })
    this.move('certify', 'certified', at, measurer, { net16: this.sheet.net16 })
    return this
  }

  papers(daysAgo: number, missing: readonly DocumentKind[] = []): this {
    for (const kind of PAPERS[this.subject.plan.origin]) {
      if (!missing.includes(kind)) this.stage.addPaper(this.subject, kind, this.at(daysAgo), this.owner ?? this.stage.registrar)
    }
    return this
  }

  sign(daysAgo: number): this {
    const { signer } = this.subject.cast
    const at = this.at(daysAgo)
    this.stage.place.rows.add('statements', {
      uid: uidAt(at, this.subject.random), entry_id: this.subject.entryId, text_version: this.stage.statement.version, locale: this.stage.statement.locale,
      part: signer.part, signer_name: signer.name, user_id: this.owner?.userId ?? null,
      body_hash: createHash('sha256').update(this.stage.statement.body).digest('hex'), signed_at: sqlTime(at),
    })
    return this
  }

  pay(daysAgo: number): this {
    const { random, entryId: entry_id, plan } = this.subject
    const at = this.at(daysAgo)
    const fee = feeOf(plan.category, dayOf(at))
    const { currency } = SOCIETY_SETTINGS
    const tag = uidAt(at, random)
    const checkout_id = this.stage.numbers.checkout()
    this.patch.fee_version = fee.version
    this.stage.place.rows.add('checkouts', {
      id: checkout_id, uid: uidAt(at, random), entry_id, user_id: this.owner!.userId, provider_id: `cs_demo_${tag}`, amount_minor: fee.amount, currency,
      fee_version: fee.version, state: 'paid', created_at: sqlTime(at), finished_at: sqlTime(new Date(at.getTime() + 70_000)),
    })
    this.stage.place.rows.add('ledger', {
      uid: uidAt(at, random), entry_id, kind: 'charge', amount_minor: fee.amount, currency, provider_id: `pi_demo_${tag}`, checkout_id,
      by_user_id: null, reason: null, at: sqlTime(new Date(at.getTime() + 70_000)),
    })
    return this
  }

  submit(daysAgo: number): this {
    const at = this.at(daysAgo)
    const term = this.stage.place.ids.terms.at(-1)!
    Object.assign(this.patch, { submitted_at: sqlTime(at), term_id: term.id })
    this.move('submit', 'in_review', at, this.owner, { term: term.id })
    return this
  }

  /** Papers, statement and fee in the days before it, then the submission. */
  sendIn(daysAgo: number): this {
    return this.papers(daysAgo + 2).sign(daysAgo + 1).pay(daysAgo + 1).submit(daysAgo)
  }

  check(daysAgo: number, reviewer: DemoPerson, codes: readonly CheckCode[]): this {
    for (const code of codes) {
      this.stage.place.rows.add('checks', { entry_id: this.subject.entryId, code, ticked_by: reviewer.userId, ticked_at: sqlTime(this.at(daysAgo)) })
    }
    return this
  }

  returnWith(daysAgo: number, reviewer: DemoPerson, requests: readonly { text: string, wants: readonly string[], answer?: string }[]): this {
    const at = this.at(daysAgo)
    this.patch.reviewer_user_id = reviewer.userId
    for (const request of requests) this.ask(request, at, reviewer)
    this.move('return', 'returned', at, reviewer, { requests: requests.length })
    return this
  }

  private ask(request: { text: string, wants: readonly string[], answer?: string }, at: Date, by: DemoPerson | null): void {
    const answeredAt = request.answer ? new Date(at.getTime() + 2 * DAY) : null
    this.stage.place.rows.add('requests', {
      uid: uidAt(at, this.subject.random), entry_id: this.subject.entryId, kind: 'paper', text: request.text, wants: JSON.stringify(request.wants),
      asked_by: by?.userId ?? null, asked_at: sqlTime(at), answered_at: answeredAt && sqlTime(answeredAt), answer_text: request.answer ?? null,
      answered_by: request.answer ? this.owner!.userId : null, closed_at: null,
    })
  }

  resubmit(daysAgo: number): this {
    this.move('resubmit', 'in_review', this.at(daysAgo), this.owner)
    return this
  }

  putBeforePanel(daysAgo: number, reviewer: DemoPerson, sitting: DemoSitting | null, second?: { readonly pair: readonly [DemoPerson, DemoPerson] | null }): this {
    const at = this.at(daysAgo)
    this.patch.reviewer_user_id = reviewer.userId
    this.docketItemId = this.stage.numbers.docketItem()
    this.docketItem = {
      id: this.docketItemId, uid: uidAt(at, this.subject.random), sitting_id: sitting?.id ?? null, entry_id: this.subject.entryId, kind: 'entry',
      position: sitting ? ++sitting.items : 0, second_measuring_due: second ? 1 : 0,
      judge_a: second?.pair?.[0].userId ?? null, judge_b: second?.pair?.[1].userId ?? null, state: 'open', outcome: null, ground: null, reason: null,
      created_at: sqlTime(at), decided_at: null, applied_at: null,
    }
    this.move('put_before_panel', 'at_panel', at, reviewer, { secondMeasuring: second !== undefined })
    return this
  }

  vote(daysAgo: number, judge: DemoPerson, vote: Vote, reason: string | null = null, requests: readonly string[] | null = null, ground: Ground | null = null): this {
    this.ballots.push({
      docket_item_id: this.docketItemId, judge_user_id: judge.userId, vote, ground, reason, requests: requests && JSON.stringify(requests),
      cast_at: sqlTime(this.at(daysAgo)),
    })
    return this
  }

  openFile(daysAgo: number, ...people: readonly DemoPerson[]): this {
    for (const person of people) {
      const at = sqlTime(this.at(daysAgo))
      this.stage.place.rows.add('file_openings', { entry_id: this.subject.entryId, user_id: person.userId, first_at: at, last_at: at })
    }
    return this
  }

  orderRemeasure(daysAgo: number, chair: DemoPerson, pair: readonly [DemoPerson, DemoPerson], day: Day): this {
    const at = this.at(daysAgo)
    this.patch.return_to = 'at_panel'
    this.stage.place.rows.add('remeasurings', {
      uid: uidAt(at, this.subject.random), entry_id: this.subject.entryId, docket_item_id: this.docketItemId, ordered_by: chair.userId, ordered_at: sqlTime(at),
      reason: 'Among the first of its class', place: 'Office of the society, Varrowmere', at: `${day} 17:00:00.000`, judge_a: pair[0].userId, judge_b: pair[1].userId, state: 'ordered',
    })
    this.move('order_remeasure', 'remeasuring', at, chair, { onDay: day }, { comment: 'Among the first of its class.' })
    return this
  }

  /** The panel's decision at a sitting that is closed. */
  decided(daysAgo: number, outcome: 'decline' | 'return', ground: Ground | null, reason: string, requests: readonly { text: string, wants: readonly string[] }[] = []): this {
    const at = this.at(daysAgo)
    Object.assign(this.docketItem!, { state: 'applied', outcome, ground, reason, decided_at: sqlTime(at), applied_at: sqlTime(at) })
    for (const request of requests) this.ask(request, at, null)
    const kind = outcome === 'decline' ? 'decline' : 'panel_return'
    this.move(kind, outcome === 'decline' ? 'declined' : 'returned', at, null, ground ? { ground } : { requests: requests.length }, { reason })
    return this
  }

  declineIneligible(daysAgo: number, reviewer: DemoPerson, ground: Ground, reason: string): this {
    this.patch.reviewer_user_id = reviewer.userId
    this.move('decline_ineligible', 'declined', this.at(daysAgo), reviewer, { ground }, { reason })
    return this
  }

  appeal(daysAgo: number, text: string): this {
    const at = this.at(daysAgo)
    this.patch.appealed_at = sqlTime(at)
    this.patch.reviewer_user_id = null
    this.move('appeal', 'in_review', at, this.owner, undefined, { text })
    return this
  }

  lapse(daysAgo: number): this {
    this.patch.return_to = this.state
    this.move('lapse', 'lapsed', this.at(daysAgo), null)
    return this
  }

  withdraw(daysAgo: number): this {
    this.move('withdraw', 'withdrawn', this.at(daysAgo), this.owner)
    return this
  }

  hold(daysAgo: number, by: DemoPerson, reason: string): this {
    const at = this.at(daysAgo)
    Object.assign(this.patch, { hold_at: sqlTime(at), hold_by: by.userId, hold_reason: reason })
    this.move('hold', this.state!, at, by, undefined, { comment: reason })
    return this
  }

  /** Lays down the rows; returns what the entry row can only say once its sheets are there. */
  finish(chains: Chains): { entryId: number, animalId: number, patch: Row<'entries'>, live: boolean } {
    const { subject, stage } = this
    const { signed_sheet_id, standing_sheet_id, ...early } = this.patch
    addEntry(subject, stage.place, this.begunAt, early)
    addPeople(subject, stage.place, this.begunAt)
    if (this.docketItem) stage.place.rows.add('docket_items', this.docketItem)
    for (const ballot of this.ballots) stage.place.rows.add('ballots', ballot)
    chains.add(stage.place.rows, { id: subject.entryId, uid: subject.entryUid }, this.events)
    const state = this.state!
    return {
      entryId: subject.entryId,
      animalId: subject.animalId,
      patch: { state, signed_sheet_id: signed_sheet_id ?? null, standing_sheet_id: standing_sheet_id ?? null },
      live: isLive(state),
    }
  }
}
