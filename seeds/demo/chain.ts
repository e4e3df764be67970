import type { Knex } from 'knex'
import type { State } from '#shared/domain/workflow/states'
import { sqlTime } from '../../db/time'
import { type ChainedEvent, commitmentTo, eventHash } from '../../server/services/events/hash'
import { nextId } from '../bulk'
import type { Random } from './random'
import type { Rows } from './rows'

/** Something that happened to an entry. */
export interface DemoEvent {
  readonly kind: string
  readonly from: State | null
  readonly to: State
  readonly at: Date
  readonly by: { readonly userId: number, readonly uid: string } | null
  readonly args?: Readonly<Record<string, string | number | boolean | null>>
  readonly texts?: Readonly<Record<string, string>>
}

/** Writes whole chains of events, hashed as the services hash them. */
export class Chains {
  private constructor(private next: number, private readonly random: Random) {}

  static async begin(db: Knex, random: Random): Promise<Chains> {
    return new Chains(await nextId(db, 'entry_events'), random)
  }

  /** @param end the last event of the entry so far; null for one that has none */
  add(rows: Rows, entry: { readonly id: number, readonly uid: string }, events: readonly DemoEvent[], end: { readonly seq: number, readonly hash: string } | null = null): void {
    let prev = end?.hash ?? null
    for (const [place, event] of events.entries()) {
      const texts = Object.entries(event.texts ?? {}).map(([field, body]) => ({ field, salt: Buffer.from(this.random.bytes(16)).toString('hex'), body }))
      const chained: ChainedEvent = {
        entry: entry.uid,
        seq: (end?.seq ?? 0) + place + 1,
        at: event.at.toISOString(),
        kind: event.kind,
        from: event.from,
        to: event.to,
        actor: event.by?.uid ?? null,
        args: event.args ?? {},
        commitments: Object.fromEntries(texts.map(({ field, salt, body }) => [field, commitmentTo(salt, body)])),
        prev,
      }
      const hash = eventHash(chained)
      const id = this.next++
      rows.add('entry_events', {
        id,
        entry_id: entry.id,
        seq: chained.seq,
        at: sqlTime(event.at),
        kind: event.kind,
        from_state: event.from,
        to_state: event.to,
        actor_user_id: event.by?.userId ?? null,
        args: JSON.stringify(chained.args),
        commitments: JSON.stringify(chained.commitments),
        prev_hash: prev,
        hash,
      })
      for (const text of texts) rows.add('event_texts', { event_id: id, ...text })
      prev = hash
    }
  }
}
