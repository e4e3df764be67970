import type { Knex } from 'knex'
import type { CheckoutsInsert, CheckoutsRow, LedgerInsert, LedgerRow, PaymentCommandsInsert, PaymentCommandsRow, PaymentEventsInsert } from '../../db/tables'

export async function insertCheckout(trx: Knex, row: CheckoutsInsert): Promise<number> {
  const [id] = await trx('checkouts').insert(row)
  return id!
}

/** The checkout of an entry that is open; there is one at most. */
export async function findOpenCheckout(db: Knex, entryId: number): Promise<CheckoutsRow | undefined> {
  return db('checkouts').where({ entry_id: entryId, state: 'open' }).first()
}

export async function findCheckoutById(db: Knex, id: number): Promise<CheckoutsRow | undefined> {
  return db('checkouts').where({ id }).first()
}

export async function findCheckoutByUid(db: Knex, uid: string): Promise<CheckoutsRow | undefined> {
  return db('checkouts').where({ uid }).first()
}

export async function findCheckoutByProvider(db: Knex, providerId: string): Promise<CheckoutsRow | undefined> {
  return db('checkouts').where({ provider_id: providerId }).first()
}

export async function listCheckouts(db: Knex, entryId: number): Promise<CheckoutsRow[]> {
  return db('checkouts').where({ entry_id: entryId }).orderBy('created_at').orderBy('id')
}

/** Keeps what the provider called a checkout and where it is paid, unless it ended meanwhile. */
export async function openCheckout(trx: Knex, id: number, at: { provider_id: string, url: string }): Promise<boolean> {
  return await trx('checkouts').where({ id, state: 'open' }).update(at) === 1
}

export async function endCheckout(trx: Knex, id: number, state: 'paid' | 'failed' | 'expired' | 'cancelled', at: string): Promise<boolean> {
  return await trx('checkouts').where({ id, state: 'open' }).update({ state, finished_at: at }) === 1
}

/** Money that came for a checkout counts even when it had ended before. */
export async function payCheckout(trx: Knex, id: number, providerId: string, at: string): Promise<void> {
  await trx('checkouts').where({ id }).update({ state: 'paid', provider_id: providerId, finished_at: at })
}

export async function listLedger(db: Knex, entryId: number): Promise<LedgerRow[]> {
  return db('ledger').where({ entry_id: entryId }).orderBy('at').orderBy('id')
}

export async function findLedgerByProvider(db: Knex, providerId: string): Promise<LedgerRow | undefined> {
  return db('ledger').where({ provider_id: providerId }).first()
}

export async function insertLedger(trx: Knex, row: LedgerInsert): Promise<void> {
  await trx('ledger').insert(row)
}

export async function insertCommand(trx: Knex, row: PaymentCommandsInsert): Promise<number> {
  const [id] = await trx('payment_commands').insert(row)
  return id!
}

export async function findCommand(db: Knex, id: number): Promise<PaymentCommandsRow | undefined> {
  return db('payment_commands').where({ id }).first()
}

export async function findCommandByKey(db: Knex, key: string): Promise<PaymentCommandsRow | undefined> {
  return db('payment_commands').where({ idempotency_key: key }).first()
}

/** Commands of an entry that have not ended well; those that failed wait for the office. */
export async function listUnfinishedCommands(db: Knex, entryId: number): Promise<PaymentCommandsRow[]> {
  return db('payment_commands').where({ entry_id: entryId }).whereNot({ state: 'done' }).orderBy('id')
}

/** Takes over a waiting command for at most `until`, before the worker comes to it. False when somebody else has it. */
export async function claimCommand(trx: Knex, id: number, now: string, until: string): Promise<boolean> {
  return await trx('payment_commands').where({ id, state: 'waiting' })
    .where(free => free.whereNull('claimed_until').orWhere('claimed_until', '<=', now))
    .update({ run_at: until, claimed_until: until, attempts: trx.raw('attempts + 1') }) === 1
}

export async function findPaymentEvent(db: Knex, providerEventId: string): Promise<{ id: number } | undefined> {
  return db('payment_events').where({ provider_event_id: providerEventId }).first('id')
}

export async function insertPaymentEvent(trx: Knex, row: PaymentEventsInsert): Promise<void> {
  await trx('payment_events').insert(row)
}

/** Pins the version of the fees by which an entry is charged, once. */
export async function pinFeeVersion(trx: Knex, entryId: number, version: number): Promise<void> {
  await trx('entries').where({ id: entryId }).whereNull('fee_version').update({ fee_version: version })
}
