import { getRequestHeader, type H3Event } from 'h3'
import { DomainError } from '../../shared/errors'

/**
 * The version that a change is based on, from `If-Match` (RFC 9110, section 13.1.1).
 *
 * @throws DomainError `precondition_required` (428) where it is missing, `bad_request` where it is no version
 */
export function versionOf(event: H3Event): number {
  const given = getRequestHeader(event, 'if-match')
  if (!given) throw new DomainError('precondition_required')
  const version = /^(?:W\/)?"?(\d{1,9})"?$/.exec(given.trim())?.[1]
  if (version === undefined) throw new DomainError('bad_request', { details: { reason: 'if_match' } })
  return Number(version)
}
