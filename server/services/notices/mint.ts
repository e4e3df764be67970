import { createHash, randomBytes } from 'node:crypto'
import type { Knex } from 'knex'
import { sqlTime } from '../../../db/time'
import type { UserTokensRow } from '../../../db/tables'

export type TokenKind = UserTokensRow['kind']

const HOUR = 3_600_000
const DAY = 24 * HOUR

/** How long a link works, and the page that takes it. */
export const TOKENS: Readonly<Record<TokenKind, { readonly livesMs: number, readonly page: string }>> = {
  confirm_email: { livesMs: 2 * DAY, page: '/confirm' },
  reset_password: { livesMs: HOUR, page: '/reset' },
  change_email: { livesMs: DAY, page: '/confirm' },
  invite: { livesMs: 14 * DAY, page: '/invite' },
  first_registrar: { livesMs: DAY, page: '/invite' },
  claim: { livesMs: 60 * DAY, page: '/claim' },
}

export interface MintOptions {
  readonly userId: number | null
  readonly email: string | null
  /** Kept with the token for whoever redeems it. */
  readonly payload?: unknown
}

/** What stands in the database for a token; the token itself is only in the link. */
export function tokenHash(token: string): string {
  return createHash('sha256').update(token).digest('hex')
}

/**
 * Makes a secret link of one use.
 *
 * @returns path and query, to be put behind the public address
 */
export async function mintLink(db: Knex, now: Date, kind: TokenKind, options: MintOptions): Promise<string> {
  const token = randomBytes(32).toString('base64url')
  const { livesMs, page } = TOKENS[kind]
  await db('user_tokens').insert({
    kind,
    token_hash: tokenHash(token),
    user_id: options.userId,
    email: options.email,
    payload: options.payload === undefined ? null : JSON.stringify(options.payload),
    created_at: sqlTime(now),
    expires_at: sqlTime(new Date(now.getTime() + livesMs)),
  })
  return `${page}?token=${token}`
}
