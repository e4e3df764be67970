import type { Registry } from '../../composition'
import { lastHeartbeat, latestMigration } from '../../repositories/health'

export interface Health {
  readonly status: 'ok' | 'failing'
  readonly database: 'ok' | 'away'
  readonly worker: 'ok' | 'away'
  /** Name of the newest migration, or null when the database is away. */
  readonly schema: string | null
}

/** A worker says that it lives every few seconds; after this it counts as away. */
const HEARTBEAT_MS = 30_000

export async function readHealth(registry: Registry): Promise<Health> {
  try {
    const [schema, heartbeat] = await Promise.all([latestMigration(registry.db), lastHeartbeat(registry.db)])
    const worker = heartbeat && Date.now() - heartbeat.getTime() < HEARTBEAT_MS ? 'ok' : 'away'
    return { status: worker === 'ok' ? 'ok' : 'failing', database: 'ok', worker, schema }
  }
  catch {
    return { status: 'failing', database: 'away', worker: 'away', schema: null }
  }
}
