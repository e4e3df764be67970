import type { Knex } from 'knex'

export interface NoticeRow {
  readonly id: number
  readonly uid: string
  readonly template: string
  readonly userId: number | null
  readonly toEmail: string
  readonly entryUid: string | null
  readonly recordNo: number | null
  readonly args: Record<string, unknown>
  readonly locale: string
}

/** A notice with what its link needs. */
export async function readNotice(db: Knex, id: number): Promise<NoticeRow | null> {
  const row = await db('notices as n')
    .leftJoin('entries as e', 'e.id', 'n.entry_id')
    .leftJoin('records as r', 'r.entry_id', 'n.entry_id')
    .where('n.id', id)
    .first('n.id', 'n.uid', 'n.template', 'n.user_id', 'n.to_email', 'n.args', 'n.locale', 'e.uid as entry_uid', 'r.record_no')
  if (!row) return null
  return {
    id: row.id,
    uid: row.uid,
    template: row.template,
    userId: row.user_id,
    toEmail: row.to_email,
    entryUid: row.entry_uid,
    recordNo: row.record_no,
    args: JSON.parse(row.args),
    locale: row.locale,
  }
}
