import { parseSqlTime } from '../../../../db/time'
import { addDays, daysBetween } from '../../../../shared/domain/dates'
import { standingOf } from '../../../../shared/domain/ranking'
import { dayIn } from '../../../clock'
import { listCounts } from '../../../repositories/records'
import { queueRefund } from '../../payments/refund'
import { markRecord, publishEntry, relistEntry, unlistEntry } from '../../listing/publish'
import { sayNet } from '../say'
import { amendEntry } from '../amend'
import type { Effect, EffectContext } from './context'

/** The entry as it will stand once this move is written. */
const asMoved = ({ context, patch }: EffectContext) => ({ ...context, entry: { ...context.entry, ...patch } as typeof context.entry })

export const publishRecord: Effect = async (effect) => {
  const { trx, context, moment, args, says } = effect
  const moved = asMoved(effect)
  const recordNo = await publishEntry(trx, moved, moment)
  const standing = standingOf(await listCounts(trx, { class_id: moved.entry.class_id, district_id: 0, method: '' }), moved.entry.net16!)
  Object.assign(args, { recordNo, net16: moved.entry.net16, rank: standing.rank })
  Object.assign(says, { recordNo: String(recordNo), net: sayNet(moved.entry.net16!, context.category.step), rank: standing.rank })
}

export const markChallenged: Effect = ({ trx, context }) => markRecord(trx, context.entry.id, 'challenged')
export const unmarkChallenged: Effect = ({ trx, context }) => markRecord(trx, context.entry.id, 'accepted')
export const takeFromLists: Effect = ({ trx, context, move }) => unlistEntry(trx, context.entry.id, move.to === 'struck' ? 'struck' : 'withdrawn')
export const putBackInLists: Effect = ({ trx, context }) => relistEntry(trx, context.entry.id)

export const amendRecord: Effect = async (effect) => {
  const amended = await amendEntry(effect.trx, effect.context, effect.input.changes!)
  Object.assign(effect.patch, amended.patch)
  Object.assign(effect.args, amended.args)
  Object.assign(effect.texts, amended.texts)
}

/** Asks for the money back and closes a page of the payments service that is still open. */
export const refundFee: Effect = async ({ trx, context, moment, args }) => {
  const asked = await queueRefund(trx, context.entry.id, 'withdrawn', moment)
  if (asked > 0) args.refundAsked = asked
}

/** Clocks go on from where they stood: the running term ends later by the days of the hold. */
export const liftHold: Effect = ({ context, patch, moment, args }) => {
  const { entry } = context
  const days = daysBetween(dayIn(moment.zone, parseSqlTime(entry.hold_at!)), moment.today)
  Object.assign(patch, { hold_at: null, hold_by: null, hold_reason: null, due_on: entry.due_on === null ? null : addDays(entry.due_on, days) })
  args.heldDays = days
}
