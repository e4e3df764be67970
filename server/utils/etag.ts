import { createHash } from 'node:crypto'
import { appendResponseHeader, getRequestHeader, setResponseHeader, setResponseStatus, type H3Event } from 'h3'

/** Answers with a body under a weak ETag made from it, or with 304 when the caller holds the same (RFC 9110, section 13). */
export function answerWithEtag<T>(event: H3Event, body: T): T | null {
  const etag = `W/"${createHash('sha256').update(JSON.stringify(body)).digest('base64url').slice(0, 27)}"`
  setResponseHeader(event, 'etag', etag)
  appendResponseHeader(event, 'vary', 'accept-language')
  const held = (getRequestHeader(event, 'if-none-match') ?? '').split(',').map(tag => tag.trim())
  if (!held.includes(etag) && !held.includes('*')) return body
  setResponseStatus(event, 304)
  return null
}
