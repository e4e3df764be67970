import { createHash } from 'node:crypto'
import { appendResponseHeader, getRequestHeader, setResponseHeader, setResponseStatus, type H3Event } from 'h3'

/** Sets the ETag and says whether the caller holds the same (RFC 9110, section 13.1.2); then the answer is 304. */
function isHeld(event: H3Event, tag: string): boolean {
  const etag = `W/"${createHash('sha256').update(tag).digest('base64url').slice(0, 27)}"`
  setResponseHeader(event, 'etag', etag)
  appendResponseHeader(event, 'vary', 'accept-language')
  const held = (getRequestHeader(event, 'if-none-match') ?? '').split(',').map(one => one.trim())
  if (!held.includes(etag) && !held.includes('*')) return false
  setResponseStatus(event, 304)
  return true
}

/**
 * Answers under an ETag made from what the answer follows from, such as the version of the lists and the query, and makes
 * the answer only for a caller who does not hold it yet. A new build of the program is another answer.
 */
export async function answerFrom<T>(event: H3Event, source: unknown, make: () => Promise<T>): Promise<T | null> {
  return isHeld(event, JSON.stringify([useRuntimeConfig().app.buildId, source])) ? null : make()
}

/** Answers with a body under a weak ETag made from it, or with 304 when the caller holds the same (RFC 9110, section 13). */
export function answerWithEtag<T>(event: H3Event, body: T): T | null {
  return isHeld(event, JSON.stringify(body)) ? null : body
}
