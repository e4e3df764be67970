import type { Knex } from 'knex'
import type { Json } from '../../../shared/domain/canonical'
import { findLastEvent, insertEvent } from '../../repositories/events'
import type { Moment } from '../moment'
import { commitmentTo, eventHash, newSalt } from './hash'

export interface EventToAppend {
  /** transition, or the name of an act that does not move the entry */
  readonly kind: string
  readonly from?: string | null
  readonly to?: string | null
  readonly actor: { readonly userId: number, readonly uid: string } | null
  /** ids, codes and figures; never a name or a sentence of a person */
  readonly args?: { readonly [name: string]: Json }
  /** what people wrote: kept apart, bound by salted commitments */
  readonly texts?: Readonly<Record<string, string | null | undefined>>
}

/**
 * Writes the next event of an entry into its chain. Nothing else writes events. The caller's transaction holds the lock of the
 * entry row, so that no two events ever take one number.
 */
export async function appendEvent(trx: Knex.Transaction, entry: { readonly id: number, readonly uid: string }, event: EventToAppend, moment: Moment): Promise<void> {
  const before = await findLastEvent(trx, entry.id)
  const texts = Object.entries(event.texts ?? {})
    .filter((pair): pair is [string, string] => typeof pair[1] === 'string' && pair[1] !== '')
    .map(([field, body]) => ({ field, salt: newSalt(), body }))
  const commitments = Object.fromEntries(texts.map(text => [text.field, commitmentTo(text.salt, text.body)]))
  const seq = (before?.seq ?? 0) + 1
  const args = event.args ?? {}
  const hash = eventHash({
    entry: entry.uid, seq, at: moment.now.toISOString(), kind: event.kind, from: event.from ?? null, to: event.to ?? null,
    actor: event.actor?.uid ?? null, args, commitments, prev: before?.hash ?? null,
  })
  await insertEvent(trx, {
    entry_id: entry.id, seq, at: moment.at, kind: event.kind, from_state: event.from ?? null, to_state: event.to ?? null,
    actor_user_id: event.actor?.userId ?? null, args: JSON.stringify(args), commitments: JSON.stringify(commitments),
    prev_hash: before?.hash ?? null, hash,
  }, texts)
}
