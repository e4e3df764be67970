import type { ActiveActor } from '../../../shared/domain/access/roles'
import { canReadEntry } from '../../../shared/domain/access/abilities'
import { stakesOf } from '../../../shared/domain/access/stakes'
import { DomainError } from '../../../shared/errors'
import { inTransaction } from '../../../db/transaction'
import type { Registry } from '../../composition'
import { lockEntry } from '../../repositories/entries'
import { listPeople } from '../../repositories/entryPeople'
import * as payments from '../../repositories/payments'
import { accessOf } from '../entries/access'
import { findKeys, loadStakes } from '../entries/context'
import { appendEvent } from '../events/append'
import { momentOf, newUid } from '../moment'
import { PAYABLE_STATES } from './checkout'
import { feeStanding } from './feeStanding'
import { cancelCheckout } from './refund'
import { tellOfMoney } from './tell'

export interface OfficeBooking {
  readonly kind: 'waiver' | 'office_payment' | 'refund'
  readonly reason: string
}

const EVENT = { waiver: 'fee_waived', office_payment: 'fee_booked', refund: 'fee_refunded' } as const

/**
 * The office waives a fee, books one that was paid by cheque or in cash, or books that such a payment was given back.
 * The amount follows from what is owed; nobody books for an animal of their own.
 *
 * @throws DomainError `not_found`, `stake`, `wrong_state`, `nothing_due`
 */
export async function bookByOffice(registry: Registry, actor: ActiveActor, entryUid: string, booking: OfficeBooking): Promise<void> {
  const moment = await momentOf(registry)
  await inTransaction(registry.db, async (trx) => {
    const entry = await lockEntry(trx, entryUid)
    if (!entry || !canReadEntry(actor, await accessOf(trx, entry))) throw new DomainError('not_found')
    const stakes = stakesOf(await loadStakes(trx, entry, await listPeople(trx, entry.id)), await findKeys(trx, actor.userId), 'review')
    if (stakes.length > 0) throw new DomainError('stake')
    const fee = await feeStanding(trx, entry, moment.today)
    const byOffice = (await payments.listLedger(trx, entry.id)).reduce((sum, row) =>
      sum + (row.kind === 'office_payment' ? row.amount_minor : row.kind === 'refund' && row.provider_id === null ? -row.amount_minor : 0), 0)
    if (booking.kind !== 'refund' && !PAYABLE_STATES.includes(entry.state)) throw new DomainError('wrong_state')
    const amount = booking.kind === 'refund' ? byOffice : fee.open
    if (amount <= 0 || fee.version === null || fee.currency === null) throw new DomainError('nothing_due')
    await payments.pinFeeVersion(trx, entry.id, fee.version)
    await payments.insertLedger(trx, {
      uid: newUid(moment.now), entry_id: entry.id, kind: booking.kind, amount_minor: amount, currency: fee.currency,
      by_user_id: actor.userId, reason: booking.reason, at: moment.at,
    })
    const open = booking.kind === 'refund' ? undefined : await payments.findOpenCheckout(trx, entry.id)
    if (open) await cancelCheckout(trx, open, moment)
    await appendEvent(trx, entry, { kind: EVENT[booking.kind], actor, args: { amount, currency: fee.currency }, texts: { reason: booking.reason } }, moment)
    if (booking.kind !== 'waiver') await tellOfMoney(trx, entry, booking.kind === 'refund' ? 'fee_refunded' : 'fee_paid', amount, fee.currency, moment)
  })
}
