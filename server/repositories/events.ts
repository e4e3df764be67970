import type { Knex } from 'knex'
import type { EntryEventsInsert, EntryEventsRow, EventTextsInsert } from '../../db/tables'

export interface LastEvent { readonly seq: number, readonly hash: string }

/** The newest event of an entry. The caller holds the entry's lock. */
export async function findLastEvent(trx: Knex, entryId: number): Promise<LastEvent | undefined> {
  return trx('entry_events').where({ entry_id: entryId }).orderBy('seq', 'desc').first('seq', 'hash')
}

export async function insertEvent(trx: Knex, row: EntryEventsInsert, texts: readonly Omit<EventTextsInsert, 'event_id'>[]): Promise<number> {
  const [id] = await trx('entry_events').insert(row)
  if (texts.length > 0) await trx('event_texts').insert(texts.map(text => ({ event_id: id!, ...text })))
  return id!
}

export type EventRow = EntryEventsRow & { readonly actor_uid: string | null, readonly actor_name: string | null }

/** Events of an entry, oldest first, with the uid and name of whoever acted. */
export async function listEvents(db: Knex, entryId: number): Promise<EventRow[]> {
  return db('entry_events as e').leftJoin('users as u', 'u.id', 'e.actor_user_id')
    .where('e.entry_id', entryId).orderBy('e.seq').select('e.*', 'u.uid as actor_uid', 'u.name as actor_name')
}

export interface EventText { readonly event_id: number, readonly field: string, readonly salt: string, readonly body: string | null }

export async function listEventTexts(db: Knex, entryId: number): Promise<EventText[]> {
  return db('event_texts as t').join('entry_events as e', 'e.id', 't.event_id').where('e.entry_id', entryId)
    .select('t.event_id', 't.field', 't.salt', 't.body')
}

/** Accounts that asked for a second measuring since an instant. */
export async function countAskers(db: Knex, entryId: number, kind: string, since: string): Promise<number> {
  const row = await db('entry_events').where({ entry_id: entryId, kind }).where('at', '>=', since).countDistinct({ n: 'actor_user_id' }).first() as { n: number } | undefined
  return Number(row?.n ?? 0)
}

/** Accounts that acted on an entry while it lay in a state, before it last went from one state to another. */
export async function listActorsFrom(db: Knex, entryId: number, state: string, before: { from: string, to: string }): Promise<number[]> {
  const last = await db('entry_events').where({ entry_id: entryId, from_state: before.from, to_state: before.to }).max({ seq: 'seq' }).first() as { seq: number | null } | undefined
  const ids: (number | null)[] = await db('entry_events').where({ entry_id: entryId, from_state: state }).where('seq', '<', last?.seq ?? 0).distinct().pluck('actor_user_id')
  return ids.filter(id => id !== null)
}

/** Whether an event of a kind was written since an instant. */
export async function hasEventSince(db: Knex, entryId: number, kind: string, since: string): Promise<boolean> {
  return (await db('entry_events').where({ entry_id: entryId, kind }).where('at', '>=', since).first('id')) !== undefined
}
