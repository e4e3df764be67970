import type { Knex } from 'knex'
import { EVERY_DISTRICT, EVERY_METHOD } from '../../../shared/domain/lists'
import { standingOf, type Standing } from '../../../shared/domain/ranking'
import { netCounts } from '../../read-models/records/counts'
import type { ListRow } from '../../read-models/records/list'

/** Which of a class's four kinds of list a rank is taken in. */
export interface RankedIn {
  readonly districtId: number | null
  readonly method: string | undefined
}

/** The rank of every row in the list of its own class, from the kept counts. */
export async function ranksOf(db: Knex, rows: readonly Pick<ListRow, 'class_id' | 'net16'>[], list: RankedIn): Promise<(row: Pick<ListRow, 'class_id' | 'net16'>) => number> {
  const classes = new Map<number, number>()
  for (const row of rows) classes.set(row.class_id, Math.min(row.net16, classes.get(row.class_id) ?? Number.POSITIVE_INFINITY))
  const kept = new Map(await Promise.all([...classes].map(async ([classId, lowest]) =>
    [classId, await netCounts(db, classId, list.districtId ?? EVERY_DISTRICT, list.method ?? EVERY_METHOD, lowest)] as const)))
  return row => standingOf(kept.get(row.class_id) ?? [], row.net16).rank
}

/** Rank, total and how many share it, for one record. */
export async function standingIn(db: Knex, row: Pick<ListRow, 'class_id' | 'net16'>, list: RankedIn): Promise<Standing> {
  return standingOf(await netCounts(db, row.class_id, list.districtId ?? EVERY_DISTRICT, list.method ?? EVERY_METHOD, 0), row.net16)
}
