import { stringify } from 'csv-stringify/sync'
import type { RecordLine, RecordsQuery } from '../../../shared/schemas/records'
import type { Registry } from '../../composition'
import { presentRecord } from '../../presenters/records'
import { listPage, orderOf, placeOf } from '../../read-models/records/list'
import { t } from '../texts/translate'
import { defaultSort } from './listRecords'
import { ranksOf } from './ranks'
import { scopeOf } from './scope'

const COLUMNS = [
  'recordNo', 'rank', 'category', 'species', 'net', 'gross', 'hunter', 'district', 'method', 'origin', 'sex', 'takenOn', 'acceptedOn', 'status', 'source', 'formerNo',
] as const satisfies readonly (keyof RecordLine)[]

/** Rows that are read and written at a time, so that a list of any length takes the same memory. */
const CHUNK = 1_000

const line = (cells: readonly unknown[]) => stringify([[...cells]], {
  record_delimiter: 'windows',
  // A cell that a spreadsheet would run as a formula gets an apostrophe in front.
  escape_formulas: true,
})

/** The list of a query as CSV (RFC 4180), chunk by chunk, with a head line. The filters are checked before the first chunk. */
export async function streamCsv(registry: Registry, query: Omit<RecordsQuery, 'limit' | 'cursor'>, locale: string, version: number): Promise<AsyncIterable<string>> {
  const { sort: asked, ...filters } = query
  const sort = asked ?? defaultSort(filters)
  const { scope, names } = await scopeOf(registry, filters)
  const order = orderOf(sort)

  async function* chunks(): AsyncGenerator<string> {
    yield line(COLUMNS)
    let place: { values: ReturnType<typeof placeOf>, way: 'next' } | null = null
    for (;;) {
      const found = await listPage(registry.db, scope, sort, CHUNK, place)
      const rows = found.slice(0, CHUNK)
      const rank = await ranksOf(registry.db, version, rows, { districtId: scope.districtId, method: filters.method })
      yield rows.map((row) => {
        const shown = presentRecord(row, names, rank(row), null, (key, params) => t(locale, key, params))
        return line(COLUMNS.map(column => shown[column]))
      }).join('')
      if (found.length <= CHUNK) return
      place = { values: placeOf(rows.at(-1)!, order), way: 'next' }
    }
  }
  return chunks()
}
