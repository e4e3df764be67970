import type { Knex } from 'knex'
import { inTransaction } from '../../../db/transaction'
import { isStaffRole, type ActiveActor, type Role, type StaffRole } from '../../../shared/domain/access/roles'
import { DomainError } from '../../../shared/errors'
import type { Registry } from '../../composition'
import { decideProposal, endRole, holdsRole, insertProposal, insertRole, listRegistrars, lockProposal } from '../../repositories/roles'
import { isOpen, lockById, lockByUid, type Account } from '../../repositories/users'
import { newUid } from '../moment'
import { queueNotice, type NoticeValue } from '../notices/queue'
import { verifyPassword, type PasswordProof } from './verifyPassword'

type Proof = { readonly password: string } & PasswordProof
export type GivenRole = Exclude<Role, 'entrant'>
export type RoleOutcome = 'given' | 'proposed'

const roleName = (role: Role): NoticeValue => ({ text: `names.roles.${role}` })

interface Deed {
  readonly actor: Pick<ActiveActor, 'userId' | 'name'>
  readonly target: Account
  readonly role: GivenRole
  readonly now: Date
}

/** Every registrar hears of it, but for the one whose act it is and the one it is about, who hears apart. */
async function tellRegistrars(trx: Knex, deed: Deed, template: 'role_changed_registrars' | 'role_proposed', change?: 'given' | 'taken' | 'refused'): Promise<void> {
  for (const registrar of await listRegistrars(trx, deed.now)) {
    if (registrar.id === deed.actor.userId || registrar.id === deed.target.id) continue
    await queueNotice(trx, deed.now, {
      template, toEmail: registrar.email, userId: registrar.id, locale: registrar.locale,
      args: { name: registrar.name, person: deed.target.name, role: roleName(deed.role), by: deed.actor.name, ...(change ? { change: { text: `people.change.${change}` } } : {}) },
    })
  }
}

/** Who was invited and has not accepted yet hears of the role in the invitation alone. */
async function tellTarget(trx: Knex, deed: Deed, template: 'role_given' | 'role_taken'): Promise<void> {
  const { target } = deed
  if (target.email_verified_at === null) return
  await queueNotice(trx, deed.now, { template, toEmail: target.email, userId: target.id, locale: target.locale, args: { name: target.name, role: roleName(deed.role) } })
}

async function grant(trx: Knex, deed: Deed): Promise<void> {
  await insertRole(trx, deed.target.id, deed.role, deed.actor.userId, deed.now)
  await tellTarget(trx, deed, 'role_given')
  await tellRegistrars(trx, deed, 'role_changed_registrars', 'given')
}

/**
 * Gives a role, or proposes it: a role that decides about other people's animals needs a second registrar's word where
 * there is one besides the proposer and the person. Runs in the caller's transaction, with the person's row locked.
 */
export async function giveRoleWithin(trx: Knex, deed: Deed): Promise<RoleOutcome> {
  const { actor, target, role, now } = deed
  if (target.id === actor.userId) throw new DomainError('forbidden', { details: { reason: 'own_roles' } })
  if (!isOpen(target)) throw new DomainError('not_found')
  if (await holdsRole(trx, target.id, role)) throw new DomainError('duplicate', { fields: [{ path: 'role', code: 'held_already' }] })
  const seconds = (await listRegistrars(trx, now)).filter(one => one.id !== actor.userId && one.id !== target.id)
  if (!isStaffRole(role) || seconds.length === 0) {
    await grant(trx, deed)
    return 'given'
  }
  await insertProposal(trx, { uid: newUid(now), userId: target.id, role, proposedBy: actor.userId }, now)
  await tellRegistrars(trx, deed, 'role_proposed')
  return 'proposed'
}

async function lockTarget(trx: Knex, uid: string): Promise<Account> {
  const target = await lockByUid(trx, uid)
  if (!target || target.erased_at !== null) throw new DomainError('not_found')
  return target
}

/**
 * A registrar gives somebody a role.
 *
 * @throws DomainError `forbidden` (own roles), `duplicate` (held or proposed already), `not_found`, and as `verifyPassword`
 */
export async function giveRole(registry: Registry, actor: ActiveActor, input: { userUid: string, role: GivenRole } & Proof): Promise<RoleOutcome> {
  if (input.userUid === actor.uid) throw new DomainError('forbidden', { details: { reason: 'own_roles' } })
  await verifyPassword(registry, actor, input.password, input)
  const now = registry.clock.now()
  return inTransaction(registry.db, async trx => giveRoleWithin(trx, { actor, target: await lockTarget(trx, input.userUid), role: input.role, now }))
}

/** A registrar takes a role away, at once and alone: who holds it loses it with the next request. Throws as `giveRole`. */
export async function takeRole(registry: Registry, actor: ActiveActor, input: { userUid: string, role: GivenRole } & Proof): Promise<void> {
  if (input.userUid === actor.uid) throw new DomainError('forbidden', { details: { reason: 'own_roles' } })
  await verifyPassword(registry, actor, input.password, input)
  const now = registry.clock.now()
  await inTransaction(registry.db, async (trx) => {
    const deed: Deed = { actor, target: await lockTarget(trx, input.userUid), role: input.role, now }
    if (!await endRole(trx, deed.target.id, input.role, actor.userId, now)) throw new DomainError('not_found')
    await tellTarget(trx, deed, 'role_taken')
    await tellRegistrars(trx, deed, 'role_changed_registrars', 'taken')
  })
}

export type Decision = 'grant' | 'refuse' | 'withdraw'

/**
 * The second registrar's word on a proposed role; whoever proposed it can only withdraw it.
 *
 * @throws DomainError `forbidden` (own proposal, or about oneself), `wrong_state` when it was decided, and as `verifyPassword`
 */
export async function decideOnRole(registry: Registry, actor: ActiveActor, input: { proposalUid: string, decision: Decision } & Proof): Promise<void> {
  await verifyPassword(registry, actor, input.password, input)
  const now = registry.clock.now()
  await inTransaction(registry.db, async (trx) => {
    const proposal = await lockProposal(trx, input.proposalUid)
    if (!proposal) throw new DomainError('not_found')
    if (proposal.decided_at !== null) throw new DomainError('wrong_state')
    const own = proposal.proposed_by === actor.userId
    if (own !== (input.decision === 'withdraw')) throw new DomainError('forbidden', { details: { reason: 'own_proposal' } })
    if (proposal.user_id === actor.userId) throw new DomainError('forbidden', { details: { reason: 'about_you' } })
    const target = await lockById(trx, proposal.user_id)
    if (!target || (input.decision === 'grant' && !isOpen(target))) throw new DomainError('not_found')
    const deed: Deed = { actor, target, role: proposal.role as StaffRole, now }
    const outcome = { grant: 'granted', refuse: 'refused', withdraw: 'withdrawn' } as const
    await decideProposal(trx, proposal.id, outcome[input.decision], actor.userId, now)
    if (input.decision === 'grant') await grant(trx, deed)
    if (input.decision === 'refuse') await tellRegistrars(trx, deed, 'role_changed_registrars', 'refused')
  })
}
