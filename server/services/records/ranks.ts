import type { Knex } from 'knex'
import { EVERY_DISTRICT, EVERY_METHOD } from '../../../shared/domain/lists'
import type { Standing, Standings } from '../../../shared/domain/ranking'
import { readStandings } from '../../read-models/records/counts'
import type { ListRow } from '../../read-models/records/list'

/** Which of a class's four kinds of list a rank is taken in. */
export interface RankedIn {
  readonly districtId: number | null
  readonly method: string | undefined
}

type Ranked = Pick<ListRow, 'class_id' | 'net16'>

const read = (db: Knex, version: number, classId: number, { districtId, method }: RankedIn): Promise<Standings> =>
  readStandings(db, version, { classId, districtId: districtId ?? EVERY_DISTRICT, method: method ?? EVERY_METHOD })

/** A record that was changed between two statements stands in no count yet; it is last for the moment. */
const standing = (list: Standings, net16: number): Standing => list.of(net16) ?? { rank: list.atLeast(net16 + 1) + 1, sharedBy: 1, total: list.total, below: 0 }

/** The rank of every row in the list of its own class, from the kept counts. */
export async function ranksOf(db: Knex, version: number, rows: readonly Ranked[], list: RankedIn): Promise<(row: Ranked) => number> {
  const kept = new Map(await Promise.all([...new Set(rows.map(row => row.class_id))].map(async classId => [classId, await read(db, version, classId, list)] as const)))
  return row => standing(kept.get(row.class_id)!, row.net16).rank
}

/** Rank, total and how many share it, for one record. */
export async function standingIn(db: Knex, version: number, row: Ranked, list: RankedIn): Promise<Standing> {
  return standing(await read(db, version, row.class_id, list), row.net16)
}
