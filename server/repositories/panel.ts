import type { Knex } from 'knex'
import type {
  BallotsRow, ChallengesInsert, ChallengesRow, DocketItemsInsert, DocketItemsRow, RemeasuringsInsert, RemeasuringsRow, SittingsInsert, SittingsRow,
} from '../../db/tables'

export async function insertSitting(trx: Knex, row: SittingsInsert): Promise<number> {
  const [id] = await trx('sittings').insert(row)
  return id!
}

export async function findSitting(db: Knex, uid: string): Promise<SittingsRow | undefined> {
  return db('sittings').where({ uid }).first()
}

export async function findSittingById(db: Knex, id: number): Promise<SittingsRow | undefined> {
  return db('sittings').where({ id }).first()
}

/** Locks a sitting. Taken before entry rows, never after: votes and the closing take both in this order. */
export async function lockSitting(trx: Knex.Transaction, uid: string): Promise<SittingsRow | undefined> {
  return trx('sittings').where({ uid }).forUpdate().first()
}

export async function lockSittingById(trx: Knex.Transaction, id: number): Promise<SittingsRow | undefined> {
  return trx('sittings').where({ id }).forUpdate().first()
}

export async function updateSitting(trx: Knex, id: number, patch: Partial<SittingsInsert>): Promise<void> {
  await trx('sittings').where({ id }).update(patch)
}

export async function listSittings(db: Knex, limit: number): Promise<(SittingsRow & { chair_uid: string, chair_name: string, items: number })[]> {
  return db('sittings as s').join('users as u', 'u.id', 's.chair_user_id').orderBy('s.held_on', 'desc').orderBy('s.id', 'desc').limit(limit)
    .select('s.*', 'u.uid as chair_uid', 'u.name as chair_name', db.raw('(SELECT COUNT(*) FROM docket_items d WHERE d.sitting_id = s.id) AS items'))
}

export interface SittingJudge { readonly user_id: number, readonly uid: string, readonly name: string, readonly present: 0 | 1 }

export async function listJudges(db: Knex, sittingId: number): Promise<SittingJudge[]> {
  return db('sitting_judges as j').join('users as u', 'u.id', 'j.user_id').where('j.sitting_id', sittingId).orderBy('u.name').orderBy('u.id')
    .select('j.user_id', 'u.uid', 'u.name', 'j.present')
}

export async function insertJudges(trx: Knex, sittingId: number, userIds: readonly number[], at: string): Promise<void> {
  if (userIds.length > 0) await trx('sitting_judges').insert(userIds.map(user => ({ sitting_id: sittingId, user_id: user, invited_at: at })))
}

export async function setPresent(trx: Knex, sittingId: number, userId: number): Promise<void> {
  await trx('sitting_judges').where({ sitting_id: sittingId, user_id: userId }).update({ present: 1 })
}

/** The item by which an entry is before the panel now. */
export async function findOpenItem(db: Knex, entryId: number): Promise<DocketItemsRow | undefined> {
  return db('docket_items').where({ entry_id: entryId }).whereIn('state', ['open', 'decided']).first()
}

export async function listItemsOfEntry(db: Knex, entryId: number): Promise<DocketItemsRow[]> {
  return db('docket_items').where({ entry_id: entryId }).orderBy('created_at').orderBy('id')
}

export async function findItem(db: Knex, uid: string): Promise<DocketItemsRow | undefined> {
  return db('docket_items').where({ uid }).first()
}

export async function listItems(db: Knex, sittingId: number): Promise<(DocketItemsRow & { entry_uid: string })[]> {
  return db('docket_items as d').join('entries as e', 'e.id', 'd.entry_id').where('d.sitting_id', sittingId)
    .orderBy('d.position').orderBy('d.id').select('d.*', 'e.uid as entry_uid')
}

/** Items that no sitting has yet. */
export async function listWaitingItems(db: Knex): Promise<(DocketItemsRow & { entry_uid: string })[]> {
  return db('docket_items as d').join('entries as e', 'e.id', 'd.entry_id').where('d.state', 'open').whereNull('d.sitting_id')
    .orderBy('d.created_at').orderBy('d.id').select('d.*', 'e.uid as entry_uid')
}

/** Items whose sitting is closed and whose decision was not carried out yet. */
export async function listUnapplied(db: Knex, sittingId?: number): Promise<{ uid: string, entry_uid: string }[]> {
  const items = db('docket_items as d').join('entries as e', 'e.id', 'd.entry_id').join('sittings as s', 's.id', 'd.sitting_id')
    .where({ 'd.state': 'decided', 's.state': 'closed' }).orderBy('d.sitting_id').orderBy('d.position').orderBy('d.id').select('d.uid', 'e.uid as entry_uid')
  return sittingId === undefined ? items : items.where('d.sitting_id', sittingId)
}

export async function insertItem(trx: Knex, row: DocketItemsInsert): Promise<number> {
  const [id] = await trx('docket_items').insert(row)
  return id!
}

export async function updateItem(trx: Knex, id: number, patch: Partial<DocketItemsInsert>): Promise<void> {
  await trx('docket_items').where({ id }).update(patch)
}

export async function nextPosition(trx: Knex, sittingId: number): Promise<number> {
  const row = await trx('docket_items').where({ sitting_id: sittingId }).max({ most: 'position' }).first() as { most: number | null } | undefined
  return (row?.most ?? 0) + 1
}

export async function listBallots(db: Knex, itemId: number): Promise<(BallotsRow & { judge_uid: string, judge_name: string })[]> {
  return db('ballots as b').join('users as u', 'u.id', 'b.judge_user_id').where('b.docket_item_id', itemId).orderBy('b.cast_at').orderBy('b.id')
    .select('b.*', 'u.uid as judge_uid', 'u.name as judge_name')
}

export interface BallotRow {
  readonly docket_item_id: number
  readonly judge_user_id: number
  readonly vote: BallotsRow['vote']
  readonly ground: string | null
  readonly reason: string | null
  readonly requests: string | null
  readonly cast_at: string
}

/** A judge's ballot on an item; while the sitting is open a later one takes its place. */
export async function putBallot(trx: Knex, row: BallotRow): Promise<void> {
  await trx('ballots').insert(row).onConflict(['docket_item_id', 'judge_user_id']).merge(['vote', 'ground', 'reason', 'requests', 'cast_at'])
}

/** Accounts that voted on an item without standing aside. */
export async function listVoters(db: Knex, itemIds: readonly number[]): Promise<number[]> {
  return itemIds.length === 0 ? [] : db('ballots').whereIn('docket_item_id', [...itemIds]).whereNot({ vote: 'stand_aside' }).distinct().pluck('judge_user_id')
}

/** Chairs of the sittings that are planned or open. */
export async function listChairs(db: Knex): Promise<number[]> {
  return db('sittings').whereIn('state', ['planned', 'open']).distinct().pluck('chair_user_id')
}

/** The sitting that comes next, on or after a day. */
export async function findNextSitting(db: Knex, today: string): Promise<SittingsRow | undefined> {
  return db('sittings').where({ state: 'planned' }).where('held_on', '>=', today).orderBy('held_on').orderBy('id').first()
}

export async function noteOpening(trx: Knex, entryId: number, userId: number, at: string): Promise<void> {
  await trx('file_openings').insert({ entry_id: entryId, user_id: userId, first_at: at, last_at: at }).onConflict(['entry_id', 'user_id']).merge(['last_at'])
}

export async function listOpeners(db: Knex, entryId: number, userIds: readonly number[]): Promise<number[]> {
  return userIds.length === 0 ? [] : db('file_openings').where({ entry_id: entryId }).whereIn('user_id', [...userIds]).pluck('user_id')
}

export async function findOpenRemeasuring(db: Knex, entryId: number): Promise<RemeasuringsRow | undefined> {
  return db('remeasurings').where({ entry_id: entryId }).whereNull('closed_at').first()
}

export async function listRemeasurings(db: Knex, entryId: number): Promise<RemeasuringsRow[]> {
  return db('remeasurings').where({ entry_id: entryId }).orderBy('ordered_at').orderBy('id')
}

export async function insertRemeasuring(trx: Knex, row: RemeasuringsInsert): Promise<void> {
  await trx('remeasurings').insert(row)
}

export async function updateRemeasuring(trx: Knex, id: number, patch: Partial<RemeasuringsInsert>): Promise<void> {
  await trx('remeasurings').where({ id }).update(patch)
}

export async function listChallenges(db: Knex, entryId: number): Promise<ChallengesRow[]> {
  return db('challenges').where({ entry_id: entryId }).orderBy('reported_at').orderBy('id')
}

export async function findChallenge(db: Knex, uid: string): Promise<(ChallengesRow & { entry_uid: string }) | undefined> {
  return db('challenges as c').join('entries as e', 'e.id', 'c.entry_id').where('c.uid', uid).first('c.*', 'e.uid as entry_uid')
}

export async function listReports(db: Knex): Promise<(ChallengesRow & { entry_uid: string, record_no: number | null })[]> {
  return db('challenges as c').join('entries as e', 'e.id', 'c.entry_id').leftJoin('records as r', 'r.entry_id', 'e.id')
    .whereIn('c.state', ['reported', 'checked', 'taken_up']).orderBy('c.reported_at').orderBy('c.id').limit(200).select('c.*', 'e.uid as entry_uid', 'r.record_no')
}

export async function insertChallenge(trx: Knex, row: ChallengesInsert): Promise<void> {
  await trx('challenges').insert(row)
}

export async function updateChallenge(trx: Knex, id: number, patch: Partial<ChallengesInsert>): Promise<void> {
  await trx('challenges').where({ id }).update(patch)
}
