import { inTransaction } from '../../../db/transaction'
import { sqlTime } from '../../../db/time'
import type { ActiveActor } from '../../../shared/domain/access/roles'
import { DomainError } from '../../../shared/errors'
import { emailField } from '../../../shared/schemas/people'
import type { Registry } from '../../composition'
import { holdsRole, insertRole, listRegistrars } from '../../repositories/roles'
import { findToken, isLive, spendTokens } from '../../repositories/tokens'
import { findByEmail, findById, insertUser, isOpen, lockById, lockByUid, updateUser } from '../../repositories/users'
import { newUid } from '../moment'
import { mintLink, tokenHash } from '../notices/mint'
import { queueNotice } from '../notices/queue'
import { lockLink } from './links'
import { checkNewPassword } from './passwordRules'
import { hashPassword } from './passwords'
import { giveRoleWithin, type GivenRole, type RoleOutcome } from './roles'
import { verifyPassword, type PasswordProof } from './verifyPassword'

type Proof = { readonly password: string } & PasswordProof

/**
 * A registrar invites somebody. The account is there at once, so that its role can be given or proposed; it can be
 * used once the invitation was accepted.
 *
 * @throws DomainError `duplicate` (field `email`) when the address has an account, and as `verifyPassword`
 */
export async function invite(registry: Registry, actor: ActiveActor, input: { name: string, email: string, role: GivenRole | null } & Proof): Promise<{ id: string, role: RoleOutcome | null }> {
  await verifyPassword(registry, actor, input.password, input)
  const now = registry.clock.now()
  return inTransaction(registry.db, async (trx) => {
    if (await findByEmail(trx, input.email)) throw new DomainError('duplicate', { fields: [{ path: 'email', code: 'taken' }] })
    const uid = newUid(now)
    const id = await insertUser(trx, { uid, email: input.email, name: input.name, created_at: sqlTime(now) })
    const target = (await lockById(trx, id))!
    const role = input.role === null ? null : await giveRoleWithin(trx, { actor, target, role: input.role, now })
    await queueNotice(trx, now, {
      template: 'invite', toEmail: input.email, userId: id,
      args: { name: input.name, inviter: actor.name, role: { text: `names.roles.${input.role ?? 'entrant'}` } },
    })
    return { id: uid, role }
  })
}

/** Sends an invitation again. @throws DomainError `not_found`, `wrong_state` when it was accepted */
export async function inviteAgain(registry: Registry, actor: ActiveActor, userUid: string): Promise<void> {
  const now = registry.clock.now()
  await inTransaction(registry.db, async (trx) => {
    const target = await lockByUid(trx, userUid)
    if (!target || !isOpen(target)) throw new DomainError('not_found')
    if (target.email_verified_at !== null) throw new DomainError('wrong_state')
    await queueNotice(trx, now, {
      template: 'invite', toEmail: target.email, userId: target.id, locale: target.locale,
      args: { name: target.name, inviter: actor.name, role: null },
    })
  })
}

/**
 * Accepts an invitation: name, password, and the address is confirmed by the link. The link of a first registrar gives
 * that role too, as long as nobody holds it.
 *
 * @returns the address to sign in with
 * @throws DomainError `link_spent`, `invalid_input`
 */
export async function acceptInvitation(registry: Registry, input: { token: string, name: string, password: string }): Promise<{ email: string }> {
  const now = registry.clock.now()
  const row = await findToken(registry.db, tokenHash(input.token))
  const owner = row?.user_id && isLive(row, now) ? await findById(registry.db, row.user_id) : null
  if (!owner) throw new DomainError('link_spent')
  checkNewPassword(input.password, { email: owner.email, name: input.name })
  const passwordHash = await hashPassword(input.password)
  return inTransaction(registry.db, async (trx) => {
    const link = await lockLink(trx, input.token, ['invite', 'first_registrar'], now)
    const account = await lockById(trx, link.user_id)
    const first = link.kind === 'first_registrar'
    // An invited person who has signed up in the meantime has a password of their own.
    if (!account || !isOpen(account) || (!first && account.email_verified_at !== null)) throw new DomainError('link_spent')
    if (first && (await listRegistrars(trx, now)).length > 0) throw new DomainError('link_spent')
    await updateUser(trx, account.id, { name: input.name, password_hash: passwordHash, email_verified_at: account.email_verified_at ?? sqlTime(now) })
    if (first && !await holdsRole(trx, account.id, 'registrar')) await insertRole(trx, account.id, 'registrar', null, now)
    await spendTokens(trx, account.id, ['invite', 'first_registrar', 'confirm_email', 'reset_password'], now)
    return { email: account.email }
  })
}

/**
 * A one-time link for the first registrar, for whoever runs the installation.
 *
 * @returns the whole address, good for a day
 * @throws DomainError `invalid_input` for what is no address, `duplicate` when there is a registrar
 */
export async function firstRegistrarLink(registry: Registry, address: string): Promise<string> {
  const email = emailField.safeParse(address)
  if (!email.success) throw new DomainError('invalid_input', { fields: [{ path: 'email', code: 'email' }] })
  const now = registry.clock.now()
  return inTransaction(registry.db, async (trx) => {
    if ((await listRegistrars(trx, now)).length > 0) throw new DomainError('duplicate', { details: { reason: 'registrar_exists' } })
    const found = await findByEmail(trx, email.data)
    const id = found?.id ?? await insertUser(trx, { uid: newUid(now), email: email.data, name: email.data.split('@')[0]!, created_at: sqlTime(now) })
    await spendTokens(trx, id, ['first_registrar'], now)
    return `${registry.config.publicUrl}${await mintLink(trx, now, 'first_registrar', { userId: id, email: email.data })}`
  })
}
