import type { Knex } from 'knex'
import { sqlTime } from '../../db/time'
import type { Role, StaffRole } from '../../shared/domain/access/roles'

export interface Addressee {
  readonly id: number
  readonly name: string
  readonly email: string
  readonly locale: string
}

/** Registrars who hold the role now and can sign in. */
export async function listRegistrars(db: Knex, now: Date): Promise<Addressee[]> {
  const at = sqlTime(now)
  return db('users as u').join('user_roles as r', 'r.user_id', 'u.id')
    .where('r.role', 'registrar').where('r.from_at', '<=', at).andWhere(q => q.whereNull('r.to_at').orWhere('r.to_at', '>', at))
    .whereNull('u.disabled_at').whereNull('u.erased_at').whereNotNull('u.email_verified_at')
    .orderBy('u.id').select('u.id', 'u.name', 'u.email', 'u.locale')
}

export async function holdsRole(db: Knex, userId: number, role: Role): Promise<boolean> {
  return await db('user_roles').where({ user_id: userId, role }).whereNull('to_at').first('id') !== undefined
}

export async function insertRole(trx: Knex, userId: number, role: Role, grantedBy: number | null, now: Date): Promise<void> {
  await trx('user_roles').insert({ user_id: userId, role, from_at: sqlTime(now), granted_by: grantedBy })
}

/** Ends a role; false when it is not held. */
export async function endRole(trx: Knex, userId: number, role: Role, endedBy: number, now: Date): Promise<boolean> {
  return await trx('user_roles').where({ user_id: userId, role }).whereNull('to_at').update({ to_at: sqlTime(now), ended_by: endedBy }) > 0
}

export async function insertProposal(trx: Knex, proposal: { uid: string, userId: number, role: StaffRole, proposedBy: number }, now: Date): Promise<void> {
  await trx('role_proposals').insert({ uid: proposal.uid, user_id: proposal.userId, role: proposal.role, proposed_by: proposal.proposedBy, proposed_at: sqlTime(now) })
}

/** A proposal, locked for its decision. Needs a transaction. */
export async function lockProposal(trx: Knex, uid: string) {
  return await trx('role_proposals').where({ uid }).forUpdate().first() ?? null
}

export async function decideProposal(trx: Knex, id: number, decision: 'granted' | 'refused' | 'withdrawn', decidedBy: number, now: Date): Promise<void> {
  await trx('role_proposals').where({ id }).update({ decision, decided_by: decidedBy, decided_at: sqlTime(now) })
}
