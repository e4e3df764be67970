import { inTransaction } from '../../../db/transaction'
import { DomainError } from '../../../shared/errors'
import type { Registry } from '../../composition'
import { lessenLimits, lockLimits, removeLimits, writeLimit, type LimitRow } from '../../repositories/rateLimits'

/** How often something may be tried under one key. */
export interface Limit {
  readonly key: string
  /** tries without a delay */
  readonly free: number
  /** seconds after the last try from which all is forgotten */
  readonly window: number
  /** longest delay in seconds; it doubles from one second with every try past the free ones */
  readonly longest: number
}

const SECOND = 1000

/** Seconds to wait after this many tries. */
export function delayAfter(limit: Limit, tries: number): number {
  if (tries < limit.free) return 0
  return Math.min(limit.longest, 2 ** Math.min(tries - limit.free, 30))
}

/** Seconds until the next try is taken; 0 for now. A refused try changes nothing, so that waiting always ends. */
function waitFor(limit: Limit, row: LimitRow, now: number): number {
  if (row.expire <= now) return 0
  const lastTry = row.expire - limit.window * SECOND
  return Math.max(0, Math.ceil((lastTry + delayAfter(limit, row.points) * SECOND - now) / SECOND))
}

/**
 * Counts one try under every limit, or refuses it under all when one says to wait. The rows are locked and counted
 * before the try is made, so that many at once, in however many processes, are no way round.
 *
 * @throws DomainError `too_many_requests` (429) with `retryAfter` in seconds
 */
export async function takeTry(registry: Registry, limits: readonly Limit[]): Promise<void> {
  if (limits.length === 0) return
  const now = registry.clock.now().getTime()
  const wait = await inTransaction(registry.db, async (trx) => {
    const rows = new Map((await lockLimits(trx, limits.map(limit => limit.key))).map(row => [row.key, row]))
    const longest = Math.max(...limits.map(limit => waitFor(limit, rows.get(limit.key)!, now)))
    if (longest > 0) return longest
    for (const limit of limits) {
      const row = rows.get(limit.key)!
      await writeLimit(trx, { key: limit.key, points: row.expire <= now ? 1 : row.points + 1, expire: now + limit.window * SECOND })
    }
    return 0
  })
  if (wait > 0) throw new DomainError('too_many_requests', { details: { retryAfter: wait } })
}

/** `takeTry` for what must be answered alike whether it was done or not: false instead of an error. */
export async function mayTry(registry: Registry, limits: readonly Limit[]): Promise<boolean> {
  try {
    await takeTry(registry, limits)
    return true
  }
  catch (error) {
    if (error instanceof DomainError && error.code === 'too_many_requests') return false
    throw error
  }
}

/** After a success: `own` begins anew, of `shared` only this one try is taken back. */
export async function forgiveTry(registry: Registry, own: readonly Limit[], shared: readonly Limit[] = []): Promise<void> {
  await removeLimits(registry.db, own.map(limit => limit.key))
  await lessenLimits(registry.db, shared.map(limit => limit.key))
}
