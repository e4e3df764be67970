import Stripe from 'stripe'
import { DomainError } from '../../shared/errors'
import type { HartrollConfig } from '../config'

const TIMEOUT_MS = 8_000

export interface CheckoutToCreate {
  /** uid of the checkout; comes back with every message about it */
  readonly uid: string
  readonly entryUid: string
  /** integer minor units */
  readonly amountMinor: number
  /** ISO 4217 */
  readonly currency: string
  readonly title: string
  readonly email: string
  readonly successUrl: string
  readonly cancelUrl: string
}

/** The provider refused for good: asking again would not help. */
export class PaymentRefusal extends Error {
  readonly code: string
  constructor(code: string, message: string) {
    super(message)
    this.name = 'PaymentRefusal'
    this.code = code
  }
}

/** The payments service, through its SDK. Every change carries a key under which a repetition is harmless. */
export interface Payments {
  createCheckout(checkout: CheckoutToCreate, key: string): Promise<{ id: string, url: string }>
  expireCheckout(providerId: string, key: string): Promise<void>
  refund(refund: { charge: string, amountMinor: number, entryUid: string }, key: string): Promise<{ id: string, amountMinor: number, currency: string, status: string }>
  /**
   * Reads a message of the service.
   *
   * @throws DomainError `bad_request` when its signature does not hold
   */
  readMessage(raw: Uint8Array, signature: string): Stripe.Event
}

/** Runs a call of the SDK; what a repetition may heal becomes `payments_away`, the rest PaymentRefusal. */
async function call<T>(act: () => Promise<T>): Promise<T> {
  try {
    return await act()
  }
  catch (error) {
    if (!(error instanceof Stripe.errors.StripeError)) throw error
    const passing = error instanceof Stripe.errors.StripeConnectionError || error instanceof Stripe.errors.StripeRateLimitError
      || (error.statusCode ?? 500) >= 500 || error.statusCode === 409
    if (passing) throw new DomainError('payments_away', { logLine: error.message, cause: error })
    throw new PaymentRefusal(error.code ?? error.type, error.message)
  }
}

/** A client of the payments service, or null where none is set up and fees are booked by the office. */
export function openPayments({ stripe: settings }: HartrollConfig): Payments | null {
  if (!settings) return null
  const base = settings.apiBase ? new URL(settings.apiBase) : null
  const stripe = new Stripe(settings.secretKey, {
    timeout: TIMEOUT_MS,
    // Repetitions are the outbox's: a person waits for the first try.
    maxNetworkRetries: 0,
    telemetry: false,
    ...(base ? { host: base.hostname, port: base.port || (base.protocol === 'https:' ? '443' : '80'), protocol: base.protocol.replace(':', '') as 'http' | 'https' } : {}),
  })
  return {
    async createCheckout(checkout, key) {
      const session = await call(() => stripe.checkout.sessions.create({
        mode: 'payment',
        client_reference_id: checkout.uid,
        customer_email: checkout.email,
        success_url: checkout.successUrl,
        cancel_url: checkout.cancelUrl,
        metadata: { checkout: checkout.uid, entry: checkout.entryUid },
        payment_intent_data: { metadata: { checkout: checkout.uid, entry: checkout.entryUid } },
        line_items: [{ quantity: 1, price_data: { currency: checkout.currency.toLowerCase(), unit_amount: checkout.amountMinor, product_data: { name: checkout.title } } }],
      }, { idempotencyKey: key }))
      if (!session.url) throw new PaymentRefusal('no_page', 'the payments service gave no page to pay on')
      return { id: session.id, url: session.url }
    },
    async expireCheckout(providerId, key) {
      await call(() => stripe.checkout.sessions.expire(providerId, {}, { idempotencyKey: key }))
    },
    async refund({ charge, amountMinor, entryUid }, key) {
      const refund = await call(() => stripe.refunds.create({ payment_intent: charge, amount: amountMinor, metadata: { entry: entryUid } }, { idempotencyKey: key }))
      return { id: refund.id, amountMinor: refund.amount, currency: refund.currency.toUpperCase(), status: refund.status ?? 'pending' }
    },
    readMessage(raw, signature) {
      try {
        return stripe.webhooks.constructEvent(raw, signature, settings.webhookSecret)
      }
      catch (error) {
        throw new DomainError('bad_request', { details: { reason: 'signature' }, logLine: (error as Error).message })
      }
    },
  }
}
