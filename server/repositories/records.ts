import type { Knex } from 'knex'
import type { RecordsInsert, RecordsRow } from '../../db/tables'

/** The next value of a counter; the row stays locked until the transaction ends, so that no number is ever given twice. */
export async function takeNumber(trx: Knex.Transaction, name: string): Promise<number> {
  const row = await trx('counters').where({ name }).forUpdate().first('value')
  const value = Number(row!.value) + 1
  await trx('counters').where({ name }).update({ value })
  return value
}

export async function insertRecord(trx: Knex, row: RecordsInsert): Promise<number> {
  const [id] = await trx('records').insert(row)
  return id!
}

export async function findRecordOfEntry(db: Knex, entryId: number): Promise<RecordsRow | undefined> {
  return db('records').where({ entry_id: entryId }).first()
}

export async function findRecordByNo(db: Knex, recordNo: number): Promise<(RecordsRow & { entry_uid: string }) | undefined> {
  return db('records as r').join('entries as e', 'e.id', 'r.entry_id').where('r.record_no', recordNo).first('r.*', 'e.uid as entry_uid')
}

export async function updateRecord(trx: Knex, id: number, patch: Partial<RecordsInsert>): Promise<void> {
  await trx('records').where({ id }).update(patch)
}

export interface ListCountKey { readonly class_id: number, readonly district_id: number, readonly method: string, readonly net16: number }

/** Adds to or takes from the counts by net; a count that reaches nothing goes. Rows are taken in one order, so that two acceptances never stop each other. */
export async function addToListCounts(trx: Knex.Transaction, keys: readonly ListCountKey[], by: 1 | -1): Promise<void> {
  const ordered = [...keys].sort((a, b) => a.district_id - b.district_id || (a.method < b.method ? -1 : 1))
  for (const key of ordered) {
    if (by === 1) await trx('list_counts').insert({ ...key, n: 1 }).onConflict(['class_id', 'district_id', 'method', 'net16']).merge({ n: trx.raw('n + 1') })
    else await trx('list_counts').where({ ...key }).update({ n: trx.raw('n - 1') })
  }
  if (by === -1) for (const key of ordered) await trx('list_counts').where({ ...key, n: 0 }).del()
}

export interface FacetKey { readonly class_id: number, readonly district_id: number, readonly method: string, readonly year: number }

export async function addToFacetCounts(trx: Knex.Transaction, key: FacetKey, by: 1 | -1): Promise<void> {
  if (by === 1) await trx('facet_counts').insert({ ...key, n: 1 }).onConflict(['class_id', 'district_id', 'method', 'year']).merge({ n: trx.raw('n + 1') })
  else {
    await trx('facet_counts').where({ ...key }).update({ n: trx.raw('n - 1') })
    await trx('facet_counts').where({ ...key, n: 0 }).del()
  }
}

export async function insertTokens(trx: Knex, rows: readonly { token: string, class_id: number, net16: number, record_id: number }[]): Promise<void> {
  if (rows.length > 0) await trx('record_tokens').insert([...rows])
}

export async function deleteTokens(trx: Knex, recordId: number): Promise<void> {
  await trx('record_tokens').where({ record_id: recordId }).del()
}

/** Counts by net of one list; district 0 is the whole region, an empty method all methods. */
export async function listCounts(db: Knex, list: { class_id: number, district_id: number, method: string }): Promise<{ net16: number, n: number }[]> {
  return db('list_counts').where(list).select('net16', 'n')
}
