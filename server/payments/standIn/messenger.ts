import Stripe from 'stripe'
import type { PaymentsService } from './service'

interface Kept { message: { id: string }, sentAt: number | null, tries: number }

const FIRST_MS = 1_000
const LONGEST_MS = 60_000
const MOST_TRIES = 40

/** Sends the stand-in's messages, signed as the real service signs, again and again until our side thanks for them. */
export class Messenger {
  readonly #url: string
  readonly #secret: string
  readonly #running = new Set<string>()
  #closed = false
  #service: PaymentsService | undefined

  constructor(url: string, secret: string) {
    this.#url = url
    this.#secret = secret
  }

  /** Takes up what was not delivered before a restart. */
  attach(service: PaymentsService): void {
    this.#service = service
    this.resume()
  }

  resume(): void {
    for (const { message, sentAt } of this.#service!.store.list<Kept>('messages')) if (sentAt === null) this.send(message)
  }

  close(): void {
    this.#closed = true
  }

  send(message: Record<string, unknown> | { id: string }): void {
    const { id } = message as { id: string }
    if (this.#running.has(id)) return
    this.#running.add(id)
    void this.#deliver(id).finally(() => this.#running.delete(id))
  }

  async #deliver(id: string): Promise<void> {
    const { store } = this.#service!
    for (let tries = 0; tries < MOST_TRIES && !this.#closed; tries++) {
      const kept = store.read<Kept>('messages', id)
      if (!kept || this.#service!.faults().silent) return
      if (await this.#post(kept.message)) {
        if (this.#service!.faults().duplicates) await this.#post(kept.message)
        store.write('messages', id, { ...kept, sentAt: Date.now(), tries: tries + 1 })
        return
      }
      await new Promise((resolve) => { setTimeout(resolve, Math.min(LONGEST_MS, FIRST_MS * 2 ** tries)).unref() })
    }
  }

  async #post(message: unknown): Promise<boolean> {
    const payload = JSON.stringify(message)
    const signature = Stripe.webhooks.generateTestHeaderString({ payload, secret: this.#secret })
    try {
      const answer = await fetch(this.#url, {
        method: 'POST', body: payload, headers: { 'content-type': 'application/json', 'stripe-signature': signature }, signal: AbortSignal.timeout(10_000),
      })
      return answer.ok
    }
    catch {
      return false
    }
  }
}
