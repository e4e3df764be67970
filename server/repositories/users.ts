import type { Knex } from 'knex'
import { sqlTime } from '../../db/time'
import type { UsersInsert, UsersRow } from '../../db/tables'

/** An account as the services of people work with it. It never leaves the server as it is. */
export type Account = UsersRow

export async function findByEmail(db: Knex, email: string): Promise<Account | null> {
  return await db('users').where({ email }).first() ?? null
}

export async function findById(db: Knex, id: number): Promise<Account | null> {
  return await db('users').where({ id }).first() ?? null
}

export async function findByUid(db: Knex, uid: string): Promise<Account | null> {
  return await db('users').where({ uid }).first() ?? null
}

/** The account, locked for every change of its rights and secrets. Needs a transaction. */
export async function lockById(trx: Knex, id: number): Promise<Account | null> {
  return await trx('users').where({ id }).forUpdate().first() ?? null
}

export async function lockByUid(trx: Knex, uid: string): Promise<Account | null> {
  return await trx('users').where({ uid }).forUpdate().first() ?? null
}

/** Whether nobody has closed or erased the account. */
export const isOpen = (account: Account): boolean => account.disabled_at === null && account.erased_at === null

export async function insertUser(trx: Knex, row: UsersInsert): Promise<number> {
  const [id] = await trx('users').insert(row)
  return Number(id)
}

export async function updateUser(db: Knex, id: number, changes: Partial<UsersInsert>): Promise<void> {
  await db('users').where({ id }).update(changes)
}

/** Keeps the step of a used code; false when a code of this or a later step was used before. */
export async function keepTotpStep(db: Knex, id: number, step: number): Promise<boolean> {
  const changed = await db('users').where({ id })
    .andWhere(q => q.whereNull('totp_last_step').orWhere('totp_last_step', '<', step))
    .update({ totp_last_step: step })
  return changed === 1
}

/** Marks a recovery code as used; false when there is none such left. */
export async function spendRecoveryCode(db: Knex, userId: number, codeHash: string, now: Date): Promise<boolean> {
  const changed = await db('recovery_codes').where({ user_id: userId, code_hash: codeHash }).whereNull('used_at').update({ used_at: sqlTime(now) })
  return changed === 1
}

export async function replaceRecoveryCodes(trx: Knex, userId: number, hashes: readonly string[], now: Date): Promise<void> {
  await trx('recovery_codes').where({ user_id: userId }).delete()
  if (hashes.length > 0) await trx('recovery_codes').insert(hashes.map(code_hash => ({ user_id: userId, code_hash, created_at: sqlTime(now) })))
}

export async function countRecoveryCodes(db: Knex, userId: number): Promise<number> {
  const row = await db('recovery_codes').where({ user_id: userId }).whereNull('used_at').count({ n: '*' }).first() as { n: number } | undefined
  return Number(row?.n ?? 0)
}
