import type { Knex } from 'knex'
import type { EntryPeopleRow } from '../../../db/tables'
import { addressKey, nameKey } from '../../../shared/domain/fold'
import { DomainError } from '../../../shared/errors'
import type { EntryPersonInput } from '../../../shared/schemas/entries'
import { deletePerson, insertPerson, listPeople, updatePerson } from '../../repositories/entryPeople'
import { newUid, type Moment } from '../moment'

const SINGLE = ['hunter', 'finder', 'owner', 'club', 'guardian'] as const

function rowOf(person: EntryPersonInput, ownerUserId: number | null) {
  const address = person.address?.trim() || null
  return {
    part: person.part, name: person.name, name_key: nameKey(person.name).slice(0, 160), address, address_key: addressKey(address)?.slice(0, 300) ?? null,
    email: person.email?.trim().toLowerCase() || null, phone: person.phone?.trim() || null, born_on: person.bornOn ?? null, died_on: person.diedOn ?? null,
    is_minor: person.isMinor ? 1 as const : 0 as const, user_id: person.isMe ? ownerUserId : null,
  }
}

const COMPARED = ['part', 'name', 'address', 'email', 'phone', 'born_on', 'died_on', 'is_minor', 'user_id'] as const

function differs(before: EntryPeopleRow, after: ReturnType<typeof rowOf>): boolean {
  return COMPARED.some(column => before[column] !== after[column])
}

/**
 * Makes the people of an entry the given ones: those with a known id are changed, those left out are taken off. Returns the
 * parts that changed.
 *
 * @throws DomainError `invalid_input` for a part that is there twice, or an id of somebody else's entry
 */
export async function setPeople(trx: Knex.Transaction, entry: { readonly id: number, readonly ownerUserId: number | null }, people: readonly EntryPersonInput[], moment: Moment): Promise<string[]> {
  const twice = people.findIndex((person, place) => (SINGLE as readonly string[]).includes(person.part) && people.findIndex(other => other.part === person.part) !== place)
  if (twice >= 0) throw new DomainError('invalid_input', { fields: [{ path: `people.${twice}.part`, code: 'part_twice' }] })
  const before = new Map((await listPeople(trx, entry.id)).map(row => [row.uid, row]))
  const changed = new Set<string>()
  const kept = new Set(people.map(person => person.id).filter(id => id !== undefined))
  // Who leaves goes first: a part that only one can have is free again for who comes.
  for (const [uid, row] of before) {
    if (kept.has(uid)) continue
    await deletePerson(trx, row.id)
    changed.add(row.part)
  }
  for (const [place, person] of people.entries()) {
    const row = rowOf(person, entry.ownerUserId)
    if (person.id === undefined) {
      await insertPerson(trx, { uid: newUid(moment.now), entry_id: entry.id, created_at: moment.at, ...row })
      changed.add(row.part)
      continue
    }
    const known = before.get(person.id)
    if (!known) throw new DomainError('invalid_input', { fields: [{ path: `people.${place}.id`, code: 'unknown_code' }] })
    // The account of somebody who is not the entrant stays linked while the name stays.
    const linked = row.user_id ?? (known.user_id !== entry.ownerUserId && known.name === row.name ? known.user_id : null)
    if (!differs(known, { ...row, user_id: linked })) continue
    await updatePerson(trx, known.id, { ...row, user_id: linked })
    changed.add(row.part)
  }
  return [...changed]
}
