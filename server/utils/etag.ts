import { createHash } from 'node:crypto'
import { appendResponseHeader, getRequestHeader, setResponseHeader, setResponseStatus, type H3Event } from 'h3'

/**
 * Sets a weak ETag made from what an answer follows from, such as the version of the lists and the query, and says whether
 * the caller holds it already (RFC 9110, section 13.1.2): then the status is 304. A new build of the program is another
 * answer.
 */
export function isHeld(event: H3Event, source: unknown): boolean {
  const etag = `W/"${createHash('sha256').update(JSON.stringify([useRuntimeConfig().app.buildId, source])).digest('base64url').slice(0, 27)}"`
  setResponseHeader(event, 'etag', etag)
  appendResponseHeader(event, 'vary', 'accept-language')
  const held = (getRequestHeader(event, 'if-none-match') ?? '').split(',').map(one => one.trim())
  if (!held.includes(etag) && !held.includes('*')) return false
  setResponseStatus(event, 304)
  return true
}

/** Makes the answer only for a caller who does not hold it yet. */
export async function answerFrom<T>(event: H3Event, source: unknown, make: () => Promise<T>): Promise<T | null> {
  return isHeld(event, source) ? null : make()
}

/** Answers with a body under an ETag made from it, or with 304 when the caller holds the same. */
export function answerWithEtag<T>(event: H3Event, body: T): T | null {
  return isHeld(event, body) ? null : body
}
