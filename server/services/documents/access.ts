import type { Knex } from 'knex'
import type { EntriesRow } from '../../../db/tables'
import type { ActiveActor } from '../../../shared/domain/access/roles'
import { canReadEntry, isAssignedMeasurer, isItsJudge, isKeeper, isOwner, type EntryAccess } from '../../../shared/domain/access/abilities'
import { stakesOf } from '../../../shared/domain/access/stakes'
import { DomainError } from '../../../shared/errors'
import { findEntry, lockEntry } from '../../repositories/entries'
import { listPeople } from '../../repositories/entryPeople'
import { listRequests } from '../../repositories/office'
import { findOpenRemeasuring } from '../../repositories/panel'
import { accessOf } from '../entries/access'
import { findKeys, loadStakes } from '../entries/context'
import type { RemovalContext } from './rules'

export interface DocumentsOf {
  readonly entry: EntriesRow
  readonly access: EntryAccess
}

/** Judges who are to measure blind see nothing that could hold a figure until both have signed. */
async function measuresBlind(db: Knex, actor: ActiveActor, entry: EntriesRow): Promise<boolean> {
  const open = await findOpenRemeasuring(db, entry.id)
  return open !== undefined && [open.judge_a, open.judge_b].includes(actor.userId) && (!open.joint_signed_a_at || !open.joint_signed_b_at)
}

/**
 * Lets in whoever may see the papers of an entry: its owner or keeper, the measurer it is assigned to, and staff who
 * may read it and have no stake in it.
 *
 * @throws DomainError `not_found`, `stake`
 */
export async function assertSees(db: Knex, actor: ActiveActor, entry: EntriesRow): Promise<EntryAccess> {
  const access = await accessOf(db, entry)
  if (!canReadEntry(actor, access)) throw new DomainError('not_found')
  if (isOwner(actor, access) || isKeeper(actor, access) || isAssignedMeasurer(actor, access)) return access
  if (await measuresBlind(db, actor, entry)) throw new DomainError('forbidden')
  const act = isItsJudge(actor, access) ? 'vote' : 'review'
  const stakes = stakesOf(await loadStakes(db, entry, await listPeople(db, entry.id)), await findKeys(db, actor.userId), act)
  if (stakes.length > 0) throw new DomainError('stake')
  return access
}

export async function readableEntry(db: Knex, actor: ActiveActor, uid: string): Promise<DocumentsOf> {
  const entry = await findEntry(db, uid)
  if (!entry) throw new DomainError('not_found')
  return { entry, access: await assertSees(db, actor, entry) }
}

export async function lockedEntry(trx: Knex.Transaction, actor: ActiveActor, uid: string): Promise<DocumentsOf> {
  const entry = await lockEntry(trx, uid)
  if (!entry) throw new DomainError('not_found')
  return { entry, access: await assertSees(trx, actor, entry) }
}

export async function removalContext(db: Knex, { entry, access }: DocumentsOf): Promise<RemovalContext> {
  const open = (await listRequests(db, entry.id)).filter(request => request.closed_at === null)
  return {
    entry: access,
    stateSince: entry.state_since,
    submittedAt: entry.submitted_at,
    wanted: open.flatMap(request => JSON.parse(request.wants) as string[]),
  }
}
