import type { Knex } from 'knex'
import type { LedgerRow } from '../../../db/tables'
import * as payments from '../../repositories/payments'
import type { Moment } from '../moment'

/** Why money goes back by itself. */
export type RefundReason = 'withdrawn' | 'paid_twice' | 'arrived_after_end' | 'other_currency'

/**
 * Asks for everything back that was paid online for an entry, and ends a checkout that is still open. Called under the
 * entry's lock; the provider is asked by the worker after the commit. What was paid at the office goes back by hand.
 *
 * @returns what is asked back, in minor units
 */
export async function queueRefund(trx: Knex.Transaction, entryId: number, reason: RefundReason, moment: Moment): Promise<number> {
  const open = await payments.findOpenCheckout(trx, entryId)
  if (open) await cancelCheckout(trx, open, moment)
  // A charge with a reason is money that came back to us; the payment itself is booked without one.
  const charges = (await payments.listLedger(trx, entryId)).filter(row => row.kind === 'charge' && row.reason === null)
  let asked = 0
  for (const charge of charges) asked += await refundCharge(trx, charge, reason, moment)
  return asked
}

/** Asks for one charge back, once. Returns its amount, or 0 where that was asked before. */
export async function refundCharge(trx: Knex.Transaction, charge: LedgerRow, reason: RefundReason, moment: Moment): Promise<number> {
  const key = `refund-${charge.uid}`
  if (await payments.findCommandByKey(trx, key)) return 0
  await payments.insertCommand(trx, {
    kind: 'refund', idempotency_key: key, entry_id: charge.entry_id, checkout_id: charge.checkout_id,
    payload: JSON.stringify({ charge: charge.provider_id, amount: charge.amount_minor, currency: charge.currency, reason }),
    run_at: moment.at, created_at: moment.at,
  })
  return charge.amount_minor
}

/** Ends a checkout on our side and asks the provider to close its page. */
export async function cancelCheckout(trx: Knex.Transaction, checkout: { id: number, uid: string, entry_id: number }, moment: Moment): Promise<void> {
  if (!await payments.endCheckout(trx, checkout.id, 'cancelled', moment.at)) return
  await payments.insertCommand(trx, {
    kind: 'expire_checkout', idempotency_key: `expire-${checkout.uid}`, entry_id: checkout.entry_id, checkout_id: checkout.id,
    payload: '{}', run_at: moment.at, created_at: moment.at,
  })
}
