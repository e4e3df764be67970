import { inTransaction } from '../../../db/transaction'
import type { ActiveActor } from '../../../shared/domain/access/roles'
import { canReadEntry, canWriteFacts } from '../../../shared/domain/access/abilities'
import type { EntriesRow } from '../../../db/tables'
import { hasOpenFacts } from '../../../shared/domain/workflow/states'
import { DomainError } from '../../../shared/errors'
import type { EntryFactsInput } from '../../../shared/schemas/entries'
import type { Registry } from '../../composition'
import { lockEntry, updateEntry, type EntryPatch } from '../../repositories/entries'
import { listPeople } from '../../repositories/entryPeople'
import { listRequests, voidStatements } from '../../repositories/office'
import type { Knex } from 'knex'
import { appendEvent } from '../events/append'
import { momentOf } from '../moment'
import { accessOf } from './access'
import { factRow } from './factRow'
import { setPeople } from './people'

/** Facts of the request under the names by which the office asks for them. */
const ASKED_AS: Readonly<Record<string, string>> = { originalOrigin: 'origin', districtSide: 'district', monthPublic: 'takenOn', hunterName: 'hunter' }

/** What the statement says is true: the animal, the day, and the way it came into human hands. */
const STATED = [
  'class_id', 'origin', 'original_origin', 'taken_first_on', 'taken_last_on', 'taken_precision', 'district_id', 'district_side', 'method', 'sex', 'guided',
] as const

/** Whether a patch makes something else of what was stated; the same said again does not. */
function changesStated(entry: EntriesRow, patch: EntryPatch): boolean {
  return STATED.some(column => column in patch && patch[column] !== entry[column])
}

/** After the first submission only what an open request names is the entrant's to change. */
async function assertOpen(trx: Knex, entry: EntriesRow, given: readonly string[], parts: readonly string[]): Promise<void> {
  if (hasOpenFacts(entry.state, entry.return_to)) return
  const wanted = new Set((await listRequests(trx, entry.id)).filter(request => request.closed_at === null).flatMap(request => JSON.parse(request.wants) as string[]))
  const names = given.filter(name => name !== 'people')
  const frozen = [...names.filter(name => !wanted.has(ASKED_AS[name] ?? name)), ...parts.filter(part => !wanted.has(part)).map(() => 'people')]
  if (frozen.length > 0) throw new DomainError('frozen_fact', { fields: [...new Set(frozen)].map(path => ({ path, code: 'frozen' })) })
}

/**
 * Changes facts and people of an entry from the version that the caller saw.
 *
 * @throws DomainError `not_found`, `precondition_failed` (412), `forbidden`, `frozen_fact` (422), `invalid_input`
 */
export async function changeEntry(registry: Registry, actor: ActiveActor, uid: string, version: number, input: EntryFactsInput): Promise<void> {
  const moment = await momentOf(registry)
  await inTransaction(registry.db, async (trx) => {
    const entry = await lockEntry(trx, uid)
    const access = entry && await accessOf(trx, entry)
    if (!entry || !access || !canReadEntry(actor, access)) throw new DomainError('not_found')
    if (!canWriteFacts(actor, access)) throw new DomainError(access.ownerUserId === actor.userId ? 'frozen_fact' : 'forbidden')
    if (entry.version !== version) throw new DomainError('precondition_failed', { details: { version: entry.version } })
    const { people, hunterName, ...facts } = input
    const { patch, category, given } = await factRow(trx, facts, moment, entry)
    if (category && entry.state !== 'draft') throw new DomainError('frozen_fact', { fields: [{ path: 'category', code: 'frozen' }] })
    const wished = people ?? (hunterName === undefined ? undefined : await withHunter(trx, entry, hunterName))
    const parts = wished ? await setPeople(trx, { id: entry.id, ownerUserId: entry.owner_user_id ?? actor.userId }, wished, moment) : []
    await assertOpen(trx, entry, given, parts)
    if (category) await trx('animals').where({ id: entry.animal_id }).update({ species_id: category.species_id })
    await updateEntry(trx, entry.id, patch)
    // What was signed was that all of this is true as it stood.
    if (parts.length > 0 || changesStated(entry, patch)) await voidStatements(trx, entry.id, moment.at)
    if (hasOpenFacts(entry.state, entry.return_to)) return
    await appendEvent(trx, entry, { kind: 'change', actor, args: { changed: [...given, ...parts].sort() } }, moment)
  })
}

/** The people as they are, with another name for the hunter. */
async function withHunter(trx: Knex, entry: EntriesRow, hunterName: string) {
  const people = (await listPeople(trx, entry.id)).map(row => ({
    id: row.uid, part: row.part, name: row.name, address: row.address, email: row.email, phone: row.phone, bornOn: row.born_on, diedOn: row.died_on,
    isMinor: row.is_minor === 1, isMe: row.user_id !== null && row.user_id === entry.owner_user_id,
  }))
  const hunter = people.find(person => person.part === 'hunter')
  return hunter
    ? people.map(person => person === hunter ? { ...person, name: hunterName } : person)
    : [...people, { part: 'hunter' as const, name: hunterName, isMinor: false, isMe: false }]
}
