import type { Actor } from '../../shared/domain/access/roles'
import type { Registry } from '../composition'

declare module 'h3' {
  interface H3EventContext {
    /** The registry that the request's host leads to. */
    registry: Registry
    requestId: string
    /** Under which a public page is kept once it was made. */
    pageKey?: string
    /** Read once a request, by `actorOf`. */
    actor?: Promise<Actor>
  }
}

export {}
