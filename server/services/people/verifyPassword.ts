import type { ActiveActor } from '../../../shared/domain/access/roles'
import { DomainError } from '../../../shared/errors'
import type { Registry } from '../../composition'
import { markReauthenticated } from '../../repositories/sessions'
import { findById, isOpen } from '../../repositories/users'
import { forgiveTry, takeTry, type Limit } from './limits'
import { passwordFits } from './passwords'
import { takeSecondFactor } from './secondFactorCode'

export interface PasswordProof {
  /** code of the authenticator or a recovery code, for accounts that have a second factor */
  readonly code?: string | undefined
}

/**
 * Asks once more who is sitting there, before an act that signs something or changes the account: the password, and
 * the second factor where the account has one. Call it before the act's transaction.
 *
 * @throws DomainError `password_wrong` (422, field `password`), `second_factor_required` (403, field `code`; also for a
 * wrong or used code), `too_many_requests` (429)
 */
export async function verifyPassword(registry: Registry, actor: ActiveActor, password: string, proof: PasswordProof = {}): Promise<void> {
  const limit: Limit = { key: `proof:session:${actor.sessionId}`, free: 5, window: 3600, longest: 900 }
  await takeTry(registry, [limit])
  const account = await findById(registry.db, actor.userId)
  const fits = await passwordFits(account?.password_hash ?? null, password)
  if (!account || !isOpen(account) || !fits) throw new DomainError('password_wrong', { fields: [{ path: 'password', code: 'password_wrong' }] })
  if (account.totp_enabled_at !== null) {
    if (!proof.code?.trim()) {
      // Asking for the code is no failed try.
      await forgiveTry(registry, [], [limit])
      throw new DomainError('second_factor_required', { fields: [{ path: 'code', code: 'second_factor_code' }] })
    }
    if (!await takeSecondFactor(registry, account, proof.code)) {
      throw new DomainError('second_factor_required', { fields: [{ path: 'code', code: 'second_factor_wrong' }] })
    }
  }
  await forgiveTry(registry, [limit])
  await markReauthenticated(registry.db, actor.sessionId, registry.clock.now())
}
