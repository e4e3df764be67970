import type { Knex } from 'knex'
import type { StatementsInsert, StatementsRow } from '../../db/tables'

export interface StatementText { readonly version: number, readonly locale: string, readonly body: string }

/** The newest statement text in a language, or in English where there is none. */
export async function findStatementText(db: Knex, locale: string): Promise<StatementText | undefined> {
  return db('statement_texts').whereIn('locale', [locale, 'en']).orderBy('version', 'desc').orderByRaw('locale = ? DESC', [locale]).first('version', 'locale', 'body')
}

export async function listStatements(db: Knex, entryId: number): Promise<StatementsRow[]> {
  return db('statements').where({ entry_id: entryId }).orderBy('signed_at').orderBy('id')
}

export async function insertStatement(trx: Knex, row: StatementsInsert): Promise<void> {
  await trx('statements').insert(row)
}

export async function voidStatementBy(trx: Knex, entryId: number, part: StatementsRow['part'], at: string): Promise<void> {
  await trx('statements').where({ entry_id: entryId, part }).whereNull('voided_at').update({ voided_at: at })
}
