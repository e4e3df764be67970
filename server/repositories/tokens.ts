import type { Knex } from 'knex'
import { sqlTime } from '../../db/time'
import type { UserTokensRow } from '../../db/tables'

export type Token = UserTokensRow

/** A link's row, whatever its state. */
export async function findToken(db: Knex, hash: string): Promise<Token | null> {
  return await db('user_tokens').where({ token_hash: hash }).first() ?? null
}

/** A link's row, locked so that it is spent once. Needs a transaction. */
export async function lockToken(trx: Knex, hash: string): Promise<Token | null> {
  return await trx('user_tokens').where({ token_hash: hash }).forUpdate().first() ?? null
}

export function isLive(token: Token, now: Date): boolean {
  return token.used_at === null && token.expires_at > sqlTime(now)
}

/** Spends every link of these kinds that an account still has. */
export async function spendTokens(trx: Knex, userId: number, kinds: readonly Token['kind'][], now: Date): Promise<void> {
  await trx('user_tokens').where({ user_id: userId }).whereIn('kind', [...kinds]).whereNull('used_at').update({ used_at: sqlTime(now) })
}
