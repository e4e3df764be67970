import type { Knex } from 'knex'

/** One column of a list's order. */
export interface OrderColumn {
  readonly column: string
  readonly order: 'asc' | 'desc'
}

export type KeyValue = string | number | null

const opposite = { asc: 'desc', desc: 'asc' } as const

/** The same list read from its other end. */
export function reversed(order: readonly OrderColumn[]): OrderColumn[] {
  return order.map(({ column, order: way }) => ({ column, order: opposite[way] }))
}

/**
 * Goes on behind a place of an ordered list. The condition is written out column by column, `a > ? OR (a = ? AND b > ?)`,
 * with a bound on the first column in front: a row constructor `(a, b) > (?, ?)` makes MariaDB read tens of thousands of
 * rows for fifty, this one reads about as many as it returns.
 *
 * @param values one value a column of `order`, as the last row on the page before had them
 */
export function beyond(query: Knex.QueryBuilder, order: readonly OrderColumn[], values: readonly KeyValue[]): Knex.QueryBuilder {
  const after = (way: 'asc' | 'desc') => way === 'asc' ? '>' : '<'
  query.where(order[0]!.column, `${after(order[0]!.order)}=`, values[0]!)
  return query.where((any) => {
    order.forEach((last, depth) => {
      any.orWhere((all) => {
        order.slice(0, depth).forEach((same, place) => all.where(same.column, values[place]!))
        all.where(last.column, after(last.order), values[depth]!)
      })
    })
  })
}
