import { hasAnyRole, hasRole, STAFF_ROLES, type ActiveActor } from '../../../shared/domain/access/roles'
import { stakesOf, type Likeness } from '../../../shared/domain/access/stakes'
import { DomainError } from '../../../shared/errors'
import type { Registry } from '../../composition'
import { updateEntry } from '../../repositories/entries'
import { findAccountByUid, insertClearance, insertDeclaration, listDeclarers } from '../../repositories/stakes'
import { findKeys, loadContext } from '../entries/context'
import { withEntry } from '../entries/locked'
import { appendEvent } from '../events/append'

/**
 * Says, with a reason, that somebody of the same name or address as a person of the entry is not the same and not close. Given by
 * a registrar without a stake, never for oneself.
 */
export async function clearStake(registry: Registry, actor: ActiveActor, entryUid: string, clearance: { account: string, person: string, kind: Likeness, reason: string }): Promise<void> {
  if (!hasRole(actor, 'registrar')) throw new DomainError('forbidden')
  return withEntry(registry, actor, entryUid, async ({ trx, entry, moment }) => {
    const account = await findAccountByUid(trx, clearance.account)
    if (!account) throw new DomainError('invalid_input', { fields: [{ path: 'account', code: 'unknown' }] })
    const context = await loadContext(trx, entry)
    const person = context.people.find(one => one.uid === clearance.person)
    if (!person) throw new DomainError('invalid_input', { fields: [{ path: 'person', code: 'unknown' }] })
    const own = stakesOf(context.stakes, await findKeys(trx, actor.userId), 'amend')
    if (account.id === actor.userId || own.length > 0) throw new DomainError('stake')
    await insertClearance(trx, { entry_id: entry.id, user_id: account.id, entry_person_id: person.id, kind: clearance.kind, reason: clearance.reason.trim(), cleared_by: actor.userId, cleared_at: moment.at })
    await appendEvent(trx, entry, { kind: 'clear_stake', actor, args: { account: account.uid, person: person.uid, likeness: clearance.kind }, texts: { reason: clearance.reason } }, moment)
    await updateEntry(trx, entry.id, {})
  })
}

/** Declares one's own stake: that one's shop handles the head, or another reason to keep away. It bars from then on. */
export async function declareStake(registry: Registry, actor: ActiveActor, entryUid: string, declaration: { kind: 'shop' | 'other', reason: string | null }): Promise<void> {
  if (!hasAnyRole(actor, [...STAFF_ROLES, 'shop'])) throw new DomainError('forbidden')
  return withEntry(registry, actor, entryUid, async ({ trx, entry, moment }) => {
    if ((await listDeclarers(trx, entry.id)).includes(actor.userId)) return
    await insertDeclaration(trx, { entry_id: entry.id, user_id: actor.userId, kind: declaration.kind, reason: declaration.reason, declared_at: moment.at })
    await appendEvent(trx, entry, { kind: 'declare_stake', actor, args: { kind: declaration.kind }, texts: { reason: declaration.reason } }, moment)
    await updateEntry(trx, entry.id, {})
  })
}
