import type { Knex } from 'knex'
import type { StakeClearancesInsert, StakeDeclarationsInsert } from '../../db/tables'

export interface ClearanceRow {
  readonly user_id: number
  readonly kind: 'name' | 'address'
  readonly name_key: string
  readonly address_key: string | null
}

export async function listClearances(db: Knex, entryId: number): Promise<ClearanceRow[]> {
  return db('stake_clearances as c').join('entry_people as p', 'p.id', 'c.entry_person_id').where('c.entry_id', entryId)
    .select('c.user_id', 'c.kind', 'p.name_key', 'p.address_key')
}

export async function insertClearance(trx: Knex, row: StakeClearancesInsert): Promise<void> {
  await trx('stake_clearances').insert(row)
}

export async function listDeclarers(db: Knex, entryId: number): Promise<number[]> {
  return db('stake_declarations').where({ entry_id: entryId }).pluck('user_id')
}

export async function insertDeclaration(trx: Knex, row: StakeDeclarationsInsert): Promise<void> {
  await trx('stake_declarations').insert(row)
}

/** Accounts that reported the record and whose report was not dismissed. */
export async function listReporters(db: Knex, entryId: number): Promise<number[]> {
  const ids: (number | null)[] = await db('challenges').where({ entry_id: entryId }).whereNot({ state: 'dismissed' }).pluck('reporter_user_id')
  return ids.filter(id => id !== null)
}

export interface AccountRow { readonly id: number, readonly uid: string, readonly name: string, readonly address: string | null, readonly shop_name: string | null }

export async function findAccounts(db: Knex, ids: readonly number[]): Promise<AccountRow[]> {
  return ids.length === 0 ? [] : db('users').whereIn('id', [...ids]).select('id', 'uid', 'name', 'address', 'shop_name')
}

export async function findAccountByUid(db: Knex, uid: string): Promise<AccountRow | undefined> {
  return db('users').where({ uid }).whereNull('disabled_at').whereNull('erased_at').first('id', 'uid', 'name', 'address', 'shop_name')
}

export async function holdsRole(db: Knex, userId: number, role: 'measurer' | 'judge' | 'reviewer' | 'registrar', at: string): Promise<boolean> {
  const held = await db('user_roles').where({ user_id: userId, role }).where('from_at', '<=', at)
    .where(open => open.whereNull('to_at').orWhere('to_at', '>', at)).first('id')
  return held !== undefined
}

export interface AccreditationRow {
  readonly valid_from: string
  readonly valid_to: string
  readonly suspended_at: string | null
  readonly species: string
}

/** Accreditations of an account, one row a species. */
export async function listAccreditations(db: Knex, userId: number): Promise<AccreditationRow[]> {
  return db('accreditations as a').join('accreditation_species as s', 's.accreditation_id', 'a.id').join('species as p', 'p.id', 's.species_id')
    .where('a.user_id', userId).select('a.valid_from', 'a.valid_to', 'a.suspended_at', 'p.code as species')
}
