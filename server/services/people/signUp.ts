import { inTransaction } from '../../../db/transaction'
import { sqlTime } from '../../../db/time'
import { DomainError } from '../../../shared/errors'
import type { Registry } from '../../composition'
import { endSessions } from '../../repositories/sessions'
import { findToken, spendTokens } from '../../repositories/tokens'
import { findByEmail, findById, insertUser, isOpen, lockById, updateUser } from '../../repositories/users'
import { newUid } from '../moment'
import { tokenHash } from '../notices/mint'
import { queueNotice } from '../notices/queue'
import { forgiveTry, mayTry, takeTry, type Limit } from './limits'
import { lockLink } from './links'
import { checkNewPassword } from './passwordRules'
import { hashPassword, passwordFits } from './passwords'
import { keyedHash } from './secrets'

const short = (registry: Registry, text: string) => keyedHash(registry.config.secret, 'address', text).slice(0, 32)

/** Limits on asking for letters: by who asks, and by where the letters go. */
async function mayWrite(registry: Registry, email: string, address: string): Promise<boolean> {
  await takeTry(registry, [{ key: `mail:from:${short(registry, address)}`, free: 20, window: 3600, longest: 600 }])
  return mayTry(registry, [{ key: `mail:to:${short(registry, email)}`, free: 3, window: 3600, longest: 1800 }])
}

/**
 * Opens an account, which can be used once the address is confirmed. The answer is the same when there is an account
 * already: then its owner gets a letter that says so.
 *
 * @throws DomainError `invalid_input`, `too_many_requests`
 */
export async function signUp(registry: Registry, input: { name: string, email: string, password: string }, address: string): Promise<void> {
  checkNewPassword(input.password, input)
  const mayMail = await mayWrite(registry, input.email, address)
  const passwordHash = await hashPassword(input.password)
  if (!mayMail) return
  const now = registry.clock.now()
  await inTransaction(registry.db, async (trx) => {
    const found = await findByEmail(trx, input.email)
    const account = found ? await lockById(trx, found.id) : null
    if (account && !isOpen(account)) return
    if (account?.email_verified_at) {
      return queueNotice(trx, now, { template: 'account_exists', toEmail: account.email, userId: account.id, args: { name: account.name }, locale: account.locale })
    }
    // Until somebody confirms, the last to sign up has the word. Confirming asks for that password, so whoever wrote
    // another person's address gains nothing from that person's click.
    if (account) await updateUser(trx, account.id, { name: input.name, password_hash: passwordHash })
    const id = account?.id ?? await insertUser(trx, { uid: newUid(now), email: input.email, name: input.name, password_hash: passwordHash, created_at: sqlTime(now) })
    await queueNotice(trx, now, { template: 'confirm_email', toEmail: input.email, userId: id, args: { name: input.name } })
  })
}

/** Sends the confirmation again, if there is anything to confirm; the answer does not tell. */
export async function askConfirmation(registry: Registry, email: string, address: string): Promise<void> {
  if (!await mayWrite(registry, email, address)) return
  const account = await findByEmail(registry.db, email)
  if (!account || !isOpen(account) || account.email_verified_at || account.password_hash === null) return
  await queueNotice(registry.db, registry.clock.now(), { template: 'confirm_email', toEmail: email, userId: account.id, args: { name: account.name }, locale: account.locale })
}

/** Whether the link confirms a sign-up, which asks for the password too. */
async function checkSignUpPassword(registry: Registry, token: string, password: string | undefined): Promise<void> {
  const hash = tokenHash(token)
  const row = await findToken(registry.db, hash)
  if (row?.kind !== 'confirm_email' || row.user_id === null) return
  const limit: Limit = { key: `confirm:${hash.slice(0, 32)}`, free: 5, window: 3600, longest: 900 }
  await takeTry(registry, [limit])
  const account = await findById(registry.db, row.user_id)
  if (!await passwordFits(account?.password_hash ?? null, password ?? '')) {
    throw new DomainError('password_wrong', { fields: [{ path: 'password', code: 'password_wrong' }] })
  }
  await forgiveTry(registry, [limit])
}

/**
 * Confirms an address: that of a new account, with its password, or the new one of an account.
 *
 * @returns the address that is confirmed now
 * @throws DomainError `link_spent`, `password_wrong`, `too_many_requests`
 */
export async function confirmEmail(registry: Registry, token: string, password: string | undefined): Promise<{ email: string }> {
  await checkSignUpPassword(registry, token, password)
  const now = registry.clock.now()
  return inTransaction(registry.db, async (trx) => {
    const link = await lockLink(trx, token, ['confirm_email', 'change_email'], now)
    const account = await lockById(trx, link.user_id)
    if (!account || !isOpen(account)) throw new DomainError('link_spent')
    await spendTokens(trx, account.id, [link.kind], now)
    if (link.kind === 'confirm_email') {
      await updateUser(trx, account.id, { email_verified_at: sqlTime(now) })
      return { email: account.email }
    }
    const email = link.email!
    if (email !== account.email && await findByEmail(trx, email)) throw new DomainError('link_spent')
    await updateUser(trx, account.id, { email, email_verified_at: sqlTime(now) })
    await endSessions(trx, account.id, now)
    await spendTokens(trx, account.id, ['reset_password', 'confirm_email'], now)
    await queueNotice(trx, now, { template: 'email_changed', toEmail: account.email, userId: account.id, args: { name: account.name, email }, locale: account.locale })
    return { email }
  })
}
