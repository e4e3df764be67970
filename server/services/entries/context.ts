import type { Knex } from 'knex'
import type { DocketItemsRow, EntriesRow, EntryPeopleRow, RemeasuringsRow, SheetsRow } from '../../../db/tables'
import type { PersonKeys, StakeFacts } from '../../../shared/domain/access/stakes'
import { addressKey, nameKey } from '../../../shared/domain/fold'
import type { SheetDefinition } from '../../../shared/domain/measuring/index'
import { definitionById } from '../../../shared/domain/measuring/index'
import { DomainError } from '../../../shared/errors'
import type { ClassRecord } from '../../repositories/catalogue'
import { findClassById } from '../../repositories/catalogue'
import { listPeople } from '../../repositories/entryPeople'
import { listActorsFrom } from '../../repositories/events'
import { findOpenItem, findOpenRemeasuring, listItemsOfEntry, listVoters } from '../../repositories/panel'
import { listMeasuredBy } from '../../repositories/sheets'
import type { AccountRow } from '../../repositories/stakes'
import { findAccounts, listClearances, listDeclarers, listReporters } from '../../repositories/stakes'

/** An entry with what nearly every act on it looks at. */
export interface EntryContext {
  readonly entry: EntriesRow
  readonly category: ClassRecord
  readonly definition: SheetDefinition
  readonly people: readonly EntryPeopleRow[]
  readonly stakes: StakeFacts
  readonly item: DocketItemsRow | undefined
  readonly remeasuring: RemeasuringsRow | undefined
}

export function definitionOf(id: string): SheetDefinition {
  const definition = definitionById(id)
  if (!definition) throw new DomainError('internal', { logLine: `no sheet definition ${id}` })
  return definition
}

/** The keys under which an account's name and address are compared with people of an entry. */
export function keysOf(account: Pick<AccountRow, 'id' | 'name' | 'address'>): PersonKeys {
  return { userId: account.id, nameKey: nameKey(account.name), addressKey: addressKey(account.address) }
}

export async function findKeys(db: Knex, userId: number): Promise<PersonKeys> {
  const [account] = await findAccounts(db, [userId])
  if (!account) throw new DomainError('not_found')
  return keysOf(account)
}

/** What an entry is before people for; decides whom an earlier vote or refusal bars. */
export function matterOf(entry: Pick<EntriesRow, 'state' | 'return_to' | 'appealed_at'>): StakeFacts['matter'] {
  if (entry.state === 'struck') return 'appeal'
  if (entry.state === 'accepted' || entry.state === 'challenged' || entry.return_to === 'challenged') return 'challenge'
  return entry.appealed_at === null ? 'entry' : 'appeal'
}

/** Accounts that took part in the decision which is now appealed or challenged. */
async function findDeciders(db: Knex, entry: EntriesRow, matter: StakeFacts['matter']): Promise<number[]> {
  if (matter === 'entry') return []
  const applied = (await listItemsOfEntry(db, entry.id)).filter(item => item.state === 'applied')
  if (matter === 'challenge') {
    return listVoters(db, applied.filter(item => item.outcome === 'accept' || item.outcome === 'uphold').map(item => item.id))
  }
  if (entry.state === 'struck') return listVoters(db, applied.filter(item => item.outcome === 'strike').map(item => item.id))
  const declined = applied.filter(item => item.outcome === 'decline').map(item => item.id)
  const reviewers = (await listActorsFrom(db, entry.id, 'in_review', { from: 'declined', to: 'in_review' })).filter(id => id !== entry.owner_user_id)
  return [...await listVoters(db, declined), ...reviewers]
}

export async function loadStakes(db: Knex, entry: EntriesRow, people: readonly EntryPeopleRow[]): Promise<StakeFacts> {
  const matter = matterOf(entry)
  const clearances = await listClearances(db, entry.id)
  return {
    ownerUserId: entry.owner_user_id,
    people: people.map(person => ({ part: person.part, userId: person.user_id, nameKey: person.name_key, addressKey: person.address_key })),
    measuredBy: await listMeasuredBy(db, entry.id),
    declaredBy: await listDeclarers(db, entry.id),
    reportedBy: await listReporters(db, entry.id),
    clearances: clearances.map(row => ({ userId: row.user_id, kind: row.kind, nameKey: row.name_key, addressKey: row.address_key })),
    matter,
    decidedBy: await findDeciders(db, entry, matter),
  }
}

/** Loads an entry's context; under the entry's lock when `db` is the transaction that holds it. */
export async function loadContext(db: Knex, entry: EntriesRow): Promise<EntryContext> {
  const category = await findClassById(db, entry.class_id)
  const people = await listPeople(db, entry.id)
  return {
    entry,
    category: category!,
    definition: definitionOf(category!.definition),
    people,
    stakes: await loadStakes(db, entry, people),
    item: await findOpenItem(db, entry.id),
    remeasuring: await findOpenRemeasuring(db, entry.id),
  }
}

export type StoredSheet = SheetsRow
