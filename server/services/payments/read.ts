import type { ActiveActor } from '../../../shared/domain/access/roles'
import { canReadEntry, isOwner } from '../../../shared/domain/access/abilities'
import { hasAnyRole } from '../../../shared/domain/access/roles'
import { DomainError } from '../../../shared/errors'
import { isoTime } from '../../../db/time'
import type { Registry } from '../../composition'
import { findEntry } from '../../repositories/entries'
import * as payments from '../../repositories/payments'
import { assertSees } from '../entries/sees'
import { accessOf } from '../entries/access'
import { momentOf } from '../moment'
import { PAYABLE_STATES } from './checkout'
import { feeStanding } from './feeStanding'

/** The money of an entry, as the entrant and the office see it. Amounts are integer minor units. */
export interface EntryMoney {
  readonly currency: string | null
  readonly dueMinor: number
  readonly settledMinor: number
  readonly openMinor: number
  readonly waived: boolean
  /** whether the viewer can pay now: online, only at the office, or not at all */
  readonly pay: 'online' | 'office' | null
  /** a page of the payments service that was opened and not finished */
  readonly openPage: { readonly url: string | null, readonly since: string } | null
  /** money that is on its way back */
  readonly refundingMinor: number
  readonly lines: readonly { readonly id: string, readonly kind: string, readonly amountMinor: number, readonly currency: string, readonly at: string, readonly reason: string | null }[]
  readonly lastTry: 'failed' | 'expired' | 'cancelled' | null
}

/**
 * What is owed and what was paid. The entrant sees their own; office and registrar see it where they may read the entry.
 *
 * @throws DomainError `not_found` for everybody else, `stake`
 */
export async function readMoney(registry: Registry, actor: ActiveActor, entryUid: string): Promise<EntryMoney> {
  const { db } = registry
  const entry = await findEntry(db, entryUid)
  const access = entry && await accessOf(db, entry)
  const own = access !== undefined && isOwner(actor, access)
  if (!entry || !access || !(own || (hasAnyRole(actor, ['reviewer', 'registrar']) && canReadEntry(actor, access)))) throw new DomainError('not_found')
  if (!own) await assertSees(db, actor, entry)
  const { today } = await momentOf(registry)
  const fee = await feeStanding(db, entry, today)
  const checkouts = await payments.listCheckouts(db, entry.id)
  const open = checkouts.find(checkout => checkout.state === 'open')
  const refunding = (await payments.listUnfinishedCommands(db, entry.id)).filter(command => command.kind === 'refund')
  const last = checkouts.at(-1)?.state
  const payable = fee.open > 0 && own && PAYABLE_STATES.includes(entry.state)
  return {
    currency: fee.currency,
    dueMinor: fee.due,
    settledMinor: fee.settled,
    openMinor: fee.open,
    waived: fee.waived,
    pay: !payable ? null : registry.payments ? 'online' : 'office',
    openPage: own && open ? { url: open.url, since: isoTime(open.created_at) } : null,
    refundingMinor: refunding.reduce((sum, command) => sum + Number((JSON.parse(command.payload) as { amount: number }).amount), 0),
    lines: (await payments.listLedger(db, entry.id)).map(row => ({
      id: row.uid, kind: row.kind, amountMinor: row.amount_minor, currency: row.currency, at: isoTime(row.at),
      // Why the office waived or booked is for the entrant too; the provider's own reasons are codes.
      reason: row.by_user_id === null ? null : row.reason,
    })),
    lastTry: last === 'failed' || last === 'expired' || last === 'cancelled' ? last : null,
  }
}
