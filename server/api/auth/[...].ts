import { getRequestHeader } from 'h3'
import { DomainError } from '../../../shared/errors'
import { handleAuth } from '../../utils/authHandler'
import { sendProblem } from '../../utils/problem'

/** What of the sign-in package is open to the world. */
const OPEN = new Set(['GET csrf', 'GET session', 'GET providers', 'GET signin', 'GET error', 'POST callback/credentials', 'POST signout', 'POST signin/credentials'])
const MOST_BYTES = 16 * 1024

/** Signing in and out by the usual routes of the sign-in package, which keep their own formats. Open to everybody. */
export default defineEventHandler(async (event) => {
  setResponseHeader(event, 'cache-control', 'no-store')
  if (!OPEN.has(`${event.method} ${getRouterParam(event, '_') ?? ''}`)) return sendProblem(event, new DomainError('not_found'))
  if (event.method === 'POST') {
    const length = Number(getRequestHeader(event, 'content-length') ?? Number.NaN)
    if (!(length <= MOST_BYTES)) return sendProblem(event, new DomainError('body_too_large', { details: { maximum: MOST_BYTES / 1024 } }))
  }
  return handleAuth(event)
})
