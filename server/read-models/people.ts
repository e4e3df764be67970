import type { Knex } from 'knex'
import { isoTime, isoTimeOrNull, sqlTime } from '../../db/time'
import type { UsersRow } from '../../db/tables'
import type { Role } from '../../shared/domain/access/roles'

export interface PeopleFilter {
  readonly q?: string | undefined
  readonly role?: Role | undefined
  readonly state?: 'active' | 'invited' | 'closed' | undefined
  /** the last line of the page before, by name and id */
  readonly after: { readonly name: string, readonly id: number } | null
  readonly limit: number
}

export type PersonState = 'active' | 'invited' | 'closed'
type Listed = Pick<UsersRow, 'id' | 'uid' | 'name' | 'email' | 'email_verified_at' | 'disabled_at' | 'totp_enabled_at' | 'created_at'> & { readonly district: string | null }

const stateOf = (row: Listed): PersonState => (row.disabled_at ? 'closed' : row.email_verified_at ? 'active' : 'invited')

/** A text that stands anywhere in a name or address; `%` and `_` are letters like others. */
const holding = (text: string) => `%${text.replace(/[\\%_]/g, '\\$&')}%`

function lineOf(row: Listed, roles: readonly Role[]) {
  return {
    id: row.uid, name: row.name, email: row.email, district: row.district, state: stateOf(row),
    secondFactor: row.totp_enabled_at !== null, createdAt: isoTime(row.created_at), roles,
  }
}

const COLUMNS = ['u.id', 'u.uid', 'u.name', 'u.email', 'u.email_verified_at', 'u.disabled_at', 'u.totp_enabled_at', 'u.created_at', 'd.name as district'] as const

async function rolesOf(db: Knex, userIds: readonly number[]): Promise<Map<number, Role[]>> {
  const found = new Map<number, Role[]>()
  if (userIds.length === 0) return found
  const rows = await db('user_roles').whereIn('user_id', [...userIds]).whereNull('to_at').whereNot('role', 'entrant').orderBy('id').select('user_id', 'role')
  for (const row of rows) found.set(row.user_id, [...found.get(row.user_id) ?? [], row.role])
  return found
}

/** Accounts by name, one page; the last line's place comes with it where there are more. */
export async function listPeople(db: Knex, filter: PeopleFilter) {
  const query = db('users as u').leftJoin('districts as d', 'd.id', 'u.district_id').whereNull('u.erased_at')
  const text = filter.q?.trim()
  if (text) query.andWhere(q => q.where('u.name', 'like', holding(text)).orWhere('u.email', 'like', holding(text.toLowerCase())))
  const { role, after } = filter
  if (role && role !== 'entrant') query.whereExists(db('user_roles as r').whereRaw('r.user_id = u.id').where('r.role', role).whereNull('r.to_at').select(db.raw('1')))
  if (filter.state === 'active') query.whereNull('u.disabled_at').whereNotNull('u.email_verified_at')
  if (filter.state === 'invited') query.whereNull('u.disabled_at').whereNull('u.email_verified_at')
  if (filter.state === 'closed') query.whereNotNull('u.disabled_at')
  if (after) query.andWhere(q => q.where('u.name', '>', after.name).orWhere(p => p.where('u.name', after.name).andWhere('u.id', '>', after.id)))
  const rows: Listed[] = await query.orderBy([{ column: 'u.name' }, { column: 'u.id' }]).limit(filter.limit + 1).select(...COLUMNS)
  const page = rows.slice(0, filter.limit)
  const roles = await rolesOf(db, page.map(row => row.id))
  const last = page.at(-1)
  return {
    items: page.map(row => lineOf(row, roles.get(row.id) ?? [])),
    next: rows.length > filter.limit && last ? { name: last.name, id: last.id } : null,
  }
}

/** Proposed roles that nobody has decided on, the oldest first. */
export async function listProposals(db: Knex, userId?: number) {
  const query = db('role_proposals as p').join('users as u', 'u.id', 'p.user_id').join('users as b', 'b.id', 'p.proposed_by')
    .whereNull('p.decided_at').orderBy('p.proposed_at').limit(200)
  if (userId !== undefined) query.where('p.user_id', userId)
  const rows = await query.select('p.uid', 'p.role', 'p.proposed_at', 'u.uid as person_uid', 'u.name as person', 'b.uid as by_uid', 'b.name as by')
  return rows.map(row => ({
    id: row.uid as string, role: row.role as Role, at: isoTime(row.proposed_at),
    person: { id: row.person_uid as string, name: row.person as string }, by: { id: row.by_uid as string, name: row.by as string },
  }))
}

async function accreditationsOf(db: Knex, userId: number) {
  const rows = await db('accreditations').where({ user_id: userId }).orderBy([{ column: 'valid_to', order: 'desc' }, { column: 'id', order: 'desc' }])
  const species = await db('accreditation_species as a').join('species as s', 's.id', 'a.species_id')
    .whereIn('a.accreditation_id', rows.map(row => row.id)).orderBy('s.sort').select('a.accreditation_id', 's.code')
  return rows.map(row => ({
    id: row.uid, number: row.number, validFrom: row.valid_from, validTo: row.valid_to, suspendedAt: isoTimeOrNull(row.suspended_at),
    species: species.filter(one => one.accreditation_id === row.id).map(one => one.code as string),
  }))
}

/** One account as the registrar sees it: roles now and before, what is proposed, accreditations. Null for none. */
export async function readPerson(db: Knex, uid: string, now: Date) {
  const row: Listed | undefined = await db('users as u').leftJoin('districts as d', 'd.id', 'u.district_id').where('u.uid', uid).whereNull('u.erased_at').first(...COLUMNS)
  if (!row) return null
  const history = await db('user_roles as r').leftJoin('users as g', 'g.id', 'r.granted_by').leftJoin('users as e', 'e.id', 'r.ended_by')
    .where('r.user_id', row.id).whereNot('r.role', 'entrant').orderBy('r.id', 'desc').limit(100)
    .select('r.role', 'r.from_at', 'r.to_at', 'g.name as given_by', 'e.name as ended_by')
  const lastSeen = await db('user_sessions').where({ user_id: row.id }).max({ at: 'last_seen_at' }).first() as { at: string | null } | undefined
  const held = history.filter(one => one.to_at === null || one.to_at > sqlTime(now)).map(one => one.role as Role)
  return {
    ...lineOf(row, held),
    lastSeenAt: isoTimeOrNull(lastSeen?.at ?? null),
    history: history.map(one => ({ role: one.role as Role, from: isoTime(one.from_at), to: isoTimeOrNull(one.to_at), givenBy: one.given_by as string | null, endedBy: one.ended_by as string | null })),
    proposals: await listProposals(db, row.id),
    accreditations: await accreditationsOf(db, row.id),
  }
}
