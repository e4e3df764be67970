import type { Knex } from 'knex'
import { isoTime } from '../../../db/time'

/** Papers of an entry that stand, in the order in which the file shows them. */
export async function papersOf(db: Knex, entryId: number) {
  const rows = await db('documents as d').join('files as f', 'f.id', 'd.file_id')
    .where('d.entry_id', entryId).whereNull('d.removed_at').whereNot('d.scan_state', 'infected')
    .orderBy('d.sort').orderBy('d.id').select('d.uid', 'd.kind', 'd.name', 'd.pages', 'd.created_at', 'd.scan_state', 'f.mime')
  return rows.map(row => ({ id: row.uid as string, kind: row.kind, name: row.name as string, mime: row.mime as string, pages: row.mime.startsWith('image/') ? 1 : Number(row.pages ?? 0), scanned: row.scan_state === 'clean', uploadedAt: isoTime(row.created_at) }))
}

/** The statement that stands, with whoever signed it. */
export async function statementOf(db: Knex, entryId: number) {
  const row = await db('statements').where({ entry_id: entryId }).whereNull('voided_at').orderBy('signed_at', 'desc').first('signer_name', 'part', 'signed_at')
  return row ? { signer: row.signer_name as string, part: row.part, signedAt: isoTime(row.signed_at) } : null
}

/** Names of accounts by their inner id. */
export async function namesOf(db: Knex, ids: readonly (number | null | undefined)[]): Promise<ReadonlyMap<number, string>> {
  const wanted = [...new Set(ids.filter((id): id is number => typeof id === 'number'))]
  const rows: { id: number, name: string }[] = wanted.length === 0 ? [] : await db('users').whereIn('id', wanted).select('id', 'name')
  return new Map(rows.map(row => [row.id, row.name]))
}

/** The docket item by which an entry is before the panel, with its sitting. */
export async function docketOfEntry(db: Knex, entryId: number) {
  const row = await db('docket_items as i').leftJoin('sittings as s', 's.id', 'i.sitting_id').where('i.entry_id', entryId).whereIn('i.state', ['open', 'decided'])
    .first('i.uid', 's.uid as sitting_uid', 's.held_on', 's.place')
  return row ? { itemId: row.uid as string, sittingId: row.sitting_uid as string | null, heldOn: row.held_on as string | null, place: row.place as string | null } : null
}
