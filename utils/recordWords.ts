import type { RecordFilters, RecordSort } from '#shared/schemas/records'

/** What of a list stands in the URL, apart from the cursor. */
export const FILTER_NAMES = ['species', 'category', 'district', 'method', 'sex', 'from', 'to', 'minNet', 'q'] as const satisfies readonly (keyof RecordFilters)[]
export type FilterName = (typeof FILTER_NAMES)[number]

/** A list as the URL says it. Everything is a text; what is not there or empty was not chosen. */
export type ListQuery = Partial<Record<FilterName | 'sort' | 'cursor' | 'limit', string>>

const NAMES = [...FILTER_NAMES, 'sort', 'limit', 'cursor'] as const

/** The list that a URL's query names; of a parameter given twice the first counts. */
export function listQueryOf(query: Record<string, unknown>): ListQuery {
  const read: ListQuery = {}
  for (const name of NAMES) {
    const value = [query[name]].flat()[0]
    if (typeof value === 'string' && value !== '') read[name] = value
  }
  return read
}

/** The same list with something changed; a change of anything but the page begins at the first page. */
export function changedQuery(query: ListQuery, change: ListQuery): ListQuery {
  const { cursor: _, ...rest } = query
  return listQueryOf({ ...rest, ...change })
}

/** The sort that a list has where the URL says none. */
export const defaultSortOf = (query: ListQuery): RecordSort => query.category || query.species ? '-net' : '-acceptedOn'
