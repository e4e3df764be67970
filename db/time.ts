/**
 * Times in the database are DATETIME(3) in UTC and arrive as `2026-11-30 23:59:59.250`; everywhere else they are
 * ISO 8601 in UTC. Dates are `YYYY-MM-DD` on both sides.
 */

/** The instant as the database writes it. */
export function sqlTime(at: Date): string {
  return at.toISOString().replace('T', ' ').replace('Z', '')
}

/** What the database wrote, as ISO 8601 in UTC with milliseconds. */
export function isoTime(sql: string): string {
  return parseSqlTime(sql).toISOString()
}

/** `isoTime` for a column that may be empty. */
export function isoTimeOrNull(sql: string | null): string | null {
  return sql === null ? null : isoTime(sql)
}

/** What the database wrote, as an instant. Throws a RangeError for anything else. */
export function parseSqlTime(sql: string): Date {
  const at = new Date(`${sql.replace(' ', 'T')}Z`)
  if (Number.isNaN(at.getTime())) throw new RangeError(`not a time of the database: ${sql}`)
  return at
}
