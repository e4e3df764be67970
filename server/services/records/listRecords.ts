import type { RecordSort, RecordsAnswer, RecordsQuery } from '../../../shared/schemas/records'
import type { Registry } from '../../composition'
import { presentRecord } from '../../presenters/records'
import { listPage, orderOf, placeOf, type ListRow } from '../../read-models/records/list'
import { totalOf } from '../../read-models/records/counts'
import { t } from '../texts/translate'
import { fingerprint, readCursor, writeCursor, type Place } from './cursor'
import { ranksOf } from './ranks'
import { scopeOf } from './scope'

/** Nets of different classes do not compare, so a list over all of them begins with the newest. */
export function defaultSort(filters: Pick<RecordsQuery, 'category' | 'species'>): RecordSort {
  return filters.category || filters.species ? '-net' : '-acceptedOn'
}

/**
 * A page of the public lists: only records that stand, each with its rank in the list of its class.
 *
 * @param version of the lists (`listsVersion`), as the caller read it for this answer
 * @throws DomainError `invalid_input` for a code nobody knows, `cursor_invalid` for a cursor of another list
 */
export async function listRecords(registry: Registry, query: RecordsQuery, locale: string, version: number): Promise<RecordsAnswer> {
  const { limit, cursor, sort: asked, ...filters } = query
  const { db, config: { secret } } = registry
  const sort = asked ?? defaultSort(filters)
  const order = orderOf(sort)
  const bound = fingerprint([sort, filters])
  const { scope, names } = await scopeOf(registry, filters)
  const asks = cursor ? readCursor(cursor, bound, secret) : null
  const page = (place: Place | null) => listPage(db, scope, sort, limit, place)
  const [answered, counted] = await Promise.all([page(asks), totalOf(db, version, scope, id => names.classes.get(id)?.speciesId)])
  // The way back has reached the beginning: the first page is whole again.
  const [place, found] = asks?.way === 'prev' && answered.length <= limit ? [null, await page(null)] : [asks, answered]

  const back = place?.way === 'prev'
  const more = found.length > limit
  const rows = more ? (back ? found.slice(1) : found.slice(0, limit)) : found
  const before = !place ? 0 : back ? Math.max(0, place.before - rows.length) : place.before
  const rank = await ranksOf(db, version, rows, { districtId: scope.districtId, method: filters.method })
  const placed = sort === '-net' && (filters.sex ?? filters.q ?? filters.from ?? filters.to ?? filters.minNet) !== undefined
  const mark = (row: ListRow | undefined, way: 'next' | 'prev', rowsBefore: number) => row ? writeCursor({ values: placeOf(row, order), way, before: rowsBefore }, bound, secret) : null
  return {
    items: rows.map((row, index) => presentRecord(row, names, rank(row), placed ? before + index + 1 : null, (key, params) => t(locale, key, params))),
    nextCursor: back || more ? mark(rows.at(-1), 'next', before + rows.length) : null,
    prevCursor: (back ? more : place !== null) ? mark(rows[0], 'prev', before) : null,
    ...counted,
    sort,
  }
}
