import type { Knex } from 'knex'
import type Stripe from 'stripe'
import type { CheckoutsRow } from '../../../db/tables'
import { inTransaction } from '../../../db/transaction'
import { DomainError, isDomainError } from '../../../shared/errors'
import type { Registry } from '../../composition'
import { lockEntryById } from '../../repositories/entries'
import * as payments from '../../repositories/payments'
import { appendEvent } from '../events/append'
import { momentOf, type Moment } from '../moment'
import { noteCharge, noteComeBack, noteDispute, noteRefund } from './ledger'

/**
 * Takes a message of the payments service. Its signature is checked over the very bytes that came; a message that was
 * handled before is thanked for and nothing is done. Message and booking are one transaction: if it fails, the
 * service sends the message again.
 *
 * @throws DomainError `not_configured`, `bad_request` (signature)
 */
export async function takePaymentMessage(registry: Registry, raw: Uint8Array, signature: string): Promise<{ received: true }> {
  if (!registry.payments) throw new DomainError('not_configured')
  const message = registry.payments.readMessage(raw, signature)
  if (await payments.findPaymentEvent(registry.db, message.id)) return { received: true }
  const moment = await momentOf(registry)
  try {
    await inTransaction(registry.db, async (trx) => {
      const entryId = await entryOf(trx, message)
      // The entry's lock comes first, as everywhere, so that two messages about one entry wait for each other.
      if (entryId !== null) await lockEntryById(trx, entryId)
      await payments.insertPaymentEvent(trx, {
        provider_event_id: message.id, kind: message.type.slice(0, 80), payload: JSON.stringify(message),
        received_at: moment.at, handled_at: moment.at, last_error: entryId === null ? 'about nothing of ours' : null,
      })
      if (entryId !== null) await handle(trx, message, moment)
    })
  }
  catch (error) {
    // The same message a second time, at the same moment.
    if (!(isDomainError(error) && error.code === 'duplicate')) throw error
  }
  return { received: true }
}

const idOf = (thing: string | { id: string } | null | undefined): string | null => typeof thing === 'string' ? thing : thing?.id ?? null

async function checkoutOf(db: Knex, session: Stripe.Checkout.Session): Promise<CheckoutsRow | undefined> {
  const own = session.client_reference_id ?? session.metadata?.checkout
  return (own ? await payments.findCheckoutByUid(db, own) : undefined) ?? await payments.findCheckoutByProvider(db, session.id)
}

async function chargeOf(db: Knex, paymentIntent: string | { id: string } | null) {
  const id = idOf(paymentIntent)
  return id === null ? undefined : await payments.findLedgerByProvider(db, id)
}

/** Row of the entry that a message is about, or null when it is about nothing of ours. */
async function entryOf(db: Knex, message: Stripe.Event): Promise<number | null> {
  const { object } = message.data
  if (object.object === 'checkout.session') return (await checkoutOf(db, object))?.entry_id ?? null
  if (object.object === 'refund' || object.object === 'dispute') return (await chargeOf(db, object.payment_intent))?.entry_id ?? null
  if (object.object === 'payment_intent' && object.metadata.checkout) return (await payments.findCheckoutByUid(db, object.metadata.checkout))?.entry_id ?? null
  return null
}

async function handle(trx: Knex.Transaction, message: Stripe.Event, moment: Moment): Promise<void> {
  switch (message.type) {
    case 'checkout.session.completed':
    case 'checkout.session.async_payment_succeeded':
      return paid(trx, message.data.object, moment)
    case 'checkout.session.async_payment_failed':
      return ended(trx, message.data.object, 'failed', moment)
    case 'checkout.session.expired':
      return ended(trx, message.data.object, 'expired', moment)
    case 'payment_intent.payment_failed':
      return declined(trx, message.data.object, moment)
    case 'refund.created':
    case 'refund.updated':
    case 'refund.failed':
      return refunded(trx, message.data.object, moment)
    case 'charge.dispute.created':
      return disputed(trx, message.data.object, moment)
    case 'charge.dispute.closed':
      return disputeClosed(trx, message.data.object, moment)
  }
}

async function paid(trx: Knex.Transaction, session: Stripe.Checkout.Session, moment: Moment): Promise<void> {
  const checkout = await checkoutOf(trx, session)
  const charge = idOf(session.payment_intent)
  // A payment that takes days says "completed" first and is paid by a later message.
  if (!checkout || session.payment_status !== 'paid' || charge === null) return
  const amountMinor = session.amount_total ?? checkout.amount_minor
  await payments.payCheckout(trx, checkout.id, session.id, moment.at)
  await noteCharge(trx, checkout.entry_id, { providerId: charge, amountMinor, currency: (session.currency ?? checkout.currency).toUpperCase(), checkoutId: checkout.id }, moment)
}

async function ended(trx: Knex.Transaction, session: Stripe.Checkout.Session, state: 'failed' | 'expired', moment: Moment): Promise<void> {
  const checkout = await checkoutOf(trx, session)
  if (checkout) await payments.endCheckout(trx, checkout.id, state, moment.at)
}

/** A card was refused. The page stays open for another one; the entrant's history says that a try failed. */
async function declined(trx: Knex.Transaction, intent: Stripe.PaymentIntent, moment: Moment): Promise<void> {
  const checkout = await payments.findCheckoutByUid(trx, intent.metadata.checkout!)
  const entry = checkout && await lockEntryById(trx, checkout.entry_id)
  if (entry) await appendEvent(trx, entry, { kind: 'payment_failed', actor: null, args: { amount: checkout.amount_minor, currency: checkout.currency } }, moment)
}

async function refunded(trx: Knex.Transaction, refund: Stripe.Refund, moment: Moment): Promise<void> {
  const charge = await chargeOf(trx, refund.payment_intent)
  if (!charge) return
  const moved = { providerId: refund.id, amountMinor: refund.amount, currency: refund.currency.toUpperCase(), checkoutId: charge.checkout_id }
  if (refund.status === 'failed' || refund.status === 'canceled') await noteComeBack(trx, charge.entry_id, moved, 'fee_refund_failed', moment)
  else await noteRefund(trx, charge.entry_id, moved, moment)
}

async function disputed(trx: Knex.Transaction, dispute: Stripe.Dispute, moment: Moment): Promise<void> {
  const charge = await chargeOf(trx, dispute.payment_intent)
  if (charge) await noteDispute(trx, charge.entry_id, { providerId: dispute.id, amountMinor: dispute.amount, currency: dispute.currency.toUpperCase(), checkoutId: charge.checkout_id }, moment)
}

async function disputeClosed(trx: Knex.Transaction, dispute: Stripe.Dispute, moment: Moment): Promise<void> {
  const charge = await chargeOf(trx, dispute.payment_intent)
  if (!charge || dispute.status !== 'won') return
  await noteComeBack(trx, charge.entry_id, { providerId: dispute.id, amountMinor: dispute.amount, currency: dispute.currency.toUpperCase(), checkoutId: charge.checkout_id }, 'fee_dispute_won', moment)
}
