import { defineEventHandler, getQuery, getRequestHeader, getRouterParams, readRawBody, setResponseHeader, type EventHandler, type H3Event } from 'h3'
import type { ZodType, output } from 'zod'
import type { Actor, ActiveActor, Role } from '../../shared/domain/access/roles'
import { hasAnyRole } from '../../shared/domain/access/roles'
import { DomainError } from '../../shared/errors'
import type { Registry } from '../composition'
import { actorOf } from './actor'
import { withIdempotency } from './idempotency'
import { fieldsOf, sendProblem } from './problem'
import { asDomainError } from './failures'

/**
 * Who may call a route. Leaving it out does not type-check; `public` is said aloud. A `note` names what the service
 * checks beyond the role, such as ownership or a stake.
 */
export type RouteAccess = 'public' | 'signedIn' | { readonly roles: readonly Role[], readonly note?: string } | { readonly note: string }

type Parsed<S> = S extends ZodType ? output<S> : undefined
type ActorFor<A extends RouteAccess> = A extends 'public' ? Actor : ActiveActor

export interface RouteContext<A extends RouteAccess, P, Q, B> {
  readonly event: H3Event
  readonly registry: Registry
  readonly actor: ActorFor<A>
  readonly params: Parsed<P>
  readonly query: Parsed<Q>
  readonly body: Parsed<B>
}

export interface RouteDefinition<A extends RouteAccess, P, Q, B, R> {
  readonly access: A
  readonly params?: P
  readonly query?: Q
  readonly body?: B
  /** Largest body in bytes; 64 KiB unless said. Uploads read their stream themselves and leave `body` out. */
  readonly maxBody?: number
  /** The answer may differ by who asks unless `cache` says otherwise. */
  readonly cache?: string
  readonly handler: (context: RouteContext<A, P, Q, B>) => Promise<R> | R
}

const DEFAULT_MAX_BODY = 64 * 1024

async function readJson(event: H3Event, max: number): Promise<unknown> {
  const declared = Number(getRequestHeader(event, 'content-length') ?? 0)
  if (declared > max) throw new DomainError('body_too_large', { details: { maximum: Math.floor(max / 1024) } })
  const raw = await readRawBody(event, 'utf8')
  if (raw === undefined || raw === '') return {}
  if (Buffer.byteLength(raw) > max) throw new DomainError('body_too_large', { details: { maximum: Math.floor(max / 1024) } })
  const type = getRequestHeader(event, 'content-type') ?? 'application/json'
  if (!/^application\/(?:[\w.+-]+\+)?json\b/i.test(type)) throw new DomainError('unsupported_media')
  try {
    return JSON.parse(raw)
  }
  catch {
    throw new DomainError('bad_request', { details: { reason: 'json' } })
  }
}

function check<S extends ZodType>(schema: S, value: unknown): output<S> {
  const result = schema.safeParse(value)
  if (result.success) return result.data
  throw new DomainError('invalid_input', { fields: fieldsOf(result.error) })
}

/** Refuses whoever the declared access does not let in: 401 for a visitor, 403 for the wrong role. */
export function assertAccess(access: RouteAccess, actor: Actor): void {
  if (access === 'public') return
  if (!actor) throw new DomainError('sign_in_required')
  if (typeof access !== 'object' || !('roles' in access) || hasAnyRole(actor, access.roles)) return
  throw new DomainError(access.roles.some(role => actor.withheld?.some(one => one === role)) ? 'second_factor_setup_required' : 'forbidden')
}

/**
 * A JSON route: declares its access, checks what came in, calls one service and answers. Every failure becomes a
 * problem document. A POST with an `Idempotency-Key` answers a repetition as it answered first.
 */
export function defineRoute<A extends RouteAccess, P extends ZodType | undefined = undefined, Q extends ZodType | undefined = undefined, B extends ZodType | undefined = undefined, R = unknown>(
  definition: RouteDefinition<A, P, Q, B, R>,
): EventHandler & { readonly access: RouteAccess, readonly shape: { readonly params?: P, readonly query?: Q, readonly body?: B } } {
  const handler = defineEventHandler(async (event) => {
    try {
      const registry = event.context.registry
      if (definition.cache) setResponseHeader(event, 'cache-control', definition.cache)
      else setResponseHeader(event, 'cache-control', 'no-store')
      const actor = definition.access === 'public' && definition.cache ? null : await actorOf(event)
      assertAccess(definition.access, actor)
      const params = definition.params ? check(definition.params, getRouterParams(event, { decode: true })) : undefined
      const query = definition.query ? check(definition.query, getQuery(event)) : undefined
      const json = definition.body ? await readJson(event, definition.maxBody ?? DEFAULT_MAX_BODY) : undefined
      const body = definition.body ? check(definition.body, json) : undefined
      const context = { event, registry, actor, params, query, body } as RouteContext<A, P, Q, B>
      return await withIdempotency(event, registry, actor, json, () => Promise.resolve(definition.handler(context)))
    }
    catch (error) {
      return sendProblem(event, asDomainError(event, error))
    }
  })
  const { access, params, query, body } = definition
  return Object.assign(handler, { access, shape: { params, query, body } })
}
