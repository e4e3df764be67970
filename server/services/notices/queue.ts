import { randomBytes } from 'node:crypto'
import type { Knex } from 'knex'
import { sqlTime } from '../../../db/time'
import { uuidv7 } from '../../../shared/uuid'
import type { TemplateName } from './templates'

/** A value of a notice, said in the reader's language when it is sent. */
export type NoticeValue
  = | string
    | number
    | null
  /** a text of the message files, e.g. a ground by its code */
    | { readonly text: string, readonly params?: Readonly<Record<string, string | number>> }
  /** a calendar day, `YYYY-MM-DD` */
    | { readonly day: string }
  /** an instant, ISO 8601, shown in the registry's time zone */
    | { readonly instant: string }
  /** one line each */
    | { readonly list: readonly string[] }

export interface Notice {
  readonly template: TemplateName
  readonly toEmail: string
  /** null for somebody without an account, such as who was invited */
  readonly userId: number | null
  readonly entryId?: number | null
  readonly args: Readonly<Record<string, NoticeValue>>
  readonly locale?: string
  /** Kept with a minted link for whoever redeems it; never said in the notice. */
  readonly tokenPayload?: unknown
  /** not before */
  readonly runAt?: Date
}

/**
 * Leaves a notice in the outbox, in the transaction of what it reports: if that is undone, nobody hears of it; if it
 * is committed, the notice is sent sooner or later.
 */
export async function queueNotice(trx: Knex, now: Date, notice: Notice): Promise<void> {
  await trx('notices').insert({
    uid: uuidv7(now.getTime(), randomBytes(16)),
    template: notice.template,
    user_id: notice.userId,
    to_email: notice.toEmail,
    entry_id: notice.entryId ?? null,
    args: JSON.stringify(notice.tokenPayload === undefined ? notice.args : { ...notice.args, tokenPayload: notice.tokenPayload }),
    locale: notice.locale ?? 'en',
    run_at: sqlTime(notice.runAt ?? now),
    created_at: sqlTime(now),
  })
}
