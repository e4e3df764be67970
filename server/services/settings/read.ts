import type { Knex } from 'knex'

/** Values of the society that the registry serves; all of them are data, none is in code. */
export interface Settings {
  /** Name of the society, as printed. */
  readonly societyName: string
  /** Name of the region, as in "the lists of …". */
  readonly regionName: string
  /** IANA time zone that decides days and deadlines. */
  readonly timeZone: string
  /** ISO 4217 */
  readonly currency: string
  /** Address that answers to notices go to. */
  readonly officeEmail: string
  /** Anything else, by its key in `settings`. */
  readonly [key: string]: unknown
}

const KEPT_MS = 3_000
const FALLBACK: Settings = { societyName: '', regionName: '', timeZone: 'UTC', currency: 'USD', officeEmail: '' }

/** A reader of `settings` that asks the database at most every three seconds. */
export function settingsReader(db: Knex): () => Promise<Settings> {
  let kept: { at: number, value: Promise<Settings> } | null = null
  return () => {
    const now = Date.now()
    if (kept && now - kept.at < KEPT_MS) return kept.value
    const value = db('settings').select('name', 'value').then((rows: { name: string, value: unknown }[]) => {
      const read: Record<string, unknown> = { ...FALLBACK }
      for (const row of rows) read[row.name] = typeof row.value === 'string' ? JSON.parse(row.value) : row.value
      return read as unknown as Settings
    })
    kept = { at: now, value }
    value.catch(() => { kept = null })
    return value
  }
}
