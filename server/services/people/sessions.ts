import { parseSqlTime } from '../../../db/time'
import { isStaffRole, type ActiveActor, type Actor } from '../../../shared/domain/access/roles'
import { DomainError } from '../../../shared/errors'
import type { Registry } from '../../composition'
import * as sessions from '../../repositories/sessions'

const MINUTE = 60_000
const DAY = 24 * 60 * MINUTE
/** A session that nobody uses ends after this long … */
export const IDLE_MS = 14 * DAY
/** … and every session at the latest after this long. */
export const LONGEST_MS = 60 * DAY
/** How fine the time is kept at which a session was last used. */
const SEEN_EVERY_MS = 5 * MINUTE

function expiry(createdAt: Date, now: Date): Date {
  return new Date(Math.min(now.getTime() + IDLE_MS, createdAt.getTime() + LONGEST_MS))
}

export const firstExpiry = (now: Date): Date => expiry(now, now)

/**
 * Outside the demo a role that decides about other people's animals does not hold in a session without the second
 * factor: it is withheld, and the account page says so.
 */
function withFactor(registry: Registry, actor: ActiveActor): ActiveActor {
  if (registry.config.mode === 'demo' || actor.secondFactor) return actor
  const withheld = actor.roles.filter(isStaffRole)
  return withheld.length === 0 ? actor : { ...actor, roles: actor.roles.filter(role => !isStaffRole(role)), withheld }
}

/** The person behind a live session, or null when it has ended, run out, or the account is closed. */
export async function findActor(registry: Registry, sessionUid: string): Promise<Actor> {
  const now = registry.clock.now()
  const found = await sessions.findActor(registry.db, sessionUid, now)
  if (!found) return null
  if (now.getTime() - parseSqlTime(found.lastSeenAt).getTime() > SEEN_EVERY_MS) {
    await sessions.touchSession(registry.db, found.actor.sessionId, now, expiry(parseSqlTime(found.createdAt), now))
  }
  return withFactor(registry, found.actor)
}

/** Where the account is signed in now, the session that asks marked. */
export async function listOwnSessions(registry: Registry, actor: ActiveActor) {
  const rows = await sessions.listSessions(registry.db, actor.userId, registry.clock.now())
  return rows.map(({ sessionId, uid, ...row }) => ({ id: uid, ...row, current: sessionId === actor.sessionId }))
}

/** Ends one of the account's own sessions. @throws DomainError `not_found` */
export async function endOwnSession(registry: Registry, actor: ActiveActor, uid: string): Promise<void> {
  if (!await sessions.endSession(registry.db, { uid, userId: actor.userId }, registry.clock.now())) throw new DomainError('not_found')
}

/** Ends every session of the account but the one that asks. Answers how many. */
export function endOtherSessions(registry: Registry, actor: ActiveActor): Promise<number> {
  return sessions.endSessions(registry.db, actor.userId, registry.clock.now(), actor.sessionId)
}

/** Sign-out: the session's row ends, so that a copied cookie is worth nothing either. */
export async function signOut(registry: Registry, sessionUid: string): Promise<void> {
  await sessions.endSession(registry.db, { uid: sessionUid }, registry.clock.now())
}
