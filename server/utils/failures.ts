import type { H3Event } from 'h3'
import { isError } from 'h3'
import { translateDatabaseError } from '../../db/errors'
import { DomainError, isDomainError, type ErrorCode } from '../../shared/errors'

const BY_STATUS: Readonly<Record<number, ErrorCode>> = {
  400: 'bad_request', 401: 'sign_in_required', 403: 'forbidden', 404: 'not_found', 405: 'method_not_allowed',
  413: 'body_too_large', 415: 'unsupported_media', 422: 'invalid_input', 429: 'too_many_requests',
}

/**
 * Any failure as one with a code. What nobody foresaw is logged with its stack and told as `internal`, so that
 * nothing of the house shows outside.
 */
export function asDomainError(event: H3Event, error: unknown): DomainError {
  if (isDomainError(error)) return noted(event, error)
  const translated = translateDatabaseError(error)
  if (isDomainError(translated)) return noted(event, translated)
  if (isError(error)) {
    if (error.cause && error.cause !== error) {
      const inner = translateDatabaseError(error.cause)
      if (isDomainError(inner)) return noted(event, inner)
    }
    const code = BY_STATUS[error.statusCode]
    if (code) return new DomainError(code, { cause: error })
  }
  event.context.registry?.log.error({ err: error, path: event.path, requestId: event.context.requestId }, 'a request failed')
  return new DomainError('internal', { details: { requestId: event.context.requestId }, cause: error })
}

/** Writes what an error tells the log and nobody else: what is out of order as an error, what somebody sent as a note. */
function noted(event: H3Event, error: DomainError): DomainError {
  const { registry, requestId } = event.context
  if (error.logLine) registry?.log[error.status >= 500 ? 'error' : 'info']({ code: error.code, path: event.path.split('?')[0], requestId }, error.logLine)
  return error
}
