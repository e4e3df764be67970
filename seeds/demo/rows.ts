import type { Knex } from 'knex'
import type { Tables } from 'knex/types/tables'
import { insertMany } from '../bulk'

type Value = string | number | boolean | null
export type Row<T extends keyof Tables> = Partial<Record<keyof Tables[T]['base'], Value>>

/** Parents before children, so that every foreign key finds what it points at. */
const ORDER = [
  'animals', 'entries', 'entry_people', 'sheets', 'documents', 'statements', 'checkouts', 'ledger', 'requests', 'checks',
  'docket_items', 'ballots', 'file_openings', 'remeasurings', 'challenges', 'entry_events', 'event_texts', 'records', 'record_tokens',
] as const satisfies readonly (keyof Tables)[]
type Table = (typeof ORDER)[number]

/** Rows that are collected table by table and written together. */
export class Rows {
  private readonly rows = new Map<Table, Row<Table>[]>()

  add<T extends Table>(table: T, row: Row<T>): void {
    const some = this.rows.get(table)
    if (some) some.push(row as Row<Table>)
    else this.rows.set(table, [row as Row<Table>])
  }

  async write(db: Knex): Promise<void> {
    for (const table of ORDER) await insertMany(db, table, this.rows.get(table) ?? [])
    this.rows.clear()
  }
}
