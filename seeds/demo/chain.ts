import type { Knex } from 'knex'
import type { State } from '#shared/domain/workflow/states'
import { chainEvent, type ChainEnd } from '../../server/services/entries/eventChain'
import { nextId } from '../bulk'
import type { Random } from './random'
import type { Row, Rows } from './rows'

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

  add(rows: Rows, entry: { readonly id: number, readonly uid: string }, events: readonly DemoEvent[]): void {
    let end: ChainEnd | null = null
    for (const { from, to, by, args, texts, ...event } of events) {
      const chained = chainEvent(
        { ...event, entryId: entry.id, entryUid: entry.uid, fromState: from, toState: to, actor: by, args: args ?? {}, texts: texts ?? {} },
        end, () => this.random.bytes(16),
      )
      end = chained.end
      const id = this.next++
      rows.add('entry_events', { id, ...chained.row } as Row<'entry_events'>)
      for (const text of chained.texts) rows.add('event_texts', { event_id: id, ...text } as Row<'event_texts'>)
    }
  }
}
