import type { ActiveActor } from '../../../shared/domain/access/roles'
import type { DocumentKind } from '../../../shared/domain/workflow/origins'
import { DomainError } from '../../../shared/errors'
import { inTransaction } from '../../../db/transaction'
import type { Registry } from '../../composition'
import * as documents from '../../repositories/documents'
import { appendEvent } from '../events/append'
import { momentOf } from '../moment'
import { lockedEntry } from '../entries/sees'
import { removalContext } from './removal'
import { takeAway } from './add'
import { addableKinds, canChangeDocument, isPhotograph } from './rules'

/**
 * Takes a document off an entry while nothing rests on it.
 *
 * @throws DomainError `not_found`, `stake`, `file_settled`
 */
export async function removeDocument(registry: Registry, actor: ActiveActor, uid: string): Promise<void> {
  const moment = await momentOf(registry)
  await inTransaction(registry.db, async (trx) => {
    const document = await documents.findDocument(trx, uid)
    if (!document) throw new DomainError('not_found')
    const found = await lockedEntry(trx, actor, document.entry_uid)
    await takeAway(trx, actor, found, uid, moment)
    await appendEvent(trx, found.entry, { kind: 'document_removed', actor, args: { document: uid, documentKind: document.kind } }, moment)
  })
}

/**
 * Says that a document is of another kind, e.g. the left side instead of the right.
 *
 * @throws DomainError `not_found`, `stake`, `file_settled`, `invalid_input`
 */
export async function changeKind(registry: Registry, actor: ActiveActor, uid: string, kind: DocumentKind): Promise<void> {
  const moment = await momentOf(registry)
  await inTransaction(registry.db, async (trx) => {
    const document = await documents.findDocument(trx, uid)
    if (!document) throw new DomainError('not_found')
    const found = await lockedEntry(trx, actor, document.entry_uid)
    const standing = { kind: document.kind, uploadedBy: document.uploaded_by, createdAt: document.created_at }
    if (!canChangeDocument(actor, standing, await removalContext(trx, found))) throw new DomainError('file_settled')
    if (!addableKinds(actor, found.access).includes(kind)) throw new DomainError('invalid_input', { fields: [{ path: 'kind', code: 'document_kind' }] })
    const file = await documents.findFile(trx, document.file_id)
    if (isPhotograph(kind) && file?.mime === 'application/pdf') throw new DomainError('file_kind', { details: { reason: 'photo_pdf' } })
    await documents.updateDocument(trx, document.id, { kind })
    await appendEvent(trx, found.entry, { kind: 'document_renamed', actor, args: { document: uid, from: document.kind, documentKind: kind } }, moment)
  })
}

/**
 * Puts the documents of an entry into an order; those that are not named keep theirs behind the others.
 *
 * @throws DomainError `not_found`, `stake`, `wrong_state`
 */
export async function orderDocuments(registry: Registry, actor: ActiveActor, entryUid: string, order: readonly string[]): Promise<void> {
  await inTransaction(registry.db, async (trx) => {
    const found = await lockedEntry(trx, actor, entryUid)
    if (addableKinds(actor, found.access).length === 0) throw new DomainError('wrong_state')
    const place = new Map(order.map((uid, index) => [uid, index]))
    const standing = await documents.listDocuments(trx, found.entry.id)
    const sorted = standing.slice().sort((a, b) => (place.get(a.uid) ?? order.length) - (place.get(b.uid) ?? order.length))
    for (const [index, document] of sorted.entries()) if (document.sort !== index + 1) await documents.updateDocument(trx, document.id, { sort: index + 1 })
  })
}
