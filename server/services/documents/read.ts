import type { Readable } from 'node:stream'
import type { FilesRow } from '../../../db/tables'
import type { ActiveActor } from '../../../shared/domain/access/roles'
import { isOnTheLine } from '../../../shared/domain/workflow/eligibility'
import { PAPERS, type DocumentKind } from '../../../shared/domain/workflow/origins'
import { DomainError } from '../../../shared/errors'
import { isoTime } from '../../../db/time'
import type { Registry } from '../../composition'
import { findClassById, listClassLines } from '../../repositories/catalogue'
import * as documents from '../../repositories/documents'
import { readableEntry } from '../entries/sees'
import { removalContext } from './removal'
import { LIMITS } from './limits'
import { addableKinds, canChangeDocument } from './rules'

export interface DocumentShown {
  readonly id: string
  readonly kind: DocumentKind
  readonly name: string
  readonly type: 'image' | 'pdf'
  readonly width: number | null
  readonly height: number | null
  /** pages that can be looked at; null for a picture, and for a PDF of which no pictures could be made */
  readonly pages: number | null
  /** bytes */
  readonly size: number
  readonly scanned: boolean
  readonly byViewer: boolean
  readonly uploadedBy: string | null
  readonly createdAt: string
  readonly hasThumbnail: boolean
  /** whether the viewer can remove, replace or rename it */
  readonly changeable: boolean
}

export interface EntryDocuments {
  readonly items: readonly DocumentShown[]
  /** papers that the origin asks for, and whether they are there */
  readonly wanted: readonly { readonly kind: DocumentKind, readonly there: boolean }[]
  /** kinds that the viewer can add now */
  readonly addable: readonly DocumentKind[]
  readonly maxBytes: number
  /** whether uploads are looked at by a scanner on this installation */
  readonly scanning: boolean
}

/**
 * Papers and photographs of an entry, and which are still wanted.
 *
 * @throws DomainError `not_found`, `stake`
 */
export async function readDocuments(registry: Registry, actor: ActiveActor, entryUid: string): Promise<EntryDocuments> {
  const { db } = registry
  const found = await readableEntry(db, actor, entryUid)
  const { entry, access } = found
  const removal = await removalContext(db, found)
  const lines = await documents.listDocuments(db, entry.id)
  const category = (await findClassById(db, entry.class_id))!
  const classLines = entry.district_id === null ? [] : await listClassLines(db, entry.district_id, category.species_id)
  const onTheLine = isOnTheLine({ category: category.code, lines: classLines })
  const wanted: readonly DocumentKind[] = onTheLine ? [...PAPERS[entry.origin], 'genetic_proof'] : PAPERS[entry.origin]
  return {
    items: lines.map(line => ({
      id: line.uid,
      kind: line.kind,
      name: line.name,
      type: line.mime === 'application/pdf' ? 'pdf' : 'image',
      width: line.width,
      height: line.height,
      pages: line.pages,
      size: line.size,
      scanned: line.scan_state === 'clean',
      byViewer: line.uploaded_by === actor.userId,
      uploadedBy: line.uploader_name,
      createdAt: isoTime(line.created_at),
      hasThumbnail: line.thumb_file_id !== null,
      changeable: canChangeDocument(actor, { kind: line.kind, uploadedBy: line.uploaded_by, createdAt: line.created_at }, removal),
    })),
    wanted: wanted.map(kind => ({ kind, there: lines.some(line => line.kind === kind) })),
    addable: addableKinds(actor, access),
    maxBytes: LIMITS.fileBytes,
    scanning: registry.scanner !== null,
  }
}

export type FileView = 'thumbnail' | 'picture' | 'original'

export interface FileToSend {
  readonly mime: string
  readonly size: number
  /** the content's own hash */
  readonly etag: string
  readonly name: string
  /** a file from a stranger is saved, never shown */
  readonly attachment: boolean
  open(): Promise<Readable>
}

/**
 * A file of a document for whoever may see it: a thumbnail, a picture (of a page, for a PDF), or the original of a PDF.
 *
 * @throws DomainError `not_found`, `stake`, `storage_away`
 */
export async function readFile(registry: Registry, actor: ActiveActor, uid: string, view: FileView, page: number): Promise<FileToSend> {
  const document = await documents.findDocument(registry.db, uid)
  if (!document) throw new DomainError('not_found')
  await readableEntry(registry.db, actor, document.entry_uid)
  const original = await documents.findFile(registry.db, document.file_id)
  const isPdf = original?.mime === 'application/pdf'
  const file: FilesRow | undefined = view === 'thumbnail'
    ? (document.thumb_file_id === null ? undefined : await documents.findFile(registry.db, document.thumb_file_id))
    : view === 'picture' && isPdf ? await documents.findPage(registry.db, document.id, page) : original
  if (!file) throw new DomainError('not_found')
  return {
    mime: file.mime,
    size: file.size,
    etag: file.sha256,
    name: document.name,
    attachment: view === 'original',
    open: () => registry.storage.read(file.storage_key),
  }
}
