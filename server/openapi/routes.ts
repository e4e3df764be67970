import { handlers } from '#nitro-internal-virtual/server-handlers'
import type { EventHandler } from 'h3'
import type { ZodType } from 'zod'
import type { RouteAccess } from '../utils/defineRoute'
import type { DeclaredRoute } from './document'

/** What defineRoute leaves on a handler. */
interface Declared {
  readonly access?: RouteAccess
  readonly shape?: { readonly params?: ZodType, readonly query?: ZodType, readonly body?: ZodType }
}

interface Lazy {
  __resolve__?: () => Promise<{ handler: EventHandler & Declared }>
}

/** Every route of the build under `/api` that declares itself by defineRoute; one with a format of its own is left out. */
export async function declaredRoutes(): Promise<DeclaredRoute[]> {
  const found = await Promise.all(handlers.filter(one => one.route?.startsWith('/api/') && one.method).map(async ({ route, method, handler }) => {
    const { handler: resolved } = await (handler as Lazy).__resolve__?.() ?? { handler: handler as EventHandler & Declared }
    return resolved.access === undefined ? [] : [{ method: method!.toUpperCase(), route: route!, access: resolved.access, ...resolved.shape }]
  }))
  return found.flat()
}
