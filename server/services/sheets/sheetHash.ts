import { createHash } from 'node:crypto'
import { canonicalBytes, type Json } from '#shared/domain/canonical'

/** What a signature on a sheet stands for. */
export interface SignedContent {
  /** entries.uid */
  readonly entry: string
  readonly kind: string
  readonly number: number
  readonly definition: string
  /** as kept: whole steps by line */
  readonly measurements: Json
  readonly measuredOn: string
  readonly driedSince: string | null
  /** users.uid of the measurer, or the name of one without an account */
  readonly measurer: string
  /** ISO 8601 in UTC with milliseconds */
  readonly signedAt: string
  readonly slipAnswers: Json
}

/** SHA-256 over the canonical bytes (RFC 8785) of everything that a signed sheet says. */
export function sheetHash(content: SignedContent): string {
  return createHash('sha256').update(canonicalBytes({ ...content })).digest('hex')
}
