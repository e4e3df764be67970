import type { ActiveActor } from '../../../shared/domain/access/roles'
import { isOwner } from '../../../shared/domain/access/abilities'
import type { State } from '../../../shared/domain/workflow/states'
import { DomainError } from '../../../shared/errors'
import { parseSqlTime, sqlTime } from '../../../db/time'
import { inTransaction } from '../../../db/transaction'
import type { Registry } from '../../composition'
import { lockEntry } from '../../repositories/entries'
import * as payments from '../../repositories/payments'
import { accessOf } from '../entries/access'
import { momentOf, newUid } from '../moment'
import { performCommand } from './commands'
import { feeStanding } from './feeStanding'
import { cancelCheckout } from './refund'

/** States in which a fee can be paid: an entry that has ended owes nothing. */
export const PAYABLE_STATES: readonly State[] = ['draft', 'measuring', 'certified', 'in_review', 'returned']

/** How long the person who waits may keep the command before the worker takes it over. */
const CLAIM_MS = 20_000
/** A provider's page closes by itself after a day; ours is taken for closed a little before. */
const PAGE_OPEN_MS = 23 * 3_600_000

export interface CheckoutPage {
  readonly id: string
  readonly url: string
  readonly amountMinor: number
  readonly currency: string
}

/**
 * Opens a page of the payments service for what is still owed, or gives the one that is open already. The wish is
 * stored before the service is asked, so that nothing is charged that we do not know of.
 *
 * @throws DomainError `not_found`, `forbidden`, `not_configured`, `wrong_state`, `nothing_due`, `payments_away` (the
 * worker goes on trying, and so can the person)
 */
export async function beginCheckout(registry: Registry, actor: ActiveActor, entryUid: string): Promise<CheckoutPage> {
  if (!registry.payments) throw new DomainError('not_configured')
  const moment = await momentOf(registry)
  const until = sqlTime(new Date(moment.now.getTime() + CLAIM_MS))
  const { checkoutId, commandId } = await inTransaction(registry.db, async (trx) => {
    const entry = await lockEntry(trx, entryUid)
    if (!entry || !isOwner(actor, await accessOf(trx, entry))) throw new DomainError('not_found')
    if (!PAYABLE_STATES.includes(entry.state)) throw new DomainError('wrong_state')
    const fee = await feeStanding(trx, entry, moment.today)
    if (fee.version === null || fee.currency === null || fee.open === 0) throw new DomainError('nothing_due')
    const open = await payments.findOpenCheckout(trx, entry.id)
    const stillGood = open && open.amount_minor === fee.open && moment.now.getTime() - parseSqlTime(open.created_at).getTime() < PAGE_OPEN_MS
    if (open && stillGood) {
      const command = await payments.findCommandByKey(trx, `checkout-${open.uid}`)
      const claimed = open.url === null && command && await payments.claimCommand(trx, command.id, moment.at, until)
      return { checkoutId: open.id, commandId: claimed ? command.id : null }
    }
    if (open) await cancelCheckout(trx, open, moment)
    await payments.pinFeeVersion(trx, entry.id, fee.version)
    const uid = newUid(moment.now)
    const checkoutId = await payments.insertCheckout(trx, {
      uid, entry_id: entry.id, user_id: actor.userId, amount_minor: fee.open, currency: fee.currency, fee_version: fee.version,
      created_at: moment.at, expires_at: sqlTime(new Date(moment.now.getTime() + PAGE_OPEN_MS)),
    })
    const commandId = await payments.insertCommand(trx, {
      kind: 'create_checkout', idempotency_key: `checkout-${uid}`, entry_id: entry.id, checkout_id: checkoutId, payload: '{}',
      attempts: 1, run_at: until, claimed_until: until, created_at: moment.at,
    })
    return { checkoutId, commandId }
  })
  if (commandId !== null) {
    const command = await payments.findCommand(registry.db, commandId)
    const outcome = await performCommand(registry, { table: 'payment_commands', id: commandId, claimedUntil: until, attempt: command!.attempts })
    if (outcome === 'refused') throw new DomainError('internal', { logLine: `checkout ${checkoutId} was refused by the payments service` })
  }
  const checkout = (await payments.findCheckoutById(registry.db, checkoutId))!
  if (checkout.state !== 'open' || checkout.url === null) throw new DomainError('payments_away')
  return { id: checkout.uid, url: checkout.url, amountMinor: checkout.amount_minor, currency: checkout.currency }
}
