import type { Knex } from 'knex'
import { sqlTime } from '../../db/time'
import { isRole, type Actor, type Role } from '../../shared/domain/access/roles'

/** Session, account and roles in one query. */
export async function findActor(db: Knex, sessionUid: string, now: Date): Promise<Actor> {
  const at = sqlTime(now)
  const rows = await db('user_sessions as s')
    .join('users as u', 'u.id', 's.user_id')
    .leftJoin('user_roles as r', q => q.on('r.user_id', 'u.id').andOn('r.from_at', '<=', db.raw('?', [at]))
      .andOn(p => p.onNull('r.to_at').orOn('r.to_at', '>', db.raw('?', [at]))))
    .where('s.uid', sessionUid).whereNull('s.ended_at').where('s.expires_at', '>', at)
    .whereNull('u.disabled_at').whereNull('u.erased_at')
    .select('s.id as session_id', 's.second_factor_at', 'u.id', 'u.uid', 'u.name', 'u.email', 'r.role')
  const first = rows[0]
  if (!first) return null
  const roles = new Set<Role>(['entrant'])
  for (const row of rows) if (isRole(row.role)) roles.add(row.role)
  return {
    userId: Number(first.id), uid: first.uid, name: first.name, email: first.email,
    roles: [...roles], sessionId: Number(first.session_id), secondFactor: first.second_factor_at !== null,
  }
}
