import { mkdtemp, rm, writeFile } from 'node:fs/promises'
import { tmpdir } from 'node:os'
import path from 'node:path'
import type { Knex } from 'knex'
import sharp from 'sharp'
import { SPECIES } from '../reference/species'
import { DOCUMENT_KINDS, type DocumentKind } from '#shared/domain/workflow/origins'
import { sqlTime } from '../../db/time'
import { picturesOfPages } from '../../server/services/documents/pdfPages'
import { thumbnailOf, type Picture } from '../../server/services/documents/pictures'
import { insertMany, nextId } from '../bulk'
import { letter, photograph, type View } from './papers'
import { type Random, uidAt } from './random'

/** Where papers are kept: the registry's own storage. */
export interface PaperStore {
  keepBytes: (bytes: Buffer) => Promise<{ readonly sha256: string, readonly size: number, readonly storageKey: string }>
}

/** A paper that an entry has and that is still to be drawn and kept. */
export interface PromisedPaper {
  readonly entryId: number
  /** code of the class */
  readonly category: string
  readonly kind: DocumentKind
  readonly at: Date
  readonly by: number
  readonly random: Random
}

interface Drawn {
  readonly fileId: number
  readonly thumbFileId: number | null
  readonly width: number | null
  readonly height: number | null
  /** pictures of the pages of a letter; null for a photograph, or where none could be made */
  readonly pages: readonly { readonly fileId: number, readonly width: number, readonly height: number }[] | null
  readonly ending: 'jpg' | 'pdf'
}

const VIEWS: Readonly<Partial<Record<DocumentKind, View>>> = { photo_front: 'front', photo_left: 'left', photo_right: 'right', photo_field: 'field' }
/** Drawn at the same time; more would only wait for a processor. */
const AT_ONCE = 4
/** Different drawings of one kind; only the photographs of entries under way are drawn for each alone. */
const VARIANTS = { photographs: 2, letters: 6 } as const

const NAMES: Readonly<Record<DocumentKind, string>> = {
  photo_front: 'front', photo_left: 'left', photo_right: 'right', photo_field: 'field', tag_or_licence: 'tag', proof_of_possession: 'possession',
  account: 'account', genetic_proof: 'genetic proof', condition: 'condition', letter: 'letter', other: 'paper',
}

const LETTERS: Readonly<Partial<Record<DocumentKind, readonly string[]>>> = {
  tag_or_licence: ['Ochre Basin wildlife authority', 'Tag for one animal, punched on the day of taking.', 'This copy was drawn for the demonstration; it is valid nowhere.'],
  proof_of_possession: ['Ochre Basin wildlife authority', 'The holder reported the find and may keep it.', 'This letter was drawn for the demonstration.'],
  account: ['How the head was found or came into the family.', 'It lay above the creek, clean, with both sides on the skull.', 'This account was written for the demonstration.'],
}

const family = (category: string) => SPECIES.find(species => category === species.code || category.startsWith(`${species.code}-`))?.family ?? 'deer'

/** Under which a drawing is shared. */
function nameOf({ entryId, kind, category }: PromisedPaper, own: boolean): string {
  if (!VIEWS[kind]) return `${kind} ${entryId % VARIANTS.letters}`
  return own ? `${kind} of ${entryId}` : `${kind} ${family(category)} ${entryId % VARIANTS.photographs}`
}

/** Pictures of a letter's pages, as an upload would get them. */
async function pagesOf(pdf: Buffer): Promise<Picture[] | null> {
  const folder = await mkdtemp(path.join(tmpdir(), 'hartroll-letter-'))
  try {
    const file = path.join(folder, 'letter.pdf')
    await writeFile(file, pdf)
    return await picturesOfPages(file)
  }
  finally {
    await rm(folder, { recursive: true, force: true })
  }
}

/** Draws papers and keeps each once; what is asked for again under the same name is the same file. */
export class PaperDesk {
  private readonly drawn = new Map<string, Promise<Drawn>>()
  private readonly files = new Map<string, number>()
  private readonly rows: Parameters<typeof insertMany<'files'>>[2][number][] = []

  private constructor(private readonly store: PaperStore, private next: number, private readonly at: Date) {}

  static async begin(db: Knex, store: PaperStore, at: Date): Promise<PaperDesk> {
    return new PaperDesk(store, await nextId(db, 'files'), at)
  }

  private async keep(bytes: Buffer, mime: string): Promise<number> {
    const { sha256, size, storageKey } = await this.store.keepBytes(bytes)
    const known = this.files.get(sha256)
    if (known !== undefined) return known
    const id = this.next++
    this.files.set(sha256, id)
    this.rows.push({ id, sha256, size, mime, storage_key: storageKey, created_at: sqlTime(this.at) })
    return id
  }

  draw(name: string, category: string, kind: DocumentKind, random: Random): Promise<Drawn> {
    let drawn = this.drawn.get(name)
    if (!drawn) this.drawn.set(name, drawn = this.drawAnew(category, kind, random))
    return drawn
  }

  private async drawAnew(category: string, kind: DocumentKind, random: Random): Promise<Drawn> {
    const view = VIEWS[kind]
    if (!view) return this.drawLetter(kind, random)
    const picture = await photograph(family(category), view, random)
    const { width, height } = await sharp(picture).metadata()
    const thumbnail = await thumbnailOf(picture)
    return { fileId: await this.keep(picture, 'image/jpeg'), thumbFileId: await this.keep(thumbnail.bytes, thumbnail.mime), width, height, pages: null, ending: 'jpg' }
  }

  private async drawLetter(kind: DocumentKind, random: Random): Promise<Drawn> {
    const pdf = letter(`No. ${random.whole(10_000, 99_999)}`, LETTERS[kind] ?? ['Drawn for the demonstration.'])
    const pictures = await pagesOf(pdf)
    const pages = []
    for (const { bytes, mime, width, height } of pictures ?? []) pages.push({ fileId: await this.keep(bytes, mime), width, height })
    const thumbnail = pictures?.[0] ? await thumbnailOf(pictures[0].bytes) : null
    return {
      fileId: await this.keep(pdf, 'application/pdf'),
      thumbFileId: thumbnail && await this.keep(thumbnail.bytes, thumbnail.mime),
      width: pictures?.[0]?.width ?? null,
      height: pictures?.[0]?.height ?? null,
      pages: pictures && pages,
      ending: 'pdf',
    }
  }

  /** Draws what was promised and lays it under the entries. */
  async deliver(db: Knex, papers: readonly PromisedPaper[], own: boolean): Promise<void> {
    const documents: Parameters<typeof insertMany<'documents'>>[2][number][] = []
    const pages: Parameters<typeof insertMany<'document_pages'>>[2][number][] = []
    let id = await nextId(db, 'documents')
    for (let from = 0; from < papers.length; from += AT_ONCE) {
      await Promise.all(papers.slice(from, from + AT_ONCE).map(async (paper) => {
        const drawn = await this.draw(nameOf(paper, own), paper.category, paper.kind, paper.random)
        const documentId = id++
        for (const [at, page] of (drawn.pages ?? []).entries()) {
          pages.push({ document_id: documentId, page: at + 1, file_id: page.fileId, width: page.width, height: page.height })
        }
        documents.push({
          id: documentId, uid: uidAt(paper.at, paper.random), entry_id: paper.entryId, file_id: drawn.fileId, thumb_file_id: drawn.thumbFileId, kind: paper.kind,
          name: `${NAMES[paper.kind]}.${drawn.ending}`, width: drawn.width, height: drawn.height, pages: drawn.pages?.length ?? null, sort: DOCUMENT_KINDS.indexOf(paper.kind),
          released: 0, scan_state: 'not_scanned', uploaded_by: paper.by, created_at: sqlTime(paper.at),
        })
      }))
    }
    await insertMany(db, 'files', this.rows.splice(0))
    await insertMany(db, 'documents', documents)
    await insertMany(db, 'document_pages', pages)
  }
}
