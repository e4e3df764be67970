import { join } from 'node:path'
import { DomainError } from '../../../shared/errors'
import type { Registry } from '../../composition'
import { listMailbox, readMailbox, type KeptMessage, type OpenedMessage } from '../../mail/mailbox'

const SHOWN = 200

/** The demo's mailbox is everybody's; outside the demo there is none. @throws DomainError `not_found` */
function folderOf({ config }: Registry): string {
  if (config.mode !== 'demo') throw new DomainError('not_found')
  return join(config.dataDir, 'mailbox')
}

/** What would have been sent, the newest first, at most two hundred. */
export async function listMessages(registry: Registry): Promise<{ items: KeptMessage[] }> {
  return { items: await listMailbox(folderOf(registry), SHOWN) }
}

/** @throws DomainError `not_found` */
export async function readMessage(registry: Registry, id: string): Promise<OpenedMessage> {
  const message = await readMailbox(folderOf(registry), id)
  if (!message) throw new DomainError('not_found')
  return message
}
