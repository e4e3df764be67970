import type { Knex } from 'knex'
import { addDays } from '#shared/domain/dates'
import type { Ground } from '#shared/domain/workflow/eligibility'
import { DEFAULT_LIMITS } from '#shared/domain/workflow/limits'
import { sqlTime } from '../../db/time'
import { nextId } from '../bulk'
import { Chains, type DemoEvent } from './chain'
import type { OpenFrame } from './open-entries'
import type { DemoPerson } from './people'
import { uidAt } from './random'
import { Rows } from './rows'
import type { DemoSitting } from './story'

const DAY = 86_400_000

const CONTESTED = 7

interface Contested {
  readonly id: number
  readonly entry_id: number
  readonly animal_id: number
  readonly uid: string
  readonly owner_user_id: number
}

const DOUBTS = [
  'The antlers on the photographs of the entry are not those that hung in my brother\'s barn until last winter, where the left brow tine was whole.',
  'The day on the tag was a day on which the district was closed.',
  'The same head stands in the lists of a neighbouring region under another name.',
  'I saw the animal killed beside the road; it was not hunted.',
  'The right horn was mended before it was measured.',
  'The net seems too high for the photographs.',
] as const

/** Records that somebody doubts: reported, checked, under challenge, struck, struck and appealed. */
export async function writeContested(frame: OpenFrame, planned: DemoSitting): Promise<void> {
  const { db, random } = frame
  const all: (Contested & { accepted_on: string })[] = await db('records as r').join('entries as e', 'e.id', 'r.entry_id')
    .where({ 'r.source': 'certified', 'r.origin': 'hunted' }).where('r.accepted_on', '<', addDays(frame.today, -200))
    .whereNot('e.owner_user_id', frame.staff.byMail.entrant!.userId).orderBy('r.record_no', 'desc').limit(160)
    .select('r.id', 'r.entry_id', 'r.animal_id', 'r.accepted_on', 'e.uid', 'e.owner_user_id')
  // Whoever voted for a record is barred from what is said against it: the chair of the next sitting must not be among them.
  const chair = frame.staff.judges[1]!
  const records = all.filter(record => !frame.past.get(record.accepted_on)!.judges.includes(chair))
  if (records.length < CONTESTED) return
  const picked = Array.from({ length: CONTESTED }, (_, place) => records[Math.floor((place + 0.5) * records.length / CONTESTED)]!)
  const chains = await Chains.begin(db, random.fork('contested'))
  const writer = new ContestWriter(frame, planned, chains, await nextId(db, 'docket_items'))
  const [reported, reportedToo, checked, challenged, answered, struck, appealed] = picked as readonly Contested[] as readonly [Contested, Contested, Contested, Contested, Contested, Contested, Contested]
  writer.report(reported, 3, 'reported')
  writer.report(reportedToo, 12, 'reported')
  writer.report(checked, 20, 'checked')
  await writer.challenge(challenged, 9, false)
  await writer.challenge(answered, 36, true)
  await writer.strike(struck, 'altered_parts', 'The right horn was mended with filler before it was measured.')
  await writer.strike(appealed, 'false_statement', 'The animal was killed by a car, as two witnesses say.', 'I hunted this animal. The witnesses speak of another day; the tag was punched two days before it.')
  await frame.people.write(db, null)
  await writer.rows.write(db)
  for (const work of writer.afterwards) await work(db)
}

class ContestWriter {
  readonly rows = new Rows()
  readonly afterwards: ((db: Knex) => Promise<unknown>)[] = []
  private turn = 0

  constructor(private readonly frame: OpenFrame, private readonly planned: DemoSitting, private readonly chains: Chains, private nextItem: number) {}

  private ago(days: number): Date {
    return new Date(this.frame.now.getTime() - days * DAY)
  }

  private reporter(): DemoPerson {
    return this.frame.people.add('hollowmarch', this.ago(400))
  }

  report(record: Contested, daysAgo: number, state: 'reported' | 'checked' | 'taken_up' | 'closed', rest: { takenUpAt?: Date, chair?: DemoPerson, answer?: string, outcome?: 'strike', closedAt?: Date } = {}): void {
    const { staff, random } = this.frame
    const checkedAt = this.ago(daysAgo - 2)
    const reporter = this.reporter()
    this.rows.add('challenges', {
      uid: uidAt(this.ago(daysAgo), random), entry_id: record.entry_id, reporter_user_id: reporter.userId, reporter_name: reporter.name,
      text: DOUBTS[this.turn++ % DOUBTS.length]!, state, reported_at: sqlTime(this.ago(daysAgo)),
      checked_by: state === 'reported' ? null : staff.reviewers[0]!.userId, checked_at: state === 'reported' ? null : sqlTime(checkedAt),
      taken_up_by: rest.chair?.userId ?? null, taken_up_at: rest.takenUpAt ? sqlTime(rest.takenUpAt) : null,
      answer_due_on: rest.takenUpAt ? addDays(rest.takenUpAt.toISOString().slice(0, 10), DEFAULT_LIMITS.answerDays) : null,
      answer_text: rest.answer ?? null, answered_at: rest.answer && rest.takenUpAt ? sqlTime(new Date(rest.takenUpAt.getTime() + 9 * DAY)) : null,
      outcome: rest.outcome ?? null, closed_at: rest.closedAt ? sqlTime(rest.closedAt) : null,
    })
  }

  private async append(record: Contested, events: readonly DemoEvent[]): Promise<void> {
    const end = (await this.frame.db('entry_events').where({ entry_id: record.entry_id }).orderBy('seq', 'desc').first('seq', 'hash'))!
    this.chains.add(this.rows, { id: record.entry_id, uid: record.uid }, events, end)
    const last = events.at(-1)!
    const version = end.seq + events.length
    this.afterwards.push(db => db('entries').where({ id: record.entry_id }).update({ version, state: last.to, state_since: sqlTime(last.at) }))
  }

  private docket(record: Contested, kind: 'challenge' | 'appeal', sittingId: number, position: number, at: Date, decided: { at: Date, ground: Ground, reason: string } | null): number {
    const id = this.nextItem++
    this.rows.add('docket_items', {
      id, uid: uidAt(at, this.frame.random), sitting_id: sittingId, entry_id: record.entry_id, kind, position, second_measuring_due: 0, judge_a: null, judge_b: null,
      state: decided ? 'applied' : 'open', outcome: decided ? 'strike' : null, ground: decided?.ground ?? null, reason: decided?.reason ?? null,
      created_at: sqlTime(at), decided_at: decided && sqlTime(decided.at), applied_at: decided && sqlTime(decided.at),
    })
    return id
  }

  async challenge(record: Contested, daysAgo: number, answered: boolean): Promise<void> {
    const chair = this.frame.staff.judges[1]!
    const at = this.ago(daysAgo)
    this.report(record, daysAgo + 14, 'taken_up', { takenUpAt: at, chair, ...(answered ? { answer: 'Everything is as I stated it. The licence and the photograph of that day are with the file.' } : {}) })
    this.docket(record, 'challenge', this.planned.id, ++this.planned.items, at, null)
    await this.append(record, [{ kind: 'challenge', from: 'accepted', to: 'challenged', at, by: chair, texts: { comment: 'The report was checked and has weight.' } }])
    const dueOn = addDays(at.toISOString().slice(0, 10), DEFAULT_LIMITS.answerDays)
    this.afterwards.push(db => db('records').where({ id: record.id }).update({ status: 'challenged' }), db => db('entries').where({ id: record.entry_id }).update({ due_on: dueOn }))
  }

  /** Challenged before the last sitting and struck by it; with an appeal that came in time where there is one. */
  async strike(record: Contested, ground: Ground, reason: string, appeal?: string): Promise<void> {
    const sitting = [...this.frame.past.values()].at(-1)!
    const struckAt = new Date(`${sitting.day}T21:30:00.000Z`)
    const challengedAt = new Date(struckAt.getTime() - 45 * DAY)
    const daysAgo = Math.round((this.frame.now.getTime() - challengedAt.getTime()) / DAY)
    this.report(record, daysAgo + 12, 'closed', { takenUpAt: challengedAt, chair: sitting.chair, outcome: 'strike', closedAt: struckAt })
    const item = this.docket(record, 'challenge', sitting.id, ++sitting.items, challengedAt, { at: struckAt, ground, reason })
    for (const judge of sitting.judges.filter(one => one !== this.frame.staff.judges[1])) {
      this.rows.add('ballots', { docket_item_id: item, judge_user_id: judge.userId, vote: 'strike', ground, reason, requests: null, cast_at: sqlTime(new Date(struckAt.getTime() - 600_000)) })
    }
    const events: DemoEvent[] = [
      { kind: 'challenge', from: 'accepted', to: 'challenged', at: challengedAt, by: sitting.chair, texts: { comment: 'The report was checked and has weight.' } },
      { kind: 'strike', from: 'challenged', to: 'struck', at: struckAt, by: null, args: { ground }, texts: { reason } },
    ]
    if (appeal) {
      const appealedAt = new Date(struckAt.getTime() + 21 * DAY)
      const [owner] = await this.frame.db('users').where({ id: record.owner_user_id }).select('uid')
      events.push({ kind: 'appeal_strike', from: 'struck', to: 'struck', at: appealedAt, by: { userId: record.owner_user_id, uid: owner!.uid }, texts: { text: appeal } })
      this.docket(record, 'appeal', this.planned.id, ++this.planned.items, appealedAt, null)
      this.afterwards.push(db => db('entries').where({ id: record.entry_id }).update({ appealed_at: sqlTime(appealedAt) }))
    }
    await this.append(record, events)
    const dueOn = addDays(sitting.day, DEFAULT_LIMITS.appealDays)
    this.afterwards.push(
      db => db('entries').where({ id: record.entry_id }).update({ due_on: dueOn, state_since: sqlTime(struckAt) }),
      db => db('records').where({ id: record.id }).update({ status: 'struck' }),
      db => db('record_tokens').where({ record_id: record.id }).delete(),
      db => db('animals').where({ id: record.animal_id }).update({ live_entry_id: null }),
    )
  }
}
