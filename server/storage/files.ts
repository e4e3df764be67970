import { createHash, randomUUID } from 'node:crypto'
import { createReadStream, createWriteStream } from 'node:fs'
import { mkdir, open, readdir, rm, stat, utimes } from 'node:fs/promises'
import path from 'node:path'
import type { Readable } from 'node:stream'
import { pipeline } from 'node:stream/promises'
import { Disk } from 'flydrive'
import { FSDriver } from 'flydrive/drivers/fs'
import { S3Driver } from 'flydrive/drivers/s3'
import { DomainError } from '../../shared/errors'
import { filesDir, type HartrollConfig } from '../config'

/** A file that has come in and is not kept yet. */
export interface Incoming {
  readonly path: string
  readonly size: number
  /** SHA-256 in hex */
  readonly sha256: string
}

export interface Kept {
  readonly sha256: string
  readonly size: number
  readonly storageKey: string
}

/** Keys tell the content: two files of the same bytes are one, and a file never changes. */
export function storageKeyOf(sha256: string): string {
  return `${sha256.slice(0, 2)}/${sha256.slice(2, 4)}/${sha256}`
}

async function sync(target: string): Promise<void> {
  const handle = await open(target, 'r')
  try {
    await handle.sync()
  }
  finally {
    await handle.close()
  }
}

/** The stored files of one registry: a folder on one machine, or a bucket. */
export class FileStorage {
  readonly #disk: Disk
  readonly #root: string | null
  readonly #incoming: string

  constructor(config: HartrollConfig) {
    // What comes in is counted and hashed on the local disk, wherever it is kept in the end.
    this.#incoming = path.join(filesDir(config), 'incoming')
    this.#root = config.s3 ? null : path.join(filesDir(config), 'kept')
    this.#disk = config.s3
      ? new Disk(new S3Driver({
          credentials: { accessKeyId: config.s3.accessKeyId, secretAccessKey: config.s3.secretAccessKey },
          endpoint: config.s3.endpoint,
          region: config.s3.region,
          bucket: config.s3.bucket,
          forcePathStyle: true,
          supportsACL: false,
          visibility: 'private',
        }))
      : new Disk(new FSDriver({ location: this.#root!, visibility: 'private' }))
  }

  /**
   * Takes a stream in, counting while it flows; nothing is held in memory. A stream that is too long or breaks off
   * leaves nothing behind.
   *
   * @throws DomainError `file_too_large`, `storage_away`
   */
  async receive(stream: Readable, maxBytes: number): Promise<Incoming> {
    await mkdir(this.#incoming, { recursive: true }).catch(away)
    const target = path.join(this.#incoming, randomUUID())
    const hash = createHash('sha256')
    let size = 0
    try {
      await pipeline(stream, async function* (source: AsyncIterable<Buffer>) {
        for await (const chunk of source) {
          size += chunk.length
          if (size > maxBytes) throw new DomainError('file_too_large', { details: { maximum: Math.floor(maxBytes / 1024 / 1024) } })
          hash.update(chunk)
          yield chunk
        }
      }, createWriteStream(target, { mode: 0o600 }))
      return { path: target, size, sha256: hash.digest('hex') }
    }
    catch (error) {
      await rm(target, { force: true })
      throw error instanceof DomainError ? error : isDiskFull(error) ? away(error) : error
    }
  }

  /** Keeps what came in, on disk for good before it returns. The incoming file is gone afterwards. */
  async keep(incoming: Incoming): Promise<Kept> {
    const storageKey = storageKeyOf(incoming.sha256)
    try {
      if (await this.#refresh(storageKey)) await rm(incoming.path, { force: true })
      else {
        await sync(incoming.path)
        await this.#disk.moveFromFs(incoming.path, storageKey)
        await this.#syncFolder(storageKey)
      }
    }
    catch (error) {
      throw away(error)
    }
    return { sha256: incoming.sha256, size: incoming.size, storageKey }
  }

  /**
   * Makes a file that is there already as young as a new one, so that the sweeper leaves it until its row is written.
   *
   * @returns false where it is not there, or where only writing it again can do that, as in a bucket
   */
  async #refresh(storageKey: string): Promise<boolean> {
    if (this.#root === null) return false
    const now = new Date()
    return utimes(path.join(this.#root, storageKey), now, now).then(() => true, (error: NodeJS.ErrnoException) => {
      if (error.code === 'ENOENT') return false
      throw error
    })
  }

  /** Keeps bytes that were made here, such as a picture that was turned upright. */
  async keepBytes(bytes: Buffer): Promise<Kept> {
    await mkdir(this.#incoming, { recursive: true }).catch(away)
    const target = path.join(this.#incoming, randomUUID())
    const handle = await open(target, 'wx', 0o600).catch(away)
    try {
      await handle.writeFile(bytes)
    }
    finally {
      await handle.close()
    }
    return this.keep({ path: target, size: bytes.length, sha256: createHash('sha256').update(bytes).digest('hex') })
  }

  async #syncFolder(storageKey: string): Promise<void> {
    if (this.#root === null) return
    // A file is there after a power cut only when its folder says so.
    for (let folder = path.dirname(storageKey); ; folder = path.dirname(folder)) {
      await sync(path.join(this.#root, folder))
      if (folder === '.') return
    }
  }

  async discard(incoming: Incoming): Promise<void> {
    await rm(incoming.path, { force: true })
  }

  /** @throws DomainError `storage_away` */
  async read(storageKey: string): Promise<Readable> {
    return this.#disk.getStream(storageKey).catch(away)
  }

  /** Size in bytes, or null where there is no such file. */
  async size(storageKey: string): Promise<number | null> {
    if (!await this.#disk.exists(storageKey)) return null
    return (await this.#disk.getMetaData(storageKey)).contentLength
  }

  /** A kept file under a path of this machine, for programs that read files; null in a bucket. */
  localPath(storageKey: string): string | null {
    return this.#root === null ? null : path.join(this.#root, storageKey)
  }

  /**
   * Removes what nothing refers to and is older than `before`: what came in and was left, and kept files without a row.
   *
   * @param known tells which of some SHA-256 have a row
   * @returns how many were removed
   */
  async sweep(before: Date, known: (sha256: readonly string[]) => Promise<ReadonlySet<string>>): Promise<number> {
    let removed = 0
    for (const name of await readdir(this.#incoming).catch(() => [])) {
      const file = path.join(this.#incoming, name)
      const found = await stat(file).catch(() => null)
      if (!found?.isFile() || found.mtime >= before) continue
      await rm(file, { force: true })
      removed++
    }
    let token: string | undefined
    do {
      const page = await this.#disk.listAll('', { recursive: true, ...(token ? { paginationToken: token } : {}) }).catch(() => ({ objects: [], paginationToken: undefined }))
      const keys = [...page.objects].flatMap(one => one.isFile ? [one.key] : [])
      const rows = await known(keys.map(key => path.basename(key)))
      for (const key of keys.filter(key => !rows.has(path.basename(key)))) {
        if ((await this.#disk.getMetaData(key)).lastModified >= before) continue
        await this.#disk.delete(key)
        removed++
      }
      token = page.paginationToken
    } while (token)
    return removed
  }
}

/** A stream over a file that came in, for looking at its content. */
export const openIncoming = (incoming: Incoming): Readable => createReadStream(incoming.path)

function isDiskFull(error: unknown): boolean {
  return ['ENOSPC', 'EDQUOT', 'EROFS', 'EACCES'].includes((error as NodeJS.ErrnoException).code ?? '')
}

function away(error: unknown): never {
  throw error instanceof DomainError ? error : new DomainError('storage_away', { logLine: (error as Error).message, cause: error })
}
