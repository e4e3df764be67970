import { createHash, randomBytes } from 'node:crypto'
import type { Json } from '../../../shared/domain/canonical'
import { canonicalBytes } from '../../../shared/domain/canonical'

/** What of an event is chained. Ids, codes and commitments only: names and texts lie outside, so that they can be erased. */
export interface ChainedEvent {
  /** uid of the entry */
  readonly entry: string
  readonly seq: number
  /** ISO 8601 in UTC with milliseconds */
  readonly at: string
  readonly kind: string
  readonly from: string | null
  readonly to: string | null
  /** uid of the account that acted; null for the panel, the clock and the system */
  readonly actor: string | null
  readonly args: { readonly [name: string]: Json }
  /** salted commitments to the texts, by field */
  readonly commitments: { readonly [field: string]: string }
  /** hash of the event before it; null for the first */
  readonly prev: string | null
}

const FORM = 1

/** SHA-256, in hex, over the canonical bytes (RFC 8785) of an event. */
export function eventHash(event: ChainedEvent): string {
  return createHash('sha256').update(canonicalBytes({ form: FORM, ...event })).digest('hex')
}

/** A new salt: 16 random bytes in hex. */
export function newSalt(): string {
  return randomBytes(16).toString('hex')
}

/** What binds an event to a text without saying it: SHA-256, in hex, over the salt's bytes and the text in UTF-8. */
export function commitmentTo(salt: string, text: string): string {
  return createHash('sha256').update(Buffer.from(salt, 'hex')).update(text, 'utf8').digest('hex')
}

export interface StoredEvent extends ChainedEvent {
  readonly hash: string
  readonly texts: readonly { readonly field: string, readonly salt: string, readonly body: string | null }[]
}

/**
 * What is wrong with a chain of events of one entry, in order; empty when it is whole. A text that was erased is not a fault.
 */
export function chainFaults(events: readonly StoredEvent[]): { seq: number, fault: 'seq' | 'prev' | 'hash' | 'text' }[] {
  return events.flatMap((event, place) => {
    const before = events[place - 1]
    const faults: { seq: number, fault: 'seq' | 'prev' | 'hash' | 'text' }[] = []
    if (event.seq !== place + 1) faults.push({ seq: event.seq, fault: 'seq' })
    if (event.prev !== (before?.hash ?? null)) faults.push({ seq: event.seq, fault: 'prev' })
    const { hash, texts, ...chained } = event
    if (eventHash(chained) !== hash) faults.push({ seq: event.seq, fault: 'hash' })
    const broken = texts.some(text => text.body !== null && event.commitments[text.field] !== commitmentTo(text.salt, text.body))
    if (broken) faults.push({ seq: event.seq, fault: 'text' })
    return faults
  })
}
