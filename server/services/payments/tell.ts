import type { Knex } from 'knex'
import type { EntriesRow } from '../../../db/tables'
import { listAddressees } from '../../repositories/addressees'
import type { Moment } from '../moment'
import { queueNotice } from '../notices/queue'
import { formatMoney } from './money'

/** Tells the entrant about money that came or went back: a receipt, so also to whoever caused it. */
export async function tellOfMoney(trx: Knex.Transaction, entry: EntriesRow, template: 'fee_paid' | 'fee_refunded', amountMinor: number, currency: string, moment: Moment): Promise<void> {
  if (entry.owner_user_id === null) return
  for (const person of await listAddressees(trx, [entry.owner_user_id])) {
    await queueNotice(trx, moment.now, {
      template, toEmail: person.email, userId: person.id, entryId: entry.id, locale: person.locale,
      args: { amount: formatMoney(person.locale, amountMinor, currency) },
    })
  }
}
