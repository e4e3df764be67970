import type { Readable } from 'node:stream'
import type { Knex } from 'knex'
import type { ActiveActor } from '../../../shared/domain/access/roles'
import type { DocumentKind } from '../../../shared/domain/workflow/origins'
import { DomainError } from '../../../shared/errors'
import { sqlTime } from '../../../db/time'
import { inTransaction } from '../../../db/transaction'
import type { Registry } from '../../composition'
import * as documents from '../../repositories/documents'
import type { Incoming } from '../../storage/files'
import { appendEvent } from '../events/append'
import { momentOf, newUid, type Moment } from '../moment'
import { lockedEntry, readableEntry, type SeenEntry } from '../entries/sees'
import { removalContext } from './removal'
import { LIMITS } from './limits'
import { cleanName } from './names'
import { prepare, type KeptFile, type Prepared } from './prepare'
import { addableKinds, canChangeDocument } from './rules'

export interface Upload {
  readonly kind: DocumentKind
  readonly name: string | undefined
  readonly incoming: Incoming
  /** uid of the document that this one takes the place of */
  readonly replaces?: string | undefined
}

const MB = 1024 * 1024
const DAY = 86_400_000

async function assertRoom(db: Knex, actor: ActiveActor, { entry, access }: SeenEntry, kind: DocumentKind | null, moment: Moment): Promise<void> {
  const kinds = addableKinds(actor, access)
  if (kinds.length === 0) throw new DomainError('wrong_state')
  if (kind !== null && !kinds.includes(kind)) throw new DomainError('invalid_input', { fields: [{ path: 'kind', code: 'document_kind' }] })
  const usage = await documents.usageOfEntry(db, entry.id)
  if (usage.files >= LIMITS.entryFiles) throw new DomainError('quota_entry', { details: { maximum: LIMITS.entryFiles } })
  if (usage.bytes >= LIMITS.entryBytes) throw new DomainError('quota_entry', { details: { reason: 'bytes', maximum: LIMITS.entryBytes / MB } })
  const sent = await documents.countSentSince(db, actor.userId, sqlTime(new Date(moment.now.getTime() - DAY)))
  if (sent >= LIMITS.personFilesADay) throw new DomainError('quota_person', { details: { maximum: LIMITS.personFilesADay } })
}

/**
 * Whether somebody can send a file to an entry at all; asked before a byte of it is read.
 *
 * @throws DomainError `not_found`, `stake`, `wrong_state`, `quota_entry`, `quota_person`
 */
export async function assertCanAdd(registry: Registry, actor: ActiveActor, entryUid: string): Promise<void> {
  await assertRoom(registry.db, actor, await readableEntry(registry.db, actor, entryUid), null, await momentOf(registry))
}

/** Takes a stream in; see FileStorage.receive. */
export function receiveUpload(registry: Registry, stream: Readable): Promise<Incoming> {
  return registry.storage.receive(stream, LIMITS.fileBytes)
}

/**
 * Adds an upload to an entry: looked at by content, cleaned, stored, and only then told of in a row.
 *
 * @returns uid of the document
 * @throws DomainError as assertCanAdd, and `invalid_input`, `file_kind`, `file_unreadable`, `file_infected`,
 * `file_settled` (what it would replace stays), `storage_away`
 */
export async function addDocument(registry: Registry, actor: ActiveActor, entryUid: string, upload: Upload): Promise<string> {
  const moment = await momentOf(registry)
  try {
    await assertRoom(registry.db, actor, await readableEntry(registry.db, actor, entryUid), upload.kind, moment)
  }
  catch (error) {
    await registry.storage.discard(upload.incoming)
    throw error
  }
  const prepared = await prepare(registry, upload.incoming, upload.kind)
  return inTransaction(registry.db, async (trx) => {
    const found = await lockedEntry(trx, actor, entryUid)
    const replaced = upload.replaces === undefined ? undefined : await takeAway(trx, actor, found, upload.replaces, moment)
    await assertRoom(trx, actor, found, upload.kind, moment)
    const uid = await insert(trx, actor, found.entry.id, upload, prepared, replaced?.sort, moment)
    await appendEvent(trx, found.entry, {
      kind: replaced ? 'document_replaced' : 'document_added', actor,
      args: { document: uid, documentKind: upload.kind, ...(replaced ? { replaced: replaced.uid } : {}) },
    }, moment)
    return uid
  })
}

async function insert(trx: Knex.Transaction, actor: ActiveActor, entryId: number, upload: Upload, prepared: Prepared, sort: number | undefined, moment: Moment): Promise<string> {
  const keep = ({ sha256, size, mime, storageKey }: KeptFile) => documents.keepFile(trx, { sha256, size, mime, storage_key: storageKey, created_at: moment.at })
  const uid = newUid(moment.now)
  const id = await documents.insertDocument(trx, {
    uid, entry_id: entryId, file_id: await keep(prepared.file), thumb_file_id: prepared.thumbnail ? await keep(prepared.thumbnail) : null,
    kind: upload.kind, name: cleanName(upload.name, prepared.ending), width: prepared.width, height: prepared.height, pages: prepared.pages?.length ?? null,
    sort: sort ?? await documents.nextSort(trx, entryId), scan_state: prepared.scanned, uploaded_by: actor.userId, created_at: moment.at,
  })
  const pages = []
  for (const [place, page] of (prepared.pages ?? []).entries()) {
    pages.push({ document_id: id, page: place + 1, file_id: await keep(page), width: page.width, height: page.height })
  }
  await documents.insertPages(trx, pages)
  return uid
}

/** Marks a document as removed, where the rules allow it; the file itself stays until nothing rests on it. */
export async function takeAway(trx: Knex.Transaction, actor: ActiveActor, found: SeenEntry, uid: string, moment: Moment) {
  const document = await documents.findDocument(trx, uid)
  if (!document || document.entry_id !== found.entry.id) throw new DomainError('not_found')
  const standing = { kind: document.kind, uploadedBy: document.uploaded_by, createdAt: document.created_at }
  if (!canChangeDocument(actor, standing, await removalContext(trx, found))) throw new DomainError('file_settled')
  await documents.updateDocument(trx, document.id, { removed_at: moment.at })
  return document
}
