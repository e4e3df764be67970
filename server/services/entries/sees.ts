import type { Knex } from 'knex'
import type { EntriesRow } from '../../../db/tables'
import type { ActiveActor } from '../../../shared/domain/access/roles'
import { canReadEntry, isAssignedMeasurer, isItsJudge, isKeeper, isOwner, type EntryAccess } from '../../../shared/domain/access/abilities'
import { stakesOf } from '../../../shared/domain/access/stakes'
import { DomainError } from '../../../shared/errors'
import { findEntry, lockEntry } from '../../repositories/entries'
import { listPeople } from '../../repositories/entryPeople'
import { findOpenRemeasuring } from '../../repositories/panel'
import { accessOf } from './access'
import { findKeys, loadStakes } from './context'

export interface SeenEntry {
  readonly entry: EntriesRow
  readonly access: EntryAccess
}

/** Judges who are to measure blind see nothing that could hold a figure until both have signed. */
async function measuresBlind(db: Knex, actor: ActiveActor, entry: EntriesRow): Promise<boolean> {
  const open = await findOpenRemeasuring(db, entry.id)
  return open !== undefined && [open.judge_a, open.judge_b].includes(actor.userId) && (!open.joint_signed_a_at || !open.joint_signed_b_at)
}

/**
 * Lets in whoever may see what lies in an entry's file: its owner or keeper, the measurer it is assigned to, and staff who
 * may read it, have no stake in it and are not to measure it blind.
 *
 * @throws DomainError `not_found`, `forbidden`, `stake`
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

export async function readableEntry(db: Knex, actor: ActiveActor, uid: string): Promise<SeenEntry> {
  const entry = await findEntry(db, uid)
  if (!entry) throw new DomainError('not_found')
  return { entry, access: await assertSees(db, actor, entry) }
}

export async function lockedEntry(trx: Knex.Transaction, actor: ActiveActor, uid: string): Promise<SeenEntry> {
  const entry = await lockEntry(trx, uid)
  if (!entry) throw new DomainError('not_found')
  return { entry, access: await assertSees(trx, actor, entry) }
}
