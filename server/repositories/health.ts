import type { Knex } from 'knex'
import { parseSqlTime } from '../../db/time'

export async function latestMigration(db: Knex): Promise<string | null> {
  const row = await db('schema_migrations').orderBy('id', 'desc').first('name')
  return row ? String(row.name) : null
}

/** When a worker last said that it lives. `worker_heartbeats` holds one row a process. */
export async function lastHeartbeat(db: Knex): Promise<Date | null> {
  const row: { seen_at?: string } | undefined = await db('worker_heartbeats').max({ seen_at: 'seen_at' }).first()
  return row?.seen_at ? parseSqlTime(row.seen_at) : null
}
