import type { Knex } from 'knex'
import type { EntriesRow } from '../../../db/tables'
import { lockEntryById } from '../../repositories/entries'
import * as payments from '../../repositories/payments'
import { appendEvent } from '../events/append'
import { newUid, type Moment } from '../moment'
import { feeStanding, type FeeStanding } from './feeStanding'
import { refundCharge, type RefundReason } from './refund'
import { tellOfMoney } from './tell'

export interface MoneyMoved {
  /** the provider's id of the movement; written once, however often we hear of it */
  readonly providerId: string
  readonly amountMinor: number
  readonly currency: string
  readonly checkoutId: number | null
  readonly reason?: string
}

/** States in which a fee serves nothing any more, so that money which arrives goes back. */
const ENDED = ['withdrawn', 'declined', 'struck']

function whyNeedless(entry: EntriesRow, charge: MoneyMoved, before: FeeStanding): RefundReason | null {
  if (ENDED.includes(entry.state)) return 'arrived_after_end'
  if (before.currency !== null && charge.currency !== before.currency) return 'other_currency'
  return before.open === 0 ? 'paid_twice' : null
}

/**
 * Books money that came. What arrives for an entry that has ended, in a currency that is not the fee's, or a second time is
 * asked back in the same transaction. Less than the fee is booked as what it is: the rest stays open.
 */
export async function noteCharge(trx: Knex.Transaction, entryId: number, charge: MoneyMoved, moment: Moment): Promise<void> {
  const entry = await lockEntryById(trx, entryId)
  if (!entry || await payments.findLedgerByProvider(trx, charge.providerId)) return
  const before = await feeStanding(trx, entry, moment.today)
  await payments.insertLedger(trx, {
    uid: newUid(moment.now), entry_id: entryId, kind: 'charge', amount_minor: charge.amountMinor, currency: charge.currency,
    provider_id: charge.providerId, checkout_id: charge.checkoutId, at: moment.at,
  })
  await appendEvent(trx, entry, { kind: 'fee_paid', actor: null, args: { amount: charge.amountMinor, currency: charge.currency } }, moment)
  const needless = whyNeedless(entry, charge, before)
  await tellOfMoney(trx, entry, 'fee_paid', charge.amountMinor, charge.currency, moment)
  if (needless) await refundCharge(trx, (await payments.findLedgerByProvider(trx, charge.providerId))!, needless, moment)
}

/** Books money that went back, once, however we learned of it. */
export async function noteRefund(trx: Knex.Transaction, entryId: number, refund: MoneyMoved, moment: Moment): Promise<void> {
  const entry = await lockEntryById(trx, entryId)
  if (!entry || await payments.findLedgerByProvider(trx, refund.providerId)) return
  await payments.insertLedger(trx, {
    uid: newUid(moment.now), entry_id: entryId, kind: 'refund', amount_minor: refund.amountMinor, currency: refund.currency,
    provider_id: refund.providerId, checkout_id: refund.checkoutId, reason: refund.reason ?? null, at: moment.at,
  })
  await appendEvent(trx, entry, { kind: 'fee_refunded', actor: null, args: { amount: refund.amountMinor, currency: refund.currency } }, moment)
  await tellOfMoney(trx, entry, 'fee_refunded', refund.amountMinor, refund.currency, moment)
}

/** Books money that a payer's bank took back. */
export async function noteDispute(trx: Knex.Transaction, entryId: number, dispute: MoneyMoved, moment: Moment): Promise<void> {
  const entry = await lockEntryById(trx, entryId)
  if (!entry || await payments.findLedgerByProvider(trx, dispute.providerId)) return
  await payments.insertLedger(trx, {
    uid: newUid(moment.now), entry_id: entryId, kind: 'dispute', amount_minor: dispute.amountMinor, currency: dispute.currency,
    provider_id: dispute.providerId, checkout_id: dispute.checkoutId, at: moment.at,
  })
  await appendEvent(trx, entry, { kind: 'fee_disputed', actor: null, args: { amount: dispute.amountMinor, currency: dispute.currency } }, moment)
}

/**
 * Books money that is here again: a refund that did not get through, or a dispute that was won. Only what was booked as
 * gone can come back, and only once.
 */
export async function noteComeBack(trx: Knex.Transaction, entryId: number, gone: MoneyMoved, kind: 'fee_refund_failed' | 'fee_dispute_won', moment: Moment): Promise<void> {
  const entry = await lockEntryById(trx, entryId)
  const providerId = `back-${gone.providerId}`
  if (!entry || !await payments.findLedgerByProvider(trx, gone.providerId) || await payments.findLedgerByProvider(trx, providerId)) return
  await payments.insertLedger(trx, {
    uid: newUid(moment.now), entry_id: entryId, kind: 'charge', amount_minor: gone.amountMinor, currency: gone.currency,
    provider_id: providerId, checkout_id: gone.checkoutId, reason: kind, at: moment.at,
  })
  await appendEvent(trx, entry, { kind, actor: null, args: { amount: gone.amountMinor, currency: gone.currency } }, moment)
}
