import type { Knex } from 'knex'
import type { DocumentPagesInsert, DocumentsInsert, DocumentsRow, FilesInsert, FilesRow } from '../../db/tables'

/** The row of a stored file by its content; made when there is none. */
export async function keepFile(trx: Knex, row: FilesInsert): Promise<number> {
  const standing = await trx('files').where({ sha256: row.sha256 }).first('id')
  if (standing) return standing.id
  const [made] = await trx('files').insert(row).onConflict('sha256').merge(['sha256'])
  return made! || (await trx('files').where({ sha256: row.sha256 }).first('id'))!.id
}

export async function insertDocument(trx: Knex, row: DocumentsInsert): Promise<number> {
  const [id] = await trx('documents').insert(row)
  return id!
}

export async function insertPages(trx: Knex, rows: readonly DocumentPagesInsert[]): Promise<void> {
  if (rows.length > 0) await trx('document_pages').insert([...rows])
}

export async function findDocument(db: Knex, uid: string): Promise<(DocumentsRow & { entry_uid: string }) | undefined> {
  return db('documents as d').join('entries as e', 'e.id', 'd.entry_id').where('d.uid', uid).whereNull('d.removed_at').first('d.*', 'e.uid as entry_uid')
}

export async function updateDocument(trx: Knex, id: number, patch: Partial<DocumentsInsert>): Promise<void> {
  await trx('documents').where({ id }).update(patch)
}

export type DocumentLine = DocumentsRow & { readonly mime: string, readonly size: number, readonly uploader_uid: string | null, readonly uploader_name: string | null }

/** Documents of an entry in their order, with type and size of the file and who sent it. */
export async function listDocuments(db: Knex, entryId: number): Promise<DocumentLine[]> {
  return db('documents as d').join('files as f', 'f.id', 'd.file_id').leftJoin('users as u', 'u.id', 'd.uploaded_by')
    .where('d.entry_id', entryId).whereNull('d.removed_at').orderBy('d.sort').orderBy('d.id')
    .select('d.*', 'f.mime', 'f.size', 'u.uid as uploader_uid', 'u.name as uploader_name')
}

export interface Usage { readonly files: number, readonly bytes: number }

export async function usageOfEntry(db: Knex, entryId: number): Promise<Usage> {
  const row = await db('documents as d').join('files as f', 'f.id', 'd.file_id').where('d.entry_id', entryId).whereNull('d.removed_at')
    .first(db.raw('COUNT(*) AS files'), db.raw('COALESCE(SUM(f.size), 0) AS bytes')) as unknown as { files: number | string, bytes: number | string }
  return { files: Number(row.files), bytes: Number(row.bytes) }
}

/** How many files an account has sent since an instant, removed ones too. */
export async function countSentSince(db: Knex, userId: number, since: string): Promise<number> {
  const row = await db('documents').where({ uploaded_by: userId }).where('created_at', '>=', since).count({ n: '*' }).first() as { n: number | string }
  return Number(row.n)
}

export async function nextSort(db: Knex, entryId: number): Promise<number> {
  const row = await db('documents').where({ entry_id: entryId }).max({ last: 'sort' }).first() as { last: number | null } | undefined
  return (row?.last ?? 0) + 1
}

export async function findFile(db: Knex, id: number): Promise<FilesRow | undefined> {
  return db('files').where({ id }).first()
}

export async function findPage(db: Knex, documentId: number, page: number): Promise<FilesRow | undefined> {
  return db('document_pages as p').join('files as f', 'f.id', 'p.file_id').where({ 'p.document_id': documentId, 'p.page': page }).first('f.*')
}

/** Which of some contents have a row. */
export async function knownFiles(db: Knex, sha256: readonly string[]): Promise<Set<string>> {
  return sha256.length === 0 ? new Set() : new Set(await db('files').whereIn('sha256', [...sha256]).pluck('sha256'))
}
