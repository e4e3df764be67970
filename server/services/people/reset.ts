import { inTransaction } from '../../../db/transaction'
import { sqlTime } from '../../../db/time'
import { DomainError } from '../../../shared/errors'
import type { Registry } from '../../composition'
import { endSessions } from '../../repositories/sessions'
import { findToken, isLive, spendTokens } from '../../repositories/tokens'
import { findByEmail, findById, isOpen, lockById, updateUser } from '../../repositories/users'
import { tokenHash } from '../notices/mint'
import { queueNotice } from '../notices/queue'
import { newDevice } from './devices'
import { mayTry, takeTry } from './limits'
import { lockLink } from './links'
import { checkNewPassword } from './passwordRules'
import { hashPassword } from './passwords'
import { keyedHash } from './secrets'

/** Sends a link for a new password, if there is an account; the answer does not tell. */
export async function askReset(registry: Registry, email: string, address: string): Promise<void> {
  const short = (text: string) => keyedHash(registry.config.secret, 'address', text).slice(0, 32)
  await takeTry(registry, [{ key: `mail:from:${short(address)}`, free: 20, window: 3600, longest: 600 }])
  if (!await mayTry(registry, [{ key: `mail:to:${short(email)}`, free: 3, window: 3600, longest: 1800 }])) return
  const account = await findByEmail(registry.db, email)
  if (!account || !isOpen(account)) return
  await queueNotice(registry.db, registry.clock.now(), { template: 'reset_password', toEmail: account.email, userId: account.id, args: { name: account.name }, locale: account.locale })
}

/**
 * Sets a new password by a link from a letter. The link proves the address; every session ends. The second factor
 * stays as it was.
 *
 * @returns the address to sign in with, and a mark for the browser: who has the letter is not kept waiting by strangers
 * @throws DomainError `link_spent`, `invalid_input`
 */
export async function resetPassword(registry: Registry, token: string, password: string): Promise<{ email: string, device: string }> {
  const now = registry.clock.now()
  const row = await findToken(registry.db, tokenHash(token))
  const owner = row?.user_id && row.kind === 'reset_password' && isLive(row, now) ? await findById(registry.db, row.user_id) : null
  if (!owner) throw new DomainError('link_spent')
  checkNewPassword(password, owner)
  const passwordHash = await hashPassword(password)
  return inTransaction(registry.db, async (trx) => {
    const link = await lockLink(trx, token, ['reset_password'], now)
    const account = await lockById(trx, link.user_id)
    // A letter to an address that the account has left behind opens nothing.
    if (!account || !isOpen(account) || account.email !== link.email) throw new DomainError('link_spent')
    await updateUser(trx, account.id, { password_hash: passwordHash, email_verified_at: account.email_verified_at ?? sqlTime(now) })
    await spendTokens(trx, account.id, ['reset_password', 'confirm_email', 'invite'], now)
    await endSessions(trx, account.id, now)
    await queueNotice(trx, now, { template: 'password_changed', toEmail: account.email, userId: account.id, args: { name: account.name }, locale: account.locale })
    return { email: account.email, device: newDevice(registry, account.uid) }
  })
}
