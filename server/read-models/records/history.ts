import type { Knex } from 'knex'

/** Acts on a record that the public may know of. Who acted and what people wrote stays inside. */
const PUBLIC_ACTS = ['accept', 'take_over', 'amend', 'challenge', 'uphold', 'strike', 'reinstate'] as const

/** The public acts on an entry, oldest first, with the instant of each. */
export async function publicHistory(db: Knex, entryId: number): Promise<{ kind: string, at: string, args: Record<string, unknown> }[]> {
  const rows = await db('entry_events').where('entry_id', entryId).whereIn('kind', [...PUBLIC_ACTS]).orderBy('seq').select('kind', 'at', 'args')
  return rows.map(row => ({ kind: row.kind, at: row.at, args: JSON.parse(row.args) as Record<string, unknown> }))
}
