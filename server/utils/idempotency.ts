import { createHash } from 'node:crypto'
import type { H3Event } from 'h3'
import { getRequestHeader, getResponseStatus, setResponseHeader, setResponseStatus } from 'h3'
import type { Actor } from '../../shared/domain/access/roles'
import { DomainError } from '../../shared/errors'
import type { Registry } from '../composition'
import { beginIdempotent, finishIdempotent, forgetIdempotent } from '../services/idempotency/keep'

/**
 * Runs `act` once for a signed-in POST that carries an `Idempotency-Key`: a repetition within 72 hours is answered as
 * the first was; another body under the same key is refused with 422, one still in flight with 409. Refusals by a
 * server fault are forgotten, so that the caller may try again.
 */
export async function withIdempotency<R>(event: H3Event, registry: Registry, actor: Actor, body: unknown, act: () => Promise<R>): Promise<R | unknown> {
  const key = getRequestHeader(event, 'idempotency-key')
  if (!key || event.method !== 'POST' || !actor) return act()
  if (key.length > 200) throw new DomainError('bad_request', { details: { reason: 'idempotency_key' } })
  const route = event.path.split('?')[0]!.slice(0, 120)
  const bodyHash = createHash('sha256').update(JSON.stringify(body ?? null)).digest('hex')
  const slot = { userId: actor.userId, route, key, bodyHash }
  const earlier = await beginIdempotent(registry, slot)
  if (earlier) {
    setResponseStatus(event, earlier.status)
    setResponseHeader(event, 'idempotency-replayed', 'true')
    return earlier.response
  }
  try {
    const answer = await act()
    await finishIdempotent(registry, slot, getResponseStatus(event), answer ?? null)
    return answer
  }
  catch (error) {
    await forgetIdempotent(registry, slot)
    throw error
  }
}

/**
 * An id for what a request makes, always the same under the same `Idempotency-Key` of the same account (UUID version 8,
 * RFC 9562, section 5.8): should the process die between making it and keeping the answer, the repetition finds it made.
 */
export function idUnderKey(event: H3Event, actor: Exclude<Actor, null>): string | undefined {
  const key = getRequestHeader(event, 'idempotency-key')
  if (!key) return undefined
  const bytes = createHash('sha256').update(JSON.stringify([actor.uid, event.path.split('?')[0], key])).digest().subarray(0, 16)
  bytes[6] = 0x80 | (bytes[6]! & 0x0F)
  bytes[8] = 0x80 | (bytes[8]! & 0x3F)
  return bytes.toString('hex').replace(/^(.{8})(.{4})(.{4})(.{4})/, '$1-$2-$3-$4-')
}
