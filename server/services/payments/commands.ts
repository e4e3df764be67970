import type { PaymentCommandsRow } from '../../../db/tables'
import { inTransaction } from '../../../db/transaction'
import { sqlTime } from '../../../db/time'
import { DomainError, isDomainError } from '../../../shared/errors'
import type { Registry } from '../../composition'
import { PaymentRefusal, type Payments } from '../../payments/provider'
import { findClassById } from '../../repositories/catalogue'
import { lockEntryById } from '../../repositories/entries'
import { claimDue, giveBack, putBack, settle, type Lease } from '../../repositories/leases'
import * as payments from '../../repositories/payments'
import { findById } from '../../repositories/users'
import { backoff } from '../jobs/backoff'
import { momentOf } from '../moment'
import { t } from '../texts/translate'
import { noteRefund } from './ledger'
import { cancelCheckout } from './refund'

const LEASE_MS = 30_000
const BATCH = 10

export type CommandOutcome = 'done' | 'waits' | 'refused'

/**
 * Does what of the outbox of provider calls is due: pages to open, pages to close, money to give back.
 *
 * @returns whether something was done
 */
export async function runPaymentCommands(registry: Registry, stop?: AbortSignal): Promise<boolean> {
  if (!registry.payments) return false
  const leases = await claimDue(registry.db, 'payment_commands', registry.clock.now(), LEASE_MS, BATCH)
  let away = false
  for (const lease of leases) {
    if (stop?.aborted || away) await giveBack(registry.db, lease, registry.clock.now())
    else away = await performCommand(registry, lease) === 'waits'
  }
  return leases.length > 0 && !away
}

/** Does one claimed command; safe to repeat, since the provider keeps its key and our rows are unique. */
export async function performCommand(registry: Registry, lease: Lease): Promise<CommandOutcome> {
  const { db, clock, log } = registry
  const command = await payments.findCommand(db, lease.id)
  if (!command || command.state !== 'waiting') return 'done'
  try {
    await carryOut(registry, registry.payments!, command)
    await settle(db, lease, { state: 'done', done_at: sqlTime(clock.now()), claimed_until: null, last_error: null })
    return 'done'
  }
  catch (error) {
    const message = error instanceof Error ? error.message : String(error)
    if (error instanceof PaymentRefusal) {
      log.error({ err: error, command: command.id, kind: command.kind }, 'the payments service refused a command')
      await refused(registry, lease, command, message)
      return 'refused'
    }
    if (!isDomainError(error) || error.code !== 'payments_away') log.error({ err: error, command: command.id }, 'a payment command failed')
    const now = clock.now()
    await putBack(db, lease, new Date(now.getTime() + backoff(lease.attempt)), message)
    return 'waits'
  }
}

/** The office sees a refusal; a page that could not be opened is not left hanging. */
async function refused(registry: Registry, lease: Lease, command: PaymentCommandsRow, message: string): Promise<void> {
  await settle(registry.db, lease, { state: 'failed', claimed_until: null, last_error: message.slice(0, 1000) })
  if (command.kind !== 'create_checkout' || command.checkout_id === null) return
  await payments.endCheckout(registry.db as never, command.checkout_id, 'failed', sqlTime(registry.clock.now()))
}

async function carryOut(registry: Registry, provider: Payments, command: PaymentCommandsRow): Promise<void> {
  switch (command.kind) {
    case 'create_checkout': return createPage(registry, provider, command)
    case 'expire_checkout': return closePage(registry, provider, command)
    case 'refund': return giveMoneyBack(registry, provider, command)
    default: throw new PaymentRefusal('unknown_command', `there is no payment command ${command.kind}`)
  }
}

async function createPage(registry: Registry, provider: Payments, command: PaymentCommandsRow): Promise<void> {
  const { db, config } = registry
  const checkout = await payments.findCheckoutById(db, command.checkout_id!)
  if (!checkout || checkout.state !== 'open' || checkout.provider_id !== null) return
  const entry = await db('entries').where({ id: checkout.entry_id }).first('uid', 'class_id')
  const category = await findClassById(db, entry!.class_id)
  const payer = await findById(db, checkout.user_id)
  const back = `${config.publicUrl}/desk/entries/${entry!.uid}`
  const page = await provider.createCheckout({
    uid: checkout.uid,
    entryUid: entry!.uid,
    amountMinor: checkout.amount_minor,
    currency: checkout.currency,
    title: t(payer?.locale, 'payments.lineTitle', { category: t(payer?.locale, `animals.classes.${category!.code}`) }),
    email: payer!.email,
    successUrl: `${back}?payment=done`,
    cancelUrl: `${back}?payment=left`,
  }, command.idempotency_key)
  const moment = await momentOf(registry)
  await inTransaction(db, async (trx) => {
    await lockEntryById(trx, checkout.entry_id)
    if (await payments.openCheckout(trx, checkout.id, { provider_id: page.id, url: page.url })) return
    // It was given up while the service made the page: the page must not stay open.
    await trx('checkouts').where({ id: checkout.id }).whereNull('provider_id').update({ provider_id: page.id })
    if (!await payments.findCommandByKey(trx, `expire-${checkout.uid}`)) await cancelCheckout(trx, checkout, moment)
  })
}

async function closePage({ db }: Registry, provider: Payments, command: PaymentCommandsRow): Promise<void> {
  const checkout = await payments.findCheckoutById(db, command.checkout_id!)
  if (!checkout?.provider_id) return
  try {
    await provider.expireCheckout(checkout.provider_id, command.idempotency_key)
  }
  catch (error) {
    // Paid or closed meanwhile: what came of it comes by message.
    if (!(error instanceof PaymentRefusal)) throw error
  }
}

async function askBack(provider: Payments, refund: Parameters<Payments['refund']>[0], key: string) {
  try {
    return await provider.refund(refund, key)
  }
  catch (error) {
    if (error instanceof PaymentRefusal && error.code === 'charge_already_refunded') return null
    throw error
  }
}

async function giveMoneyBack(registry: Registry, provider: Payments, command: PaymentCommandsRow): Promise<void> {
  const { charge, amount, reason } = JSON.parse(command.payload) as { charge: string, amount: number, reason: string }
  const entry = await registry.db('entries').where({ id: command.entry_id }).first('uid')
  if (!entry) throw new DomainError('internal', { logLine: `no entry ${command.entry_id}` })
  const refund = await askBack(provider, { charge, amountMinor: amount, entryUid: entry.uid }, command.idempotency_key)
  // Given back before, so that the provider's own message books it.
  if (!refund) return
  if (refund.status === 'failed' || refund.status === 'canceled') throw new PaymentRefusal('refund_failed', `the refund ${refund.id} ${refund.status}`)
  const moment = await momentOf(registry)
  await inTransaction(registry.db, trx => noteRefund(trx, command.entry_id, { providerId: refund.id, amountMinor: refund.amountMinor, currency: refund.currency, checkoutId: command.checkout_id, reason }, moment))
}
