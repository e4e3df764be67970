import { inTransaction } from '../../../db/transaction'
import { isoTime } from '../../../db/time'
import type { ActiveActor } from '../../../shared/domain/access/roles'
import { DomainError } from '../../../shared/errors'
import type { Registry } from '../../composition'
import { findDistrict, listDistricts } from '../../repositories/catalogue'
import { endSessions } from '../../repositories/sessions'
import { spendTokens } from '../../repositories/tokens'
import { countRecoveryCodes, findByEmail, findById, updateUser } from '../../repositories/users'
import { queueNotice } from '../notices/queue'
import { checkNewPassword } from './passwordRules'
import { hashPassword } from './passwords'
import { verifyPassword, type PasswordProof } from './verifyPassword'

export interface Profile {
  readonly name: string
  readonly phone: string | null
  readonly address: string | null
  readonly shopName: string | null
  /** code of the district */
  readonly district: string | null
  readonly printName: 'full' | 'initials' | 'withheld'
}

/** The account as its own person sees it. */
export async function readAccount(registry: Registry, actor: ActiveActor) {
  const account = await findById(registry.db, actor.userId)
  if (!account) throw new DomainError('not_found')
  const districts = await listDistricts(registry.db)
  return {
    email: account.email,
    name: account.name,
    phone: account.phone,
    address: account.address,
    shopName: account.shop_name,
    district: districts.find(one => one.id === account.district_id)?.code ?? null,
    printName: account.print_name,
    createdAt: isoTime(account.created_at),
    roles: actor.roles,
    withheld: actor.withheld ?? [],
    secondFactor: account.totp_enabled_at !== null,
    recoveryCodes: await countRecoveryCodes(registry.db, account.id),
    districts: districts.map(({ code, name }) => ({ code, name })),
  }
}

/** Changes what the person says about themselves. @throws DomainError `invalid_input` for an unknown district */
export async function changeProfile(registry: Registry, actor: ActiveActor, profile: Profile): Promise<void> {
  const district = profile.district === null ? null : await findDistrict(registry.db, profile.district)
  if (district === undefined) throw new DomainError('invalid_input', { fields: [{ path: 'district', code: 'invalid' }] })
  await updateUser(registry.db, actor.userId, {
    name: profile.name, phone: profile.phone, address: profile.address, shop_name: profile.shopName,
    district_id: district?.id ?? null, print_name: profile.printName,
  })
}

/**
 * Changes the password and ends every other session.
 *
 * @throws DomainError as `verifyPassword`, and `invalid_input` with the field `newPassword`
 */
export async function changePassword(registry: Registry, actor: ActiveActor, input: { password: string, newPassword: string } & PasswordProof): Promise<void> {
  checkNewPassword(input.newPassword, actor, 'newPassword')
  await verifyPassword(registry, actor, input.password, input)
  const passwordHash = await hashPassword(input.newPassword)
  const now = registry.clock.now()
  await inTransaction(registry.db, async (trx) => {
    await updateUser(trx, actor.userId, { password_hash: passwordHash })
    await endSessions(trx, actor.userId, now, actor.sessionId)
    await spendTokens(trx, actor.userId, ['reset_password'], now)
    await queueNotice(trx, now, { template: 'password_changed', toEmail: actor.email, userId: actor.userId, args: { name: actor.name } })
  })
}

/**
 * Asks for another e-mail address. It counts once the letter to it is answered; the answer is the same when the
 * address belongs to another account, whose owner is told.
 *
 * @throws DomainError as `verifyPassword`
 */
export async function askEmailChange(registry: Registry, actor: ActiveActor, input: { email: string, password: string } & PasswordProof): Promise<void> {
  await verifyPassword(registry, actor, input.password, input)
  const now = registry.clock.now()
  if (input.email === actor.email) return
  const other = await findByEmail(registry.db, input.email)
  await queueNotice(registry.db, now, other
    ? { template: 'account_exists', toEmail: other.email, userId: other.id, args: { name: other.name }, locale: other.locale }
    : { template: 'change_email', toEmail: input.email, userId: actor.userId, args: { name: actor.name } })
}
