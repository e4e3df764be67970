import { DomainError } from '../../../shared/errors'
import type { Registry } from '../../composition'
import * as keys from '../../repositories/idempotencyKeys'

const KEPT_MS = 72 * 3600 * 1000
/** A request that began and never ended (its process was killed) holds its key no longer than this. */
const IN_FLIGHT_MS = 2 * 60 * 1000

export interface IdempotencySlot {
  readonly userId: number
  readonly route: string
  readonly key: string
  /** SHA-256 of the request's body, in hex. */
  readonly bodyHash: string
}

/**
 * Takes the key for this request.
 *
 * @returns the answer of the first request, or null when this is the first
 * @throws DomainError `idempotency_mismatch` (422) or `idempotency_in_flight` (409)
 */
export async function beginIdempotent(registry: Registry, slot: IdempotencySlot): Promise<{ status: number, response: unknown } | null> {
  const now = registry.clock.now()
  await keys.dropOlder(registry.db, slot, new Date(now.getTime() - KEPT_MS), new Date(now.getTime() - IN_FLIGHT_MS))
  if (await keys.insert(registry.db, slot, now)) return null
  const earlier = await keys.find(registry.db, slot)
  if (!earlier) throw new DomainError('idempotency_in_flight')
  if (earlier.bodyHash !== slot.bodyHash) throw new DomainError('idempotency_mismatch')
  if (earlier.state !== 'done') throw new DomainError('idempotency_in_flight')
  return { status: earlier.status, response: earlier.response }
}

export const finishIdempotent = (registry: Registry, slot: IdempotencySlot, status: number, response: unknown) =>
  keys.finish(registry.db, slot, status, response)

export const forgetIdempotent = (registry: Registry, slot: IdempotencySlot) => keys.remove(registry.db, slot)
