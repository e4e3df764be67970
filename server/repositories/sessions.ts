import type { Knex } from 'knex'
import { isoTime, sqlTime } from '../../db/time'
import { isRole, type ActiveActor, type Role } from '../../shared/domain/access/roles'

export interface FoundSession {
  readonly actor: ActiveActor
  /** as the database writes it */
  readonly lastSeenAt: string
  readonly createdAt: string
}

/** Session, account and roles in one query. */
export async function findActor(db: Knex, sessionUid: string, now: Date): Promise<FoundSession | null> {
  const at = sqlTime(now)
  const rows = await db('user_sessions as s')
    .join('users as u', 'u.id', 's.user_id')
    .leftJoin('user_roles as r', q => q.on('r.user_id', 'u.id').andOn('r.from_at', '<=', db.raw('?', [at]))
      .andOn(p => p.onNull('r.to_at').orOn('r.to_at', '>', db.raw('?', [at]))))
    .where('s.uid', sessionUid).whereNull('s.ended_at').where('s.expires_at', '>', at)
    .whereNull('u.disabled_at').whereNull('u.erased_at')
    .select('s.id as session_id', 's.second_factor_at', 's.last_seen_at', 's.created_at as session_created_at', 'u.id', 'u.uid', 'u.name', 'u.email', 'r.role')
  const first = rows[0]
  if (!first) return null
  const roles = new Set<Role>(['entrant'])
  for (const row of rows) if (isRole(row.role)) roles.add(row.role)
  return {
    actor: {
      userId: Number(first.id), uid: first.uid, name: first.name, email: first.email,
      roles: [...roles], sessionId: Number(first.session_id), secondFactor: first.second_factor_at !== null,
    },
    lastSeenAt: first.last_seen_at,
    createdAt: first.session_created_at,
  }
}

export interface NewSession {
  readonly uid: string
  readonly userId: number
  readonly expiresAt: Date
  readonly userAgent: string | null
  readonly addressHash: string | null
  readonly secondFactor: boolean
}

export async function insertSession(db: Knex, session: NewSession, now: Date): Promise<void> {
  const at = sqlTime(now)
  await db('user_sessions').insert({
    uid: session.uid, user_id: session.userId, created_at: at, last_seen_at: at, expires_at: sqlTime(session.expiresAt),
    user_agent: session.userAgent, address_hash: session.addressHash, second_factor_at: session.secondFactor ? at : null, reauth_at: at,
  })
}

export async function touchSession(db: Knex, id: number, now: Date, expiresAt: Date): Promise<void> {
  await db('user_sessions').where({ id }).whereNull('ended_at').update({ last_seen_at: sqlTime(now), expires_at: sqlTime(expiresAt) })
}

export async function markReauthenticated(db: Knex, id: number, now: Date): Promise<void> {
  await db('user_sessions').where({ id }).update({ reauth_at: sqlTime(now) })
}

export async function markSecondFactor(db: Knex, id: number, now: Date | null): Promise<void> {
  await db('user_sessions').where({ id }).update({ second_factor_at: now === null ? null : sqlTime(now) })
}

/** Live sessions of an account, the one seen last first. */
export async function listSessions(db: Knex, userId: number, now: Date) {
  const rows = await db('user_sessions').where({ user_id: userId }).whereNull('ended_at').where('expires_at', '>', sqlTime(now))
    .orderBy('last_seen_at', 'desc').limit(100)
  return rows.map(row => ({
    sessionId: Number(row.id), uid: row.uid, createdAt: isoTime(row.created_at), lastSeenAt: isoTime(row.last_seen_at),
    userAgent: row.user_agent, secondFactor: row.second_factor_at !== null,
  }))
}

/** Ends one session of an account; false when there is no such live one. */
export async function endSession(db: Knex, where: { readonly uid: string, readonly userId?: number }, now: Date): Promise<boolean> {
  const query = db('user_sessions').where({ uid: where.uid }).whereNull('ended_at')
  if (where.userId !== undefined) query.where({ user_id: where.userId })
  return await query.update({ ended_at: sqlTime(now) }) === 1
}

/** Ends the sessions of an account, but for one where `except` names it. */
export async function endSessions(db: Knex, userId: number, now: Date, except?: number): Promise<number> {
  const query = db('user_sessions').where({ user_id: userId }).whereNull('ended_at')
  if (except !== undefined) query.whereNot({ id: except })
  return query.update({ ended_at: sqlTime(now) })
}
