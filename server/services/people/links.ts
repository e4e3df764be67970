import type { Knex } from 'knex'
import { DomainError } from '../../../shared/errors'
import type { Registry } from '../../composition'
import { findToken, isLive, lockToken, type Token } from '../../repositories/tokens'
import { findById, isOpen } from '../../repositories/users'
import { tokenHash } from '../notices/mint'

/** What a page says about the link it was opened with. */
export interface LinkFacts {
  readonly kind: Token['kind']
  readonly email: string
  /** as the registrar wrote it, for who was invited */
  readonly name: string
}

/** Reads a link without spending it, so that a page can say what it is for. @throws DomainError `link_spent` */
export async function readLink(registry: Registry, token: string): Promise<LinkFacts> {
  const row = await findToken(registry.db, tokenHash(token))
  const account = row?.user_id ? await findById(registry.db, row.user_id) : null
  if (!row || row.kind === 'claim' || !isLive(row, registry.clock.now()) || !account || !isOpen(account)) throw new DomainError('link_spent')
  return { kind: row.kind, email: row.email ?? account.email, name: row.kind === 'invite' || row.kind === 'first_registrar' ? account.name : '' }
}

/**
 * Locks a link that is still good for one of these purposes. The caller spends it in the same transaction.
 *
 * @throws DomainError `link_spent` for a wrong, used, run out or foreign one: all alike
 */
export async function lockLink(trx: Knex, token: string, kinds: readonly Token['kind'][], now: Date): Promise<Token & { readonly user_id: number }> {
  const row = await lockToken(trx, tokenHash(token))
  if (!row || !kinds.includes(row.kind) || !isLive(row, now) || row.user_id === null) throw new DomainError('link_spent')
  return { ...row, user_id: row.user_id }
}
