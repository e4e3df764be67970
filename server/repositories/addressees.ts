import type { Knex } from 'knex'
import type { Role } from '../../shared/domain/access/roles'

export interface Addressee { readonly id: number, readonly name: string, readonly email: string, readonly locale: string }

/** Accounts that can be written to: open ones with an address that was confirmed. */
export async function listAddressees(trx: Knex, userIds: readonly number[]): Promise<Addressee[]> {
  if (userIds.length === 0) return []
  return trx('users').whereIn('id', [...userIds]).whereNull('disabled_at').whereNull('erased_at').whereNotNull('email_verified_at')
    .orderBy('id').select('id', 'name', 'email', 'locale')
}

/** Accounts that hold a role at an instant. */
export async function listHolders(trx: Knex, role: Role, at: string): Promise<number[]> {
  return trx('user_roles').where({ role }).where('from_at', '<=', at)
    .where(held => held.whereNull('to_at').orWhere('to_at', '>', at)).distinct().orderBy('user_id').pluck('user_id')
}
