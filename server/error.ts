import { send, setResponseHeader, setResponseStatus, type H3Error, type H3Event } from 'h3'
import { asDomainError } from './utils/failures'
import { problemOf } from './utils/problem'

/**
 * What under `/api` no route has caught (an unknown path, a broken request) still answers with a problem document.
 * Anything else is left to the next handler, Nuxt's error page.
 */
export default async function onError(error: H3Error, event: H3Event): Promise<void> {
  if (event.handled || !/^\/api(?:[/?]|$)/.test(event.path)) return
  const problem = problemOf(event, asDomainError(event, error))
  setResponseStatus(event, problem.status)
  setResponseHeader(event, 'content-type', 'application/problem+json')
  setResponseHeader(event, 'cache-control', 'no-store')
  await send(event, JSON.stringify(problem))
}
