import { createHash } from 'node:crypto'
import { addDays, type Day } from '#shared/domain/dates'
import { sqlTime } from '../../db/time'
import type { Chains, DemoEvent } from './chain'
import type { DemoMeasurer, DemoPerson } from './people'
import { addEntry, addPeople, addRecord, addSheet, type Place, type ScoredSheet, type Subject } from './record-rows'
import { uidAt } from './random'
import type { PastSitting } from './sittings'
import { FEES, SOCIETY_SETTINGS, type DemoClass } from './society'
import type { Timeline } from './timeline'

/** Everything that a record which went the whole way is written from. */
export interface WholeWay {
  readonly subject: Subject
  readonly timeline: Timeline
  readonly measurer: DemoMeasurer
  readonly reviewer: DemoPerson
  readonly registrar: DemoPerson
  readonly sitting: PastSitting
  readonly sheet: ScoredSheet
  /** the two blind sheets and the joint one, where a second measuring was due */
  readonly panel: { readonly a: ScoredSheet, readonly b: ScoredSheet, readonly joint: ScoredSheet } | null
  readonly termId: number
  readonly statement: { readonly version: number, readonly locale: string, readonly body: string }
  /** codes that the office ticks */
  readonly checks: readonly string[]
}

export interface Numbers {
  sheet: () => number
  docketItem: () => number
  checkout: () => number
}

const REQUESTS = [
  { text: 'The photograph from the left is blurred. Please send a sharp one.', wants: ['photo_left'] },
  { text: 'We cannot read the number on the tag. Please send a copy in which it can be read.', wants: ['tag_or_licence'] },
  { text: 'The photograph from the front does not show the whole plate of the skull.', wants: ['photo_front'] },
  { text: 'Please tell us whether a guide was with you.', wants: ['guided'] },
] as const

export function feeOf(category: DemoClass, day: Day): { version: number, amount: number } {
  const fee = FEES.findLast(one => one.from_on <= day) ?? FEES[0]
  return { version: fee.version, amount: ['black-bear', 'grizzly-bear', 'cougar'].includes(category) ? fee.skulls_minor : fee.amount_minor }
}

/** Measured, submitted, checked, decided: the rows of every step and the chain of its events. */
export function addWholeWay(way: WholeWay, place: Place, chains: Chains, numbers: Numbers): void {
  const { subject, timeline, measurer, reviewer, sheet } = way
  const standing = way.panel?.joint ?? sheet
  const fee = feeOf(subject.plan.category, subject.plan.submittedOn)
  const events = eventsOf(way, standing)
  addEntry(subject, place, timeline.begunAt, {
    version: events.length,
    state_since: sqlTime(timeline.acceptedAt),
    measurer_user_id: measurer.userId,
    reviewer_user_id: reviewer.userId,
    dried_since: driedSince(subject),
    dried_from: 'taken',
    term_id: way.termId,
    fee_version: fee.version,
    submitted_at: sqlTime(timeline.submittedAt),
    net16: standing.net16,
    gross16: standing.gross16,
  })
  addPeople(subject, place, timeline.begunAt)
  const sheetId = numbers.sheet()
  addSheet(subject, place, sheet, {
    id: sheetId, kind: 'entry', measuredOn: subject.plan.measuredOn, driedSince: driedSince(subject), signedAt: timeline.certifiedAt, measurer,
  })
  addPapersSide(way, place, fee, numbers)
  const jointId = addPanelSide(way, place, numbers)
  chains.add(place.rows, { id: subject.entryId, uid: subject.entryUid }, events)
  addRecord(subject, place, standing, timeline.acceptedAt, jointId ?? sheetId, null)
}

/** The day from which the drying counts: when it was taken, or two months before the measuring where that is not known. */
function driedSince({ plan }: Subject): Day {
  return plan.taken.precision === 'day' ? plan.taken.first : addDays(plan.measuredOn, -75)
}

function addPapersSide(way: WholeWay, { rows }: Place, fee: { version: number, amount: number }, numbers: Numbers): void {
  const { subject, timeline, reviewer, registrar, statement } = way
  const { random, entryId: entry_id, cast } = subject
  const at = sqlTime(timeline.submittedAt)
  rows.add('statements', {
    uid: uidAt(timeline.submittedAt, random),
    entry_id,
    text_version: statement.version,
    locale: statement.locale,
    part: cast.signer.part,
    signer_name: cast.signer.name,
    user_id: cast.owner?.userId ?? null,
    body_hash: createHash('sha256').update(statement.body).digest('hex'),
    signed_at: at,
  })
  const { currency } = SOCIETY_SETTINGS
  const how = random.weighted({ card: 94, office_payment: 4, waiver: 2 })
  if (how === 'card') {
    const checkoutId = numbers.checkout()
    const tag = uidAt(timeline.paidAt, random)
    rows.add('checkouts', {
      id: checkoutId, uid: uidAt(timeline.paidAt, random), entry_id, user_id: cast.owner!.userId, provider_id: `cs_demo_${tag}`,
      amount_minor: fee.amount, currency, fee_version: fee.version, state: 'paid', created_at: sqlTime(timeline.paidAt),
      finished_at: sqlTime(new Date(timeline.paidAt.getTime() + 80_000)),
    })
    rows.add('ledger', {
      uid: uidAt(timeline.paidAt, random), entry_id, kind: 'charge', amount_minor: fee.amount, currency, provider_id: `pi_demo_${tag}`,
      checkout_id: checkoutId, by_user_id: null, reason: null, at: sqlTime(new Date(timeline.paidAt.getTime() + 80_000)),
    })
  }
  else {
    rows.add('ledger', {
      uid: uidAt(timeline.paidAt, random), entry_id, kind: how, amount_minor: fee.amount, currency, provider_id: null, checkout_id: null,
      by_user_id: registrar.userId, reason: how === 'waiver' ? 'Youth day of the society' : 'Paid in cash at the office', at: sqlTime(timeline.paidAt),
    })
  }
  if (timeline.returned) {
    const request = random.pick(REQUESTS)
    rows.add('requests', {
      uid: uidAt(timeline.returned.at, random), entry_id, kind: 'paper', text: request.text, wants: JSON.stringify(request.wants),
      asked_by: reviewer.userId, asked_at: sqlTime(timeline.returned.at), answered_at: sqlTime(timeline.returned.resubmittedAt),
      answer_text: 'Done.', answered_by: cast.owner!.userId, closed_at: sqlTime(timeline.beforePanelAt),
    })
  }
  for (const code of way.checks) {
    rows.add('checks', { entry_id, code, ticked_by: reviewer.userId, ticked_at: sqlTime(timeline.beforePanelAt) })
  }
}

/** The docket, the ballots and the second measuring. Returns the id of the joint sheet. */
function addPanelSide(way: WholeWay, place: Place, numbers: Numbers): number | null {
  const { subject, timeline, sitting, panel } = way
  const { random, entryId: entry_id } = subject
  const { rows } = place
  const docketItemId = numbers.docketItem()
  const [judgeA, judgeB] = [sitting.judges[1]!, sitting.judges[2]!]
  rows.add('docket_items', {
    id: docketItemId,
    uid: uidAt(timeline.beforePanelAt, random),
    sitting_id: sitting.id,
    entry_id,
    kind: 'entry',
    position: ++sitting.items,
    second_measuring_due: panel ? 1 : 0,
    judge_a: panel ? judgeA.userId : null,
    judge_b: panel ? judgeB.userId : null,
    state: 'applied',
    outcome: 'accept',
    created_at: sqlTime(timeline.beforePanelAt),
    decided_at: sqlTime(timeline.acceptedAt),
    applied_at: sqlTime(timeline.acceptedAt),
  })
  const aside = random.chance(0.06) ? sitting.judges[4] : undefined
  for (const [turn, judge] of sitting.judges.entries()) {
    const vote = judge === aside ? 'stand_aside' : 'accept'
    rows.add('ballots', {
      docket_item_id: docketItemId, judge_user_id: judge.userId, vote, ground: null,
      reason: vote === 'stand_aside' ? 'I hunt the same ridge as the hunter.' : null,
      cast_at: sqlTime(new Date(timeline.acceptedAt.getTime() - (sitting.judges.length - turn) * 60_000)),
    })
  }
  if (!panel || !timeline.second) return null
  const { day, orderedAt, recordedAt } = timeline.second
  const signed = { measuredOn: day, driedSince: driedSince(subject), signedAt: recordedAt }
  addSheet(subject, place, panel.a, { ...signed, id: numbers.sheet(), kind: 'panel_a', measurer: judgeA })
  addSheet(subject, place, panel.b, { ...signed, id: numbers.sheet(), kind: 'panel_b', measurer: judgeB })
  const jointId = numbers.sheet()
  addSheet(subject, place, panel.joint, { ...signed, id: jointId, kind: 'panel_joint', measurer: judgeA })
  rows.add('remeasurings', {
    uid: uidAt(orderedAt, random), entry_id, docket_item_id: docketItemId, ordered_by: sitting.chair.userId, ordered_at: sqlTime(orderedAt),
    reason: 'Among the first of its class', place: 'Office of the society, Varrowmere', at: sqlTime(recordedAt), judge_a: judgeA.userId,
    judge_b: judgeB.userId, state: 'recorded', joint_sheet_id: jointId, joint_signed_a_at: sqlTime(recordedAt), joint_signed_b_at: sqlTime(recordedAt),
    received_at: sqlTime(new Date(recordedAt.getTime() - 3 * 3600_000)), given_back_at: sqlTime(new Date(recordedAt.getTime() + 3600_000)),
    closed_at: sqlTime(recordedAt),
  })
  return jointId
}

function eventsOf(way: WholeWay, standing: ScoredSheet): DemoEvent[] {
  const { subject, timeline, measurer, reviewer, sitting, sheet } = way
  const owner = subject.cast.owner!
  const { returned, second } = timeline
  return [
    { kind: 'begin', from: null, to: 'draft', at: timeline.begunAt, by: owner, args: { category: subject.plan.category, origin: subject.plan.origin } },
    { kind: 'ask_measurer', from: 'draft', to: 'measuring', at: timeline.askedAt, by: owner, args: { measurer: measurer.uid } },
    { kind: 'certify', from: 'measuring', to: 'certified', at: timeline.certifiedAt, by: measurer, args: { net16: sheet.net16, sheetNumber: 1 } },
    { kind: 'submit', from: 'certified', to: 'in_review', at: timeline.submittedAt, by: owner, args: { term: way.termId } },
    ...(returned
      ? [
          { kind: 'return', from: 'in_review', to: 'returned', at: returned.at, by: reviewer, args: { requests: 1 } },
          { kind: 'resubmit', from: 'returned', to: 'in_review', at: returned.resubmittedAt, by: owner },
        ] as const
      : []),
    { kind: 'put_before_panel', from: 'in_review', to: 'at_panel', at: timeline.beforePanelAt, by: reviewer, args: { secondMeasuring: second !== null } },
    ...(second
      ? [
          { kind: 'order_remeasure', from: 'at_panel', to: 'remeasuring', at: second.orderedAt, by: sitting.chair, args: { onDay: second.day }, texts: { comment: 'Among the first of its class.' } },
          { kind: 'record_remeasure', from: 'remeasuring', to: 'at_panel', at: second.recordedAt, by: sitting.judges[1]!, args: { net16: standing.net16, before16: sheet.net16 } },
        ] as const
      : []),
    { kind: 'accept', from: 'at_panel', to: 'accepted', at: timeline.acceptedAt, by: null, args: { recordNo: subject.recordNo, net16: standing.net16 } },
  ]
}
