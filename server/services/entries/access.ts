import type { Knex } from 'knex'
import type { EntriesRow } from '../../../db/tables'
import type { EntryAccess } from '../../../shared/domain/access/abilities'
import { findOpenItem, findOpenRemeasuring, findSittingById, listChairs, listJudges } from '../../repositories/panel'

/** What decides who may see an entry: its owner, keeper and measurer, and the judges that it is before. */
export async function accessOf(db: Knex, entry: EntriesRow): Promise<EntryAccess> {
  return {
    state: entry.state,
    ownerUserId: entry.owner_user_id,
    begunByUserId: entry.begun_by_user_id,
    measurerUserId: entry.measurer_user_id,
    judgeUserIds: await judgesOf(db, entry),
  }
}

async function judgesOf(db: Knex, entry: EntriesRow): Promise<number[]> {
  const item = await findOpenItem(db, entry.id)
  const remeasuring = await findOpenRemeasuring(db, entry.id)
  const pair = [item?.judge_a, item?.judge_b, remeasuring?.judge_a, remeasuring?.judge_b].filter(id => id !== null && id !== undefined)
  // a chair takes up challenges and sets holds on records that no docket has yet
  if (!item?.sitting_id) return entry.state === 'accepted' || item ? [...pair, ...await listChairs(db)] : pair
  const sitting = await findSittingById(db, item.sitting_id)
  const judges = await listJudges(db, item.sitting_id)
  return [...pair, ...judges.map(judge => judge.user_id), ...(sitting ? [sitting.chair_user_id] : [])]
}
