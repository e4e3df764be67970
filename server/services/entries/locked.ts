import type { Knex } from 'knex'
import type { EntriesRow } from '../../../db/tables'
import { inTransaction } from '../../../db/transaction'
import { canReadEntry, type EntryAccess } from '../../../shared/domain/access/abilities'
import type { ActiveActor } from '../../../shared/domain/access/roles'
import { stakesOf, type Stake, type StakeAct } from '../../../shared/domain/access/stakes'
import { DomainError } from '../../../shared/errors'
import type { Registry } from '../../composition'
import { lockEntry } from '../../repositories/entries'
import { momentOf, type Moment } from '../moment'
import { accessOf } from './access'
import { findKeys, type EntryContext } from './context'

export interface LockedEntry {
  readonly trx: Knex.Transaction
  readonly entry: EntriesRow
  readonly access: EntryAccess
  readonly moment: Moment
}

/** Runs an act under the lock of an entry that the actor may see; `not_found` for one that is none of theirs. */
export async function withEntry<T>(registry: Registry, actor: ActiveActor, uid: string, act: (locked: LockedEntry) => Promise<T>): Promise<T> {
  const moment = await momentOf(registry)
  return inTransaction(registry.db, async (trx) => {
    const entry = await lockEntry(trx, uid)
    const access = entry && await accessOf(trx, entry)
    if (!entry || !access || !canReadEntry(actor, access)) throw new DomainError('not_found')
    return act({ trx, entry, access, moment })
  })
}

export function stakeCodes(stakes: readonly Stake[]): string[] {
  return stakes.map(stake => 'part' in stake ? `${stake.kind}.${stake.part}` : stake.kind)
}

/** Throws `stake` (403) when the actor has one that bars the act. */
export async function assertNoStake(trx: Knex, context: EntryContext, actor: ActiveActor, act: StakeAct): Promise<void> {
  const stakes = stakesOf(context.stakes, await findKeys(trx, actor.userId), act)
  if (stakes.length > 0) throw new DomainError('stake', { details: { stakes: stakeCodes(stakes) } })
}
