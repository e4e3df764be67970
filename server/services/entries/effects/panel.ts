import { isSecondMeasuringDue } from '../../../../shared/domain/workflow/remeasuring'
import type { Knex } from 'knex'
import { standingOf } from '../../../../shared/domain/ranking'
import { DomainError } from '../../../../shared/errors'
import { sqlTime } from '../../../../db/time'
import { insertRequest } from '../../../repositories/office'
import {
  findNextSitting, findOpenItem, findSittingById, insertItem, insertRemeasuring, listChallenges, lockSittingById, nextPosition, updateChallenge, updateItem, updateRemeasuring,
} from '../../../repositories/panel'
import { listCounts } from '../../../repositories/records'
import { deleteOpenSheet, findOpenSheet, findSheetById } from '../../../repositories/sheets'
import { newUid } from '../../moment'
import { refreshRecord } from '../../listing/publish'
import { matterOf } from '../context'
import { sayNet } from '../say'
import type { Effect, EffectContext } from './context'

/** The sitting if its docket still takes items: one that was closed meanwhile does not. */
async function openDocket(trx: Knex.Transaction, sittingId: number | null): Promise<number | null> {
  const sitting = sittingId === null ? undefined : await lockSittingById(trx, sittingId)
  return sitting && sitting.state !== 'closed' ? sitting.id : null
}

async function putItem({ trx, context, input, moment, says, args }: EffectContext, kind: 'entry' | 'appeal' | 'challenge'): Promise<void> {
  const sittingId = await openDocket(trx, input.sittingId ?? (await findNextSitting(trx, moment.today))?.id ?? null)
  const uid = newUid(moment.now)
  await insertItem(trx, {
    uid, sitting_id: sittingId, entry_id: context.entry.id, kind, position: sittingId === null ? 0 : await nextPosition(trx, sittingId),
    judge_a: input.judgeUserIds?.[0] ?? null, judge_b: input.judgeUserIds?.[1] ?? null, created_at: moment.at,
  })
  args.docketItem = uid
  const sitting = sittingId === null ? undefined : await findSittingById(trx, sittingId)
  says.sitting = sitting ? { day: sitting.held_on } : null
}

export const putOnDocket: Effect = effect => putItem(effect, matterOf(effect.context.entry) === 'appeal' ? 'appeal' : 'entry')
export const putAppealOnDocket: Effect = effect => putItem(effect, 'appeal')
export const putChallengeOnDocket: Effect = effect => putItem(effect, 'challenge')

/** Says, before the docket opens, whether a second measuring is due: by the certified net's place over all methods of the region. */
export const fixSecondMeasuring: Effect = async ({ trx, context, patch, workflow, args }) => {
  const entry = { ...context.entry, ...patch as { net16?: number } }
  const counts = await listCounts(trx, { class_id: entry.class_id, district_id: 0, method: '' })
  const place = standingOf(counts, entry.net16!)
  const due = isSecondMeasuringDue({ total: place.total, higher: place.rank - 1, equal: place.sharedBy }, workflow.limits)
  const item = await findOpenItem(trx, entry.id)
  await updateItem(trx, item!.id, { second_measuring_due: due ? 1 : 0 })
  args.secondMeasuringDue = due
}

/** A new certificate for the panel brings the entry back to a docket, where its net is looked at anew. */
export const comeBackToDocket: Effect = async (effect) => {
  if (effect.move.to !== 'at_panel') return
  await putOnDocket(effect)
  await fixSecondMeasuring(effect)
}

/** An item that cannot be decided now leaves its sitting; the matter itself comes back on a later docket. */
export const carryDocketItem: Effect = async ({ trx, context }) => {
  if (context.item) await updateItem(trx, context.item.id, { state: 'carried' })
}

export const removeDocketItem: Effect = async ({ trx, context }) => {
  if (context.item) await updateItem(trx, context.item.id, { state: 'removed' })
}

export const planRemeasuring: Effect = async ({ trx, context, facts, input, actor, moment, args, says }) => {
  const [judgeA, judgeB] = facts.second.pair!
  const uid = newUid(moment.now)
  await insertRemeasuring(trx, {
    uid, entry_id: context.entry.id, docket_item_id: context.item?.id ?? null, ordered_by: actor!.userId, ordered_at: moment.at,
    reason: input.comment ?? null, place: input.place!.trim(), at: sqlTime(new Date(input.at!)), judge_a: judgeA, judge_b: judgeB,
  })
  args.remeasuring = uid
  says.place = input.place!.trim()
  says.at = { instant: new Date(input.at!).toISOString() }
}

export const endRemeasuring: Effect = async ({ trx, context, moment }) => {
  await updateRemeasuring(trx, context.remeasuring!.id, { state: 'recorded', closed_at: moment.at })
}

/** Ends a second measuring that will not take place, with the sheets that nobody signed. */
async function endUnmeasured({ trx, context, moment }: EffectContext, state: 'not_presented' | 'cancelled'): Promise<void> {
  if (!context.remeasuring) return
  await updateRemeasuring(trx, context.remeasuring.id, { state, closed_at: moment.at })
  for (const kind of ['panel_a', 'panel_b', 'panel_joint'] as const) {
    const open = await findOpenSheet(trx, context.entry.id, kind)
    if (open) await deleteOpenSheet(trx, open.id)
  }
}

export const noteNotPresented: Effect = effect => endUnmeasured(effect, 'not_presented')
export const cancelRemeasuring: Effect = effect => endUnmeasured(effect, 'cancelled')

/** The panel's net becomes the standing net; the entry sheet stays beside it. */
export const standPanelSheet: Effect = async ({ trx, context, patch, args, says }) => {
  const joint = await findSheetById(trx, context.remeasuring!.joint_sheet_id!)
  if (!joint || joint.state !== 'signed') throw new DomainError('internal', { logLine: `no signed joint sheet for entry ${context.entry.uid}` })
  Object.assign(patch, { standing_sheet_id: joint.id, net16: joint.net16, gross16: joint.gross16 })
  Object.assign(args, { sheet: joint.uid, fromNet16: context.entry.net16, net16: joint.net16 })
  // a challenged record keeps standing in the lists, by its new net
  await refreshRecord(trx, { ...context, entry: { ...context.entry, ...patch } as typeof context.entry })
  says.net = sayNet(joint.net16!, context.category.step)
}

export const askRequests: Effect = async ({ trx, context, facts, moment, says }) => {
  const texts = facts.decision!.requests
  for (const text of texts) {
    await insertRequest(trx, { uid: newUid(moment.now), entry_id: context.entry.id, kind: 'panel', text: text.slice(0, 2000), wants: '[]', asked_by: null, asked_at: moment.at })
  }
  says.requests = { list: [...texts] }
}

/** The report that the chair takes up: the one that was named, or the oldest that the office has checked. */
export const takeUpChallenge: Effect = async ({ trx, context, input, actor, moment, move, args }) => {
  const checked = (await listChallenges(trx, context.entry.id)).filter(challenge => challenge.state === 'checked')
  const challenge = checked.find(one => one.uid === input.challenge) ?? checked[0]!
  await updateChallenge(trx, challenge.id, { state: 'taken_up', taken_up_by: actor!.userId, taken_up_at: moment.at, answer_due_on: move.dueOn })
  args.challenge = challenge.uid
}

export const closeChallenge: Effect = async ({ trx, context, moment, move }) => {
  const running = (await listChallenges(trx, context.entry.id)).find(challenge => challenge.state === 'taken_up')
  if (!running) return
  const outcome = ({ struck: 'strike', accepted: 'uphold' } as const)[move.to as 'struck' | 'accepted'] ?? null
  await updateChallenge(trx, running.id, { state: 'closed', outcome, closed_at: moment.at })
}
