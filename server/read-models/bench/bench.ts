import type { Knex } from 'knex'
import { isoTime, isoTimeOrNull } from '../../../db/time'
import { NAMED_AFTER } from '../desk/rows'

/** Animals assigned to a measurer that wait to be measured, the longest wait first. */
export async function waitingAtBench(db: Knex, userId: number) {
  const rows = await db('entries as e').join('classes as c', 'c.id', 'e.class_id').join('species as p', 'p.id', 'c.species_id')
    .leftJoin('districts as d', 'd.id', 'e.district_id')
    .leftJoin('sheets as s', q => q.on('s.entry_id', 'e.id').andOnVal('s.kind', 'entry').andOnVal('s.state', 'open'))
    .where('e.measurer_user_id', userId).where('e.state', 'measuring')
    .orderBy('e.state_since').orderBy('e.id').limit(500)
    .select('e.uid', 'c.code as category', 'p.code as species', 'd.name as district', 'e.origin', 'e.return_to', 'e.state_since',
      db.raw('COALESCE(s.dried_since, e.dried_since) as dried_since'), db.raw('COALESCE(s.version, 1) > 1 as begun'), db.raw(`${NAMED_AFTER} as person`))
  return rows.map(row => ({
    uid: row.uid as string, category: row.category as string, species: row.species as string, district: row.district as string | null,
    origin: row.origin, askedBy: row.return_to === 'in_review' || row.return_to === 'at_panel' ? row.return_to as 'in_review' | 'at_panel' : null,
    driedSince: row.dried_since as string | null, begun: Boolean(row.begun), person: row.person as string | null, since: isoTime(row.state_since),
  }))
}

/** Entries that somebody began for another and that nobody has claimed. */
export async function unclaimedOf(db: Knex, userId: number) {
  const rows = await db('entries as e').join('classes as c', 'c.id', 'e.class_id')
    .where('e.begun_by_user_id', userId).whereNull('e.owner_user_id').whereNot('e.state', 'withdrawn')
    .orderBy('e.created_at').limit(100)
    .select('e.uid', 'e.state', 'e.created_at', 'c.code as category', db.raw(`${NAMED_AFTER} as person`))
  return rows.map(row => ({ uid: row.uid as string, state: row.state, category: row.category as string, person: row.person as string | null, since: isoTime(row.created_at) }))
}

/** The sheets that a measurer signed last. */
export async function signedLately(db: Knex, userId: number) {
  const rows = await db('sheets as s').join('entries as e', 'e.id', 's.entry_id').join('classes as c', 'c.id', 'e.class_id')
    .where('s.measurer_user_id', userId).where('s.kind', 'entry').whereNotNull('s.signed_at')
    .orderBy('s.signed_at', 'desc').limit(20)
    .select('e.uid', 'e.state', 'c.code as category', 'c.step', 's.net16', 's.signed_at', 's.number', db.raw(`${NAMED_AFTER} as person`))
  return rows.map(row => ({
    uid: row.uid as string, state: row.state, category: row.category as string, step: row.step as '1/8' | '1/16', net16: row.net16 as number | null,
    signedAt: isoTime(row.signed_at), number: Number(row.number), person: row.person as string | null,
  }))
}

/** A measurer's accreditations with the species of each. */
export async function accreditationsOf(db: Knex, userId: number) {
  const rows = await db('accreditations as a').leftJoin('accreditation_species as s', 's.accreditation_id', 'a.id').leftJoin('species as p', 'p.id', 's.species_id')
    .where('a.user_id', userId).orderBy('a.valid_to', 'desc').orderBy('p.sort')
    .select('a.id', 'a.number', 'a.valid_to', 'a.suspended_at', 'p.code')
  const byId = new Map<number, { number: string, validTo: string, suspendedAt: string | null, species: string[] }>()
  for (const row of rows) {
    const one = byId.get(row.id) ?? { number: row.number, validTo: row.valid_to, suspendedAt: isoTimeOrNull(row.suspended_at), species: [] as string[] }
    if (row.code) one.species.push(row.code)
    byId.set(row.id, one)
  }
  return [...byId.values()].slice(0, 3)
}
