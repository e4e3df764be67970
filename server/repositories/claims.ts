import type { Knex } from 'knex'

export async function insertClaim(trx: Knex, row: { token_hash: string, payload: string, created_at: string, expires_at: string }): Promise<void> {
  await trx('user_tokens').insert({ kind: 'claim', ...row })
}

/** Locks a claim that can still be made. */
export async function lockClaim(trx: Knex.Transaction, tokenHash: string, at: string): Promise<{ id: number, payload: string | null } | undefined> {
  return trx('user_tokens').where({ kind: 'claim', token_hash: tokenHash }).whereNull('used_at').where('expires_at', '>', at).forUpdate().first('id', 'payload')
}

export async function spendClaim(trx: Knex, id: number, at: string): Promise<void> {
  await trx('user_tokens').where({ id }).update({ used_at: at })
}
