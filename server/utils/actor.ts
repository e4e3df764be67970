import type { H3Event } from 'h3'
import { getToken } from 'next-auth/jwt'
import { getRequestHeaders, parseCookies } from 'h3'
import type { Actor } from '../../shared/domain/access/roles'
import { findActor } from '../services/people/sessions'
import { sessionCookieName } from './sessionCookie'

async function read(event: H3Event): Promise<Actor> {
  const { registry } = event.context
  const cookies = parseCookies(event)
  const cookieName = sessionCookieName(registry.config)
  if (!Object.keys(cookies).some(name => name.startsWith(cookieName))) return null
  const token = await getToken({
    req: { cookies, headers: getRequestHeaders(event) } as never,
    secret: registry.config.secret,
    cookieName,
    secureCookie: registry.config.publicUrl.startsWith('https://'),
  })
  return typeof token?.sid === 'string' ? findActor(registry, token.sid) : null
}

/**
 * Who asks, with the roles held now: the token carries only a session's id, everything else is read from the database
 * in one query a request, so that a lost role or an ended session holds at once.
 */
export function actorOf(event: H3Event): Promise<Actor> {
  event.context.actor ??= read(event)
  return event.context.actor
}
