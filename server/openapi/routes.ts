// Scripts and tests are typed by another project, which does not read the server's declarations; they are no module to import.
// eslint-disable-next-line @typescript-eslint/triple-slash-reference
/// <reference path="../types/handlers.d.ts" />
import { handlers } from '#nitro-internal-virtual/server-handlers'
import type { ZodType } from 'zod'
import type { RouteAccess } from '../utils/defineRoute'
import type { DeclaredRoute } from './document'

/** What defineRoute leaves on a handler. */
interface Declared {
  readonly access?: RouteAccess
  readonly shape?: { readonly params?: ZodType, readonly query?: ZodType, readonly body?: ZodType }
}

/** Every route of the build under `/api` that declares itself by defineRoute; one with a format of its own is left out. */
export async function declaredRoutes(): Promise<DeclaredRoute[]> {
  const found = await Promise.all(handlers.filter(one => one.route?.startsWith('/api/') && one.method).map(async ({ route, method, lazy, handler }) => {
    const { access, shape }: Declared = lazy ? (await (handler as () => Promise<{ default: Declared }>)()).default : handler as Declared
    return access === undefined ? [] : [{ method: method!.toUpperCase(), route: route!, access, ...shape }]
  }))
  return found.flat()
}
