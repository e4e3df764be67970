import type { ActiveActor, Role } from '../../../shared/domain/access/roles'
import { DomainError } from '../../../shared/errors'
import type { Registry } from '../../composition'
import { listPeople, listProposals, readPerson } from '../../read-models/people'
import { listSpeciesCodes } from '../../repositories/catalogue'
import { listRegistrars } from '../../repositories/roles'
import { keyedHash, sameText } from './secrets'

const PAGE = 50

/** A page's mark, sealed: a changed one is refused. */
function markOf(registry: Registry, place: { name: string, id: number }): string {
  const body = Buffer.from(JSON.stringify([place.name, place.id])).toString('base64url')
  return `${body}.${keyedHash(registry.config.secret, 'cursor', body).slice(0, 16)}`
}

function placeOf(registry: Registry, mark: string): { name: string, id: number } {
  const [body = '', signature = ''] = mark.split('.')
  if (!sameText(signature, keyedHash(registry.config.secret, 'cursor', body).slice(0, 16))) throw new DomainError('cursor_invalid')
  const [name, id] = JSON.parse(Buffer.from(body, 'base64url').toString('utf8')) as [string, number]
  return { name, id }
}

/** Accounts for the registrar, by name, fifty at a time, with the proposals that wait. */
export async function findPeople(registry: Registry, actor: ActiveActor, query: { q?: string | undefined, role?: Role | undefined, state?: 'active' | 'invited' | 'closed' | undefined, cursor?: string | undefined }) {
  const after = query.cursor ? placeOf(registry, query.cursor) : null
  const page = await listPeople(registry.db, { ...query, after, limit: PAGE })
  const proposals = await listProposals(registry.db)
  return {
    items: page.items,
    nextCursor: page.next ? markOf(registry, page.next) : null,
    proposals: proposals.map(one => ({ ...one, own: one.by.id === actor.uid, aboutYou: one.person.id === actor.uid })),
    /** whether a staff role waits for a second registrar */
    secondNeeded: (await listRegistrars(registry.db, registry.clock.now())).length > 1,
  }
}

/** One account for the registrar. @throws DomainError `not_found` */
export async function findPerson(registry: Registry, actor: ActiveActor, uid: string) {
  const person = await readPerson(registry.db, uid, registry.clock.now())
  if (!person) throw new DomainError('not_found')
  const seconds = (await listRegistrars(registry.db, registry.clock.now())).filter(one => one.id !== actor.userId && one.email !== person.email)
  return { ...person, own: person.id === actor.uid, secondNeeded: seconds.length > 0, species: await listSpeciesCodes(registry.db) }
}
