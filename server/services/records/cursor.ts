import { createHash, createHmac, timingSafeEqual } from 'node:crypto'
import { DomainError } from '../../../shared/errors'
import type { KeyValue } from '../../read-models/keyset'

/** A place in a list: the last row's values of the order, which way to go on from it, and how many rows lie before it. */
export interface Place {
  readonly values: readonly KeyValue[]
  readonly way: 'next' | 'prev'
  /** Rows of the list in front of the boundary, for `position`. */
  readonly before: number
}

/** What a cursor is bound to: the same filters and the same sort. */
export function fingerprint(parts: unknown): string {
  return createHash('sha256').update(JSON.stringify(parts)).digest('base64url').slice(0, 12)
}

const sign = (body: string, secret: string) => createHmac('sha256', secret).update(`cursor:${body}`).digest('base64url').slice(0, 22)

export function writeCursor(place: Place, bound: string, secret: string): string {
  const body = Buffer.from(JSON.stringify([bound, place.way === 'next' ? 1 : 0, place.before, ...place.values])).toString('base64url')
  return `${body}.${sign(body, secret)}`
}

/**
 * @throws DomainError `cursor_invalid` (422) for a cursor that was changed, or that belongs to other filters or another sort
 */
export function readCursor(cursor: string, bound: string, columns: number, secret: string): Place {
  const [body = '', signature = ''] = cursor.split('.')
  const expected = Buffer.from(sign(body, secret))
  const given = Buffer.from(signature)
  if (expected.length !== given.length || !timingSafeEqual(expected, given)) throw new DomainError('cursor_invalid')
  const [of, way, before, ...values] = JSON.parse(Buffer.from(body, 'base64url').toString()) as [string, number, number, ...KeyValue[]]
  if (of !== bound || values.length !== columns) throw new DomainError('cursor_invalid')
  return { values, way: way === 1 ? 'next' : 'prev', before }
}
