import { createHash } from 'node:crypto'
import { canonicalBytes, canonicalText, type Json } from '#shared/domain/canonical'
import type { EntryEventsInsert, EventTextsInsert } from '../../../db/tables'
import { sqlTime } from '../../../db/time'

/** What happened to an entry, before it has its place in the chain. */
export interface NewEvent {
  readonly entryId: number
  /** entries.uid: the hash is over what leaves the house, not over row numbers */
  readonly entryUid: string
  /** code of the transition, or of what else happened */
  readonly kind: string
  readonly fromState: string | null
  readonly toState: string | null
  readonly at: Date
  readonly actor: { readonly userId: number, readonly uid: string } | null
  /** ids, codes and figures only; never a name or a text that somebody wrote */
  readonly args: { readonly [name: string]: Json }
  /** names and texts, kept outside the hash so that they can be erased */
  readonly texts: Readonly<Record<string, string>>
}

export interface ChainEnd {
  readonly seq: number
  readonly hash: string
}

/** What of a stored event its hash is made over. */
export interface HashedEvent {
  readonly entry: string
  readonly seq: number
  /** ISO 8601 in UTC with milliseconds */
  readonly at: string
  readonly kind: string
  readonly from: string | null
  readonly to: string | null
  readonly actor: string | null
  readonly args: Json
  readonly commitments: Json
  readonly prev: string | null
}

const sha256 = (data: Uint8Array | string) => createHash('sha256').update(data).digest('hex')

/** SHA-256 over the canonical bytes (RFC 8785) of the event with the hash of the one before it. */
export function eventHash(event: HashedEvent): string {
  return sha256(canonicalBytes({ ...event }))
}

/** Binds an event to a text without holding it: SHA-256 over the salt and the text. */
export function commitment(salt: string, body: string): string {
  return sha256(`${salt}\n${body}`)
}

export interface ChainedEvent {
  readonly row: EntryEventsInsert
  /** still without the event's row number */
  readonly texts: readonly Omit<EventTextsInsert, 'event_id'>[]
  readonly end: ChainEnd
}

/**
 * Puts an event at the end of its entry's chain.
 *
 * @param salts sixteen random bytes at each call
 */
export function chainEvent(event: NewEvent, end: ChainEnd | null, salts: () => Uint8Array): ChainedEvent {
  const seq = (end?.seq ?? 0) + 1
  const texts = Object.entries(event.texts).map(([field, body]) => ({ field, salt: Buffer.from(salts()).toString('hex'), body }))
  const commitments = Object.fromEntries(texts.map(({ field, salt, body }) => [field, commitment(salt, body)]))
  const prev = end?.hash ?? null
  const hash = eventHash({
    entry: event.entryUid, seq, at: event.at.toISOString(), kind: event.kind, from: event.fromState, to: event.toState,
    actor: event.actor?.uid ?? null, args: event.args, commitments, prev,
  })
  const row: EntryEventsInsert = {
    entry_id: event.entryId,
    seq,
    at: sqlTime(event.at),
    kind: event.kind,
    from_state: event.fromState,
    to_state: event.toState,
    actor_user_id: event.actor?.userId ?? null,
    args: canonicalText(event.args),
    commitments: canonicalText(commitments),
    prev_hash: prev,
    hash,
  }
  return { row, texts, end: { seq, hash } }
}
