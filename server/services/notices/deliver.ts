import { sqlTime } from '../../../db/time'
import type { Registry } from '../../composition'
import { MailFailure, type MailTransport } from '../../mail/transport'
import { claimDue, giveBack, putBack, settle, type Lease } from '../../repositories/leases'
import { readNotice, type NoticeRow } from '../../repositories/notices'
import { backoff } from '../jobs/backoff'
import { mintLink } from './mint'
import type { NoticeValue } from './queue'
import { renderNotice } from './render'
import { isTemplate, TEMPLATES, type Template } from './templates'

const LEASE_MS = 120_000
const BATCH = 10
/** A message that the server refuses this often is shown to staff as failed; they can send it again. */
const MOST_REFUSALS = 6
/** A server that is away is asked again this often; its messages wait as long as it takes. */
const SERVER_AWAY_MS = 30_000

export interface DeliveryResult {
  readonly sent: number
  readonly failed: number
  /** The server took nothing; there is no use in going on at once. */
  readonly serverAway: boolean
}

/**
 * Sends what is due. Each notice is sent at least once: the row says "sent" only after the server took it, so a
 * worker that is killed between the two sends it again, under the same Message-ID.
 */
export async function deliverNotices(registry: Registry, transport: MailTransport, stop: AbortSignal): Promise<DeliveryResult> {
  const { db, clock, log } = registry
  const leases = await claimDue(db, 'notices', clock.now(), LEASE_MS, BATCH)
  let sent = 0
  let failed = 0
  let serverAway = false
  for (const lease of leases) {
    if (stop.aborted || serverAway) {
      await (serverAway ? waitForServer(registry, lease) : giveBack(db, lease, clock.now()))
      continue
    }
    try {
      const notice = await readNotice(db, lease.id)
      if (!notice) continue
      const messageId = await send(registry, transport, notice)
      // What a minted link was made with has done its work; nobody needs to read it again.
      const { tokenPayload, ...args } = notice.args
      await settle(db, lease, {
        state: 'sent',
        sent_at: sqlTime(clock.now()),
        message_id: messageId,
        claimed_until: null,
        last_error: null,
        ...(tokenPayload === undefined ? {} : { args: JSON.stringify(args) }),
      })
      sent++
    }
    catch (error) {
      if (error instanceof MailFailure && error.kind === 'server') {
        serverAway = true
        log.warn({ err: error.message }, 'the mail server is away')
        await waitForServer(registry, lease, error.message)
        continue
      }
      failed++
      log.error({ err: error, notice: lease.id, attempt: lease.attempt }, 'a notice could not be sent')
      await refused(registry, lease, error)
    }
  }
  return { sent, failed, serverAway }
}

/** Not the notice's fault: it waits, and the attempt does not count against it. */
async function waitForServer({ db, clock }: Registry, lease: Lease, error?: string): Promise<void> {
  await settle(db, lease, {
    run_at: sqlTime(new Date(clock.now().getTime() + SERVER_AWAY_MS)),
    claimed_until: null,
    attempts: lease.attempt - 1,
    ...(error ? { last_error: error.slice(0, 1000) } : {}),
  })
}

async function refused({ db, clock }: Registry, lease: Lease, error: unknown): Promise<void> {
  const message = error instanceof Error ? error.message : String(error)
  if (lease.attempt >= MOST_REFUSALS) {
    await settle(db, lease, { state: 'failed', claimed_until: null, last_error: message.slice(0, 1000) })
    return
  }
  await putBack(db, lease, new Date(clock.now().getTime() + backoff(lease.attempt)), message)
}

async function send(registry: Registry, transport: MailTransport, notice: NoticeRow): Promise<string> {
  if (!isTemplate(notice.template)) throw new RangeError(`there is no notice template ${notice.template}`)
  const settings = await registry.settings()
  const { tokenPayload, ...args } = notice.args
  const link = await linkOf(registry, notice, TEMPLATES[notice.template], tokenPayload)
  const rendered = renderNotice(notice.template, args as Record<string, NoticeValue>, {
    locale: notice.locale,
    settings,
    link: link === null ? null : `${registry.config.publicUrl}${link}`,
  })
  const host = new URL(registry.config.publicUrl).hostname
  const messageId = `<${notice.uid}@${host}>`
  await transport.send({
    from: { name: settings.societyName, address: settings.officeEmail || `office@${host}` },
    to: notice.toEmail,
    ...rendered,
    messageId,
  })
  return messageId
}

/** Path of the page that the notice leads to, or null. */
async function linkOf({ db, clock }: Registry, notice: NoticeRow, template: Template, payload: unknown): Promise<string | null> {
  switch (template.target) {
    case 'minted':
      return mintLink(db, clock.now(), template.mint!, { userId: notice.userId, email: notice.toEmail, payload })
    case 'entry':
      return notice.entryUid ? `/desk/entries/${notice.entryUid}` : '/desk'
    case 'record':
      return notice.recordNo ? `/records/${notice.recordNo}` : '/records'
    case 'bench':
    case 'office':
    case 'panel':
      return notice.entryUid ? `/desk/${template.target}/${notice.entryUid}` : `/desk/${template.target}`
    case 'people':
      return '/desk/registrar/people'
    case 'account':
      return '/account'
    case 'desk':
      return '/desk'
    case 'none':
      return null
  }
}
