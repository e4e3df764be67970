import { createHash, randomBytes } from 'node:crypto'
import { Store } from './store'

/** A page to pay on, in the shape in which the service tells of it. */
export interface Session {
  id: string
  object: 'checkout.session'
  mode: 'payment'
  status: 'open' | 'complete' | 'expired'
  payment_status: 'unpaid' | 'paid'
  payment_intent: string | null
  client_reference_id: string | null
  customer_email: string | null
  amount_total: number
  currency: string
  metadata: Record<string, string>
  title: string
  success_url: string
  cancel_url: string
  url: string | null
  created: number
  expires_at: number
}

export interface Refund {
  id: string
  object: 'refund'
  amount: number
  currency: string
  payment_intent: string
  status: 'succeeded'
  metadata: Record<string, string>
  created: number
}

/** How the stand-in misbehaves, for trying what happens then. */
export interface Faults {
  /** every call of the API fails as if the service were down */
  outage: boolean
  /** every message is sent twice */
  duplicates: boolean
  /** messages are kept back until this is taken off */
  silent: boolean
}

/** A refusal in the service's own words and status. */
export class ServiceError extends Error {
  readonly status: number
  readonly type: string
  readonly code: string | undefined
  constructor(status: number, type: string, message: string, code?: string) {
    super(message)
    this.status = status
    this.type = type
    this.code = code
  }
}

export type Form = Readonly<Record<string, string>>

const DAY = 86_400
const seconds = () => Math.floor(Date.now() / 1000)
const newId = (prefix: string) => `${prefix}_${randomBytes(12).toString('hex')}`
const NO_FAULTS: Faults = { outage: false, duplicates: false, silent: false }

/** Keys such as `metadata[entry]` of a form, as an object. */
function group(form: Form, name: string): Record<string, string> {
  return Object.fromEntries(Object.entries(form).flatMap(([key, value]) => key.startsWith(`${name}[`) && key.indexOf(']') === key.length - 1 ? [[key.slice(name.length + 1, -1), value]] : []))
}

function amountOf(form: Form): number {
  const amount = Number(form['line_items[0][price_data][unit_amount]']) * Number(form['line_items[0][quantity]'] ?? '1')
  if (!Number.isSafeInteger(amount) || amount <= 0) throw new ServiceError(400, 'invalid_request_error', 'The amount is not a whole number of minor units above nothing.', 'parameter_invalid_integer')
  return amount
}

/**
 * The local stand-in of the payments service: what it keeps and does. It runs in the demo and in tests, and behaves as
 * the real one does towards our side, failures included.
 */
export class PaymentsService {
  readonly #store: Store
  readonly #pageBase: string
  /** Called for every message that is to be sent. */
  #send: (message: Record<string, unknown>) => void

  constructor(folder: string, pageBase: string, send: (message: Record<string, unknown>) => void) {
    this.#store = new Store(folder)
    this.#pageBase = pageBase
    this.#send = send
  }

  get store(): Store {
    return this.#store
  }

  faults(): Faults {
    return { ...NO_FAULTS, ...this.#store.read<Faults>('settings', 'faults') }
  }

  setFaults(faults: Partial<Faults>): Faults {
    const now = { ...this.faults(), ...faults }
    this.#store.write('settings', 'faults', now)
    return now
  }

  /** Answers a repetition under the same key as it answered first; refuses the key for something else. */
  once<T>(key: string | undefined, what: string, form: Form, act: () => T): T {
    if (!key) return act()
    const id = createHash('sha256').update(key).digest('hex')
    const asked = createHash('sha256').update(JSON.stringify([what, form])).digest('hex')
    const earlier = this.#store.read<{ asked: string, answer: T }>('keys', id)
    if (earlier) {
      if (earlier.asked !== asked) throw new ServiceError(400, 'idempotency_error', 'The key was used before for something else.')
      return earlier.answer
    }
    const answer = act()
    this.#store.write('keys', id, { asked, answer })
    return answer
  }

  createSession(form: Form): Session {
    for (const needed of ['success_url', 'line_items[0][price_data][currency]']) {
      if (!form[needed]) throw new ServiceError(400, 'invalid_request_error', `${needed} is missing.`, 'parameter_missing')
    }
    const id = newId('cs_test')
    const session: Session = {
      id,
      object: 'checkout.session',
      mode: 'payment',
      status: 'open',
      payment_status: 'unpaid',
      payment_intent: null,
      client_reference_id: form.client_reference_id ?? null,
      customer_email: form.customer_email ?? null,
      amount_total: amountOf(form),
      currency: form['line_items[0][price_data][currency]']!.toLowerCase(),
      metadata: group(form, 'metadata'),
      title: form['line_items[0][price_data][product_data][name]'] ?? '',
      success_url: form.success_url!,
      cancel_url: form.cancel_url ?? form.success_url!,
      url: `${this.#pageBase}/${id}`,
      created: seconds(),
      expires_at: seconds() + DAY,
    }
    this.#store.write('sessions', id, session)
    return session
  }

  session(id: string): Session {
    const session = this.#store.read<Session>('sessions', id)
    if (!session) throw new ServiceError(404, 'invalid_request_error', `There is no checkout session ${id}.`, 'resource_missing')
    if (session.status === 'open' && session.expires_at <= seconds()) return this.#expire(session)
    return session
  }

  expireSession(id: string): Session {
    const session = this.session(id)
    if (session.status !== 'open') throw new ServiceError(400, 'invalid_request_error', `The session is ${session.status}, not open.`)
    return this.#expire(session)
  }

  #expire(session: Session): Session {
    const expired: Session = { ...session, status: 'expired', url: null }
    this.#store.write('sessions', session.id, expired)
    this.#tell('checkout.session.expired', expired)
    return expired
  }

  /** The card was taken. */
  pay(id: string): Session {
    const session = this.session(id)
    if (session.status !== 'open') return session
    const paid: Session = { ...session, status: 'complete', payment_status: 'paid', payment_intent: newId('pi'), url: null }
    this.#store.write('intents', paid.payment_intent!, { id: paid.payment_intent, amount: paid.amount_total, currency: paid.currency, refunded: 0 })
    this.#store.write('sessions', id, paid)
    this.#tell('checkout.session.completed', paid)
    return paid
  }

  /** The card was refused; the page stays open. */
  decline(id: string): Session {
    const session = this.session(id)
    if (session.status === 'open') {
      this.#tell('payment_intent.payment_failed', {
        id: newId('pi'), object: 'payment_intent', amount: session.amount_total, currency: session.currency, metadata: session.metadata, status: 'requires_payment_method',
        last_payment_error: { type: 'card_error', code: 'card_declined', message: 'The card was declined.' },
      })
    }
    return session
  }

  refund(form: Form): Refund {
    const id = form.payment_intent ?? ''
    const intent = this.#store.read<{ amount: number, currency: string, refunded: number }>('intents', id)
    if (!intent) throw new ServiceError(404, 'invalid_request_error', `There is no payment ${id}.`, 'resource_missing')
    const amount = form.amount === undefined ? intent.amount - intent.refunded : Number(form.amount)
    if (intent.refunded >= intent.amount) throw new ServiceError(400, 'invalid_request_error', 'The charge was refunded before.', 'charge_already_refunded')
    if (!Number.isSafeInteger(amount) || amount <= 0 || amount > intent.amount - intent.refunded) {
      throw new ServiceError(400, 'invalid_request_error', 'More than what is left cannot be refunded.', 'amount_too_large')
    }
    const refund: Refund = {
      id: newId('re'), object: 'refund', amount, currency: intent.currency, payment_intent: id, status: 'succeeded', metadata: group(form, 'metadata'), created: seconds(),
    }
    this.#store.write('intents', id, { ...intent, refunded: intent.refunded + amount })
    this.#store.write('refunds', refund.id, refund)
    this.#tell('refund.created', refund)
    return refund
  }

  #tell(type: string, object: unknown): void {
    const message = { id: newId('evt'), object: 'event', type, api_version: null, created: seconds(), livemode: false, data: { object } }
    this.#store.write('messages', message.id, { message, sentAt: null, tries: 0 })
    this.#send(message)
  }
}
