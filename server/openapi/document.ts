import { OpenApiGeneratorV31, OpenAPIRegistry, type ResponseConfig } from '@asteasolutions/zod-to-openapi'
import { z, type ZodObject, type ZodType } from 'zod'
import type { RouteAccess } from '../utils/defineRoute'
import { ANSWERS, IF_MATCH } from './answers'

/** A route as it declares itself. */
export interface DeclaredRoute {
  /** Upper case. */
  readonly method: string
  /** As the router writes it: `/api/entries/:id`. */
  readonly route: string
  readonly access: RouteAccess
  readonly params?: ZodType
  readonly query?: ZodType
  readonly body?: ZodType
}

/** RFC 9457. */
const problem = z.looseObject({
  type: z.string(), title: z.string(), status: z.int(), detail: z.string(), code: z.string(),
  errors: z.array(z.object({ path: z.string(), code: z.string(), message: z.string() })).optional(),
}).meta({ id: 'Problem' })

const pathOf = (route: string) => route.replace(/:(\w+)/g, '{$1}')
const namesIn = (path: string) => [...path.matchAll(/\{(\w+)\}/g)].map(([, name]) => name!)
const operationIdOf = (method: string, path: string) =>
  [method.toLowerCase(), ...path.replace('/api/', '').split(/[^a-zA-Z0-9]+/).filter(Boolean)].map((part, place) => place === 0 ? part : part[0]!.toUpperCase() + part.slice(1)).join('')

function who(access: RouteAccess): string {
  if (access === 'public') return 'Anyone.'
  if (access === 'signedIn') return 'Anyone who is signed in.'
  const roles = 'roles' in access && access.roles ? `Roles: ${access.roles.join(', ')}. ` : ''
  return `${roles}${access.note ? `Checked further: ${access.note}.` : ''}`.trim()
}

/** The document of the interface (OpenAPI 3.1), from the schemas that check the requests. */
export function openApiDocument(routes: readonly DeclaredRoute[], about: { readonly title: string, readonly url: string, readonly version: string, readonly sessionCookie: string }) {
  const registry = new OpenAPIRegistry()
  const session = registry.registerComponent('securitySchemes', 'session', { type: 'apiKey', in: 'cookie', name: about.sessionCookie })
  const tells = (description: string): ResponseConfig => ({ description, content: { 'application/problem+json': { schema: problem } } })

  for (const { method, route, access, params, query, body } of [...routes].sort((a, b) => a.route < b.route ? -1 : a.route > b.route ? 1 : a.method < b.method ? -1 : 1)) {
    const path = pathOf(route)
    const key = `${method} ${path}`
    const answer = ANSWERS[key]
    const named = namesIn(path)
    const isPublic = access === 'public'
    registry.registerPath({
      method: method.toLowerCase() as 'get',
      path,
      operationId: operationIdOf(method, path),
      tags: [path.split('/')[2]!.replace(/\..*/, '')],
      description: who(access),
      ...(isPublic ? { security: [] } : { security: [{ [session.name]: [] }] }),
      request: {
        ...(named.length > 0 ? { params: (params ?? z.object(Object.fromEntries(named.map(name => [name, z.string()])))) as ZodObject } : {}),
        ...(query ? { query: query as ZodObject } : {}),
        ...(body ? { body: { required: true, content: { 'application/json': { schema: body } } } } : {}),
        ...(IF_MATCH.has(key) ? { headers: z.object({ 'if-match': z.string() }) } : method === 'POST' && !isPublic ? { headers: z.object({ 'idempotency-key': z.string().max(200).optional() }) } : {}),
      },
      responses: {
        [answer?.status ?? 200]: { description: 'Done.', content: { [answer?.media ?? 'application/json']: { schema: answer?.schema ?? z.unknown() } } },
        ...(answer?.cached ? { 304: { description: 'The caller holds this answer already.' } } : {}),
        ...(isPublic ? {} : { 401: tells('Nobody is signed in.'), 403: tells('Not for this role, or a stake.') }),
        ...(named.length > 0 ? { 404: tells('Nothing is there, or it is not the caller\'s to see.') } : {}),
        ...(method === 'GET' ? {} : { 409: tells('Things have changed meanwhile.') }),
        ...(IF_MATCH.has(key) ? { 412: tells('Somebody saved another version.'), 428: tells('The version is missing.') } : {}),
        ...(body ? { 413: tells('The body is too large.') } : {}),
        422: tells('Something in the request cannot be taken; `errors` says what.'),
        503: tells('The database is away.'),
      },
    })
  }
  return new OpenApiGeneratorV31(registry.definitions).generateDocument({
    openapi: '3.1.0',
    info: { title: about.title, version: about.version },
    servers: [{ url: about.url }],
  })
}
