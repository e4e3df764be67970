import { DomainError } from '../../../shared/errors'
import type { DocumentKind } from '../../../shared/domain/workflow/origins'
import type { Registry } from '../../composition'
import type { Incoming, Kept } from '../../storage/files'
import { TAKEN, typeOf } from './inspect'
import { picturesOfPages } from './pdfPages'
import { keepPicture, thumbnailOf, type Picture } from './pictures'
import { isPhotograph } from './rules'
import { turns } from './turns'

export interface KeptFile extends Kept {
  readonly mime: string
}

/** An upload whose files lie in the storage, before any row speaks of them. */
export interface Prepared {
  readonly file: KeptFile
  readonly thumbnail: KeptFile | null
  readonly width: number | null
  readonly height: number | null
  /** pages of a PDF whose pictures were made; null for a picture, or where none could be made */
  readonly pages: readonly (KeptFile & { readonly width: number, readonly height: number })[] | null
  readonly scanned: 'clean' | 'not_scanned'
  /** ending of the file's name */
  readonly ending: 'jpg' | 'webp' | 'pdf'
}

const inTurn = turns(2)

/**
 * Looks at an upload, cleans it and stores it: pictures upright and packed anew, a PDF with pictures of its pages.
 * The incoming file is gone afterwards, whatever comes of it.
 *
 * @throws DomainError `file_kind`, `file_unreadable`, `file_infected`, `storage_away`
 */
export function prepare(registry: Registry, incoming: Incoming, kind: DocumentKind): Promise<Prepared> {
  return inTurn(async () => {
    try {
      const type = TAKEN[await typeOf(incoming.path)]
      const scanned = await scan(registry, incoming)
      if (type === 'image') return await preparePicture(registry, incoming, scanned)
      if (isPhotograph(kind)) throw new DomainError('file_kind', { details: { reason: 'photo_pdf' } })
      return await preparePdf(registry, incoming, scanned)
    }
    finally {
      await registry.storage.discard(incoming)
    }
  })
}

async function scan({ scanner, log }: Registry, incoming: Incoming): Promise<Prepared['scanned']> {
  if (!scanner) return 'not_scanned'
  let clean: boolean
  try {
    clean = await scanner.isClean(incoming.path)
  }
  catch (error) {
    log.warn({ err: error }, 'the scanner does not answer; a file is kept as not scanned')
    return 'not_scanned'
  }
  if (!clean) throw new DomainError('file_infected')
  return 'clean'
}

const keepAll = async (registry: Registry, picture: Picture): Promise<KeptFile> => ({ ...await registry.storage.keepBytes(picture.bytes), mime: picture.mime })

async function preparePicture(registry: Registry, incoming: Incoming, scanned: Prepared['scanned']): Promise<Prepared> {
  const picture = await keepPicture(incoming.path)
  const thumbnail = await thumbnailOf(picture.bytes)
  return {
    file: await keepAll(registry, picture),
    thumbnail: await keepAll(registry, thumbnail),
    width: picture.width,
    height: picture.height,
    pages: null,
    scanned,
    ending: picture.mime === 'image/jpeg' ? 'jpg' : 'webp',
  }
}

async function preparePdf(registry: Registry, incoming: Incoming, scanned: Prepared['scanned']): Promise<Prepared> {
  const pictures = await picturesOfPages(incoming.path)
  const first = pictures?.[0]
  const thumbnail = first ? await thumbnailOf(first.bytes) : null
  const pages: (KeptFile & { width: number, height: number })[] = []
  for (const picture of pictures ?? []) pages.push({ ...await keepAll(registry, picture), width: picture.width, height: picture.height })
  return {
    file: { ...await registry.storage.keep(incoming), mime: 'application/pdf' },
    thumbnail: thumbnail && await keepAll(registry, thumbnail),
    width: first?.width ?? null,
    height: first?.height ?? null,
    pages: pictures ? pages : null,
    scanned,
    ending: 'pdf',
  }
}
