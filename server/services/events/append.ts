import { randomBytes } from 'node:crypto'
import type { Knex } from 'knex'
import type { Json } from '../../../shared/domain/canonical'
import { findLastEvent, insertEvent } from '../../repositories/events'
import { chainEvent } from '../entries/eventChain'
import type { Moment } from '../moment'

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
  const texts = Object.fromEntries(Object.entries(event.texts ?? {}).filter((pair): pair is [string, string] => typeof pair[1] === 'string' && pair[1] !== ''))
  const chained = chainEvent({
    entryId: entry.id, entryUid: entry.uid, kind: event.kind, fromState: event.from ?? null, toState: event.to ?? null,
    at: moment.now, actor: event.actor, args: event.args ?? {}, texts,
  }, await findLastEvent(trx, entry.id) ?? null, () => randomBytes(16))
  await insertEvent(trx, chained.row, chained.texts)
}
