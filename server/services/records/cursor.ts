import { createCipheriv, createDecipheriv, createHash, hkdfSync, randomBytes } from 'node:crypto'
import { DomainError } from '../../../shared/errors'
import type { KeyValue } from '../../read-models/keyset'

/** A place in a list: the last row's values of the order, which way to go on from it, and how many rows lie before it. */
export interface Place {
  readonly values: readonly KeyValue[]
  readonly way: 'next' | 'prev'
  /** Rows of the list in front of the boundary, for `position`. */
  readonly before: number
}

const NONCE = 12
const TAG = 16

/** What a cursor is bound to: the same filters and the same sort. */
export function fingerprint(parts: unknown): string {
  return createHash('sha256').update(JSON.stringify(parts)).digest('base64url').slice(0, 12)
}

const keyOf = (secret: string) => new Uint8Array(hkdfSync('sha256', secret, '', 'list cursor', 32))

/** Sealed (AES-256-GCM): the order of a list knows the day of taking, and nobody outside may. */
export function writeCursor(place: Place, bound: string, secret: string): string {
  const nonce = randomBytes(NONCE)
  const cipher = createCipheriv('aes-256-gcm', keyOf(secret), nonce)
  cipher.setAAD(Buffer.from(bound))
  const sealed = Buffer.concat([cipher.update(JSON.stringify([place.way === 'next' ? 1 : 0, place.before, ...place.values])), cipher.final()])
  return Buffer.concat([nonce, cipher.getAuthTag(), sealed]).toString('base64url')
}

/**
 * @throws DomainError `cursor_invalid` (422) for a cursor that was changed, or that belongs to other filters or another sort
 */
export function readCursor(cursor: string, bound: string, secret: string): Place {
  try {
    const bytes = Buffer.from(cursor, 'base64url')
    const decipher = createDecipheriv('aes-256-gcm', keyOf(secret), bytes.subarray(0, NONCE))
    decipher.setAAD(Buffer.from(bound))
    decipher.setAuthTag(bytes.subarray(NONCE, NONCE + TAG))
    const text = Buffer.concat([decipher.update(bytes.subarray(NONCE + TAG)), decipher.final()]).toString()
    const [way, before, ...values] = JSON.parse(text) as [number, number, ...KeyValue[]]
    return { values, way: way === 1 ? 'next' : 'prev', before }
  }
  catch {
    throw new DomainError('cursor_invalid')
  }
}
