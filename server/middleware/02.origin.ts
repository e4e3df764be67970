import { DomainError } from '../../shared/errors'
import { sendProblem } from '../utils/problem'

const SAFE = new Set(['GET', 'HEAD', 'OPTIONS'])
/** Signed by their sender instead. */
const UNSIGNED_PATHS = /^\/api\/payments\/webhook\b/

/**
 * An unsafe request must come from our own pages, or from a program that says no origin at all. A browser always says
 * where a request comes from, so a form on a foreign page cannot act for the person who looks at it.
 */
export default defineEventHandler((event) => {
  if (SAFE.has(event.method) || UNSIGNED_PATHS.test(event.path)) return
  const site = getRequestHeader(event, 'sec-fetch-site')
  const origin = getRequestHeader(event, 'origin')
  if (site && site !== 'same-origin' && site !== 'none') return sendProblem(event, new DomainError('foreign_origin'))
  if (!origin) return
  const own = [event.context.registry.config.publicUrl, `http://${getRequestHeader(event, 'host')}`, `https://${getRequestHeader(event, 'host')}`]
  if (!own.includes(origin)) return sendProblem(event, new DomainError('foreign_origin'))
})
