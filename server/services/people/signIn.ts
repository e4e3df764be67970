import { newUid } from '../moment'
import { DomainError } from '../../../shared/errors'
import { normalEmail } from '../../../shared/schemas/people'
import type { Registry } from '../../composition'
import { insertSession } from '../../repositories/sessions'
import { findByEmail, isOpen, type Account } from '../../repositories/users'
import { deviceOf, newDevice } from './devices'
import { forgiveTry, takeTry, type Limit } from './limits'
import { passwordFits } from './passwords'
import { takeSecondFactor } from './secondFactorCode'
import { keyedHash } from './secrets'
import { firstExpiry } from './sessions'

export interface SignInRequest {
  readonly email: string
  readonly password: string
  /** of the authenticator, or a recovery code; empty at the first step */
  readonly code: string
  /** network address, as far as it may be believed */
  readonly address: string
  readonly userAgent: string | null
  /** mark of the browser, from an earlier sign-in */
  readonly device: string | null
}

export interface SignedIn {
  /** id of the session, the one thing that the token carries */
  readonly sid: string
  /** mark by which this browser is known from now on; null when it is known already */
  readonly device: string | null
}

interface Limits {
  /** begin anew after a success */
  readonly own: readonly Limit[]
  /** other people's tries are counted here too */
  readonly shared: readonly Limit[]
}

function limitsOf(registry: Registry, request: SignInRequest, email: string, device: string | null): Limits {
  const short = (text: string) => keyedHash(registry.config.secret, 'address', text).slice(0, 32)
  if (device) return { own: [{ key: `in:device:${short(device)}`, free: 10, window: 3600, longest: 900 }], shared: [] }
  return {
    own: [{ key: `in:pair:${short(`${email} ${request.address}`)}`, free: 5, window: 3600, longest: 900 }],
    shared: [
      { key: `in:address:${short(request.address)}`, free: 30, window: 900, longest: 300 },
      // Short, since a stranger could keep it going; the account's own browsers and its reset link pass by it.
      { key: `in:account:${short(email)}`, free: 50, window: 3600, longest: 60 },
    ],
  }
}

/** The second step is counted by account as well, since who gets here knows the password. */
async function checkSecondFactor(registry: Registry, account: Account, request: SignInRequest, device: string | null): Promise<void> {
  const limits: Limit[] = device ? [] : [{ key: `in:code:${account.id}`, free: 10, window: 86_400, longest: 900 }]
  await takeTry(registry, limits)
  if (!await takeSecondFactor(registry, account, request.code)) throw new DomainError('second_factor_required', { details: { reason: 'wrong' } })
  await forgiveTry(registry, limits)
}

/**
 * Signs somebody in and begins a session. An unknown address, a closed account and a wrong password take the same time
 * and are refused with the same words; only who knows the password hears more.
 *
 * @throws DomainError `sign_in_failed` (401), `email_unconfirmed` (403), `second_factor_required` (403, with the reason
 * `wrong` for a code that does not fit), `too_many_requests` (429, with `retryAfter`)
 */
export async function signIn(registry: Registry, request: SignInRequest): Promise<SignedIn> {
  const email = normalEmail(request.email).slice(0, 254)
  const account = await findByEmail(registry.db, email)
  const device = account ? deviceOf(registry, account.uid, request.device) : null
  const limits = limitsOf(registry, request, email, device)
  await takeTry(registry, [...limits.own, ...limits.shared])

  const fits = await passwordFits(account?.password_hash ?? null, request.password)
  if (!account || !fits || !isOpen(account)) throw new DomainError('sign_in_failed')
  if (account.email_verified_at === null) throw new DomainError('email_unconfirmed')
  const secondFactor = account.totp_enabled_at !== null
  if (secondFactor) {
    if (!request.code.trim()) {
      // The password was right: asking for the code is no failed try.
      await forgiveTry(registry, [], [...limits.own, ...limits.shared])
      throw new DomainError('second_factor_required')
    }
    await checkSecondFactor(registry, account, request, device)
  }
  await forgiveTry(registry, limits.own, limits.shared)

  const now = registry.clock.now()
  const sid = newUid(now)
  await insertSession(registry.db, {
    uid: sid,
    userId: account.id,
    expiresAt: firstExpiry(now),
    userAgent: request.userAgent?.slice(0, 300) ?? null,
    addressHash: keyedHash(registry.config.secret, 'address', request.address),
    secondFactor,
  }, now)
  return { sid, device: device ? null : newDevice(registry, account.uid) }
}
