import { createHash, randomUUID } from 'node:crypto'
import { createWriteStream } from 'node:fs'
import { mkdir, open, readdir, readFile, rm, stat, utimes, writeFile } from 'node:fs/promises'
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

/** How long a bucket may keep silent before it is taken for away, in ms; it is asked twice. */
const PATIENCE_MS = 8_000

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

  constructor(config: HartrollConfig, { patienceMs = PATIENCE_MS } = {}) {
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
          maxAttempts: 2,
          requestHandler: { connectionTimeout: patienceMs, socketTimeout: patienceMs },
          // Servers other than Amazon's know no bodies in chunks with a sum behind them; we send SHA-256 ourselves.
          requestChecksumCalculation: 'WHEN_REQUIRED',
          responseChecksumValidation: 'WHEN_REQUIRED',
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
      if (this.#root === null) await this.#send(incoming, storageKey)
      else if (!await this.#refresh(this.#root, storageKey)) {
        await sync(incoming.path)
        await this.#disk.moveFromFs(incoming.path, storageKey)
        await this.#syncFolder(this.#root, storageKey)
      }
      await rm(incoming.path, { force: true })
    }
    catch (error) {
      throw away(error)
    }
    return { sha256: incoming.sha256, size: incoming.size, storageKey }
  }

  /**
   * Sends a file to the bucket, which compares it with our hash; again even where it is there already, since only that
   * makes it young. It is sent from memory, so that a try that failed can be repeated.
   */
  async #send(incoming: Incoming, storageKey: string): Promise<void> {
    await this.#disk.put(storageKey, await readFile(incoming.path), { ChecksumSHA256: Buffer.from(incoming.sha256, 'hex').toString('base64') })
  }

  /**
   * Makes a file that is there already as young as a new one, so that the sweeper leaves it until its row is written.
   *
   * @returns false where it is not there
   */
  async #refresh(root: string, storageKey: string): Promise<boolean> {
    const now = new Date()
    return utimes(path.join(root, storageKey), now, now).then(() => true, (error: NodeJS.ErrnoException) => {
      if (error.code === 'ENOENT') return false
      throw error
    })
  }

  /** Keeps bytes that were made here, such as a picture that was turned upright; what could not be kept leaves nothing. */
  async keepBytes(bytes: Buffer): Promise<Kept> {
    await mkdir(this.#incoming, { recursive: true }).catch(away)
    const incoming = { path: path.join(this.#incoming, randomUUID()), size: bytes.length, sha256: createHash('sha256').update(bytes).digest('hex') }
    try {
      await writeFile(incoming.path, bytes, { flag: 'wx', mode: 0o600 }).catch(away)
      return await this.keep(incoming)
    }
    finally {
      await this.discard(incoming)
    }
  }

  async #syncFolder(root: string, storageKey: string): Promise<void> {
    // A file is there after a power cut only when its folder says so.
    for (let folder = path.dirname(storageKey); ; folder = path.dirname(folder)) {
      await sync(path.join(root, folder))
      if (folder === '.') return
    }
  }

  async discard(incoming: Incoming): Promise<void> {
    await rm(incoming.path, { force: true })
  }

  /**
   * A stream over a kept file, open before it is given: what cannot be read is refused here, not in mid-answer.
   *
   * @throws DomainError `storage_away`, also for a file that is not there although it should be
   */
  async read(storageKey: string): Promise<Readable> {
    if (this.#root === null) return this.#disk.getStream(storageKey).catch(away)
    return (await open(path.join(this.#root, storageKey), 'r').catch(away)).createReadStream()
  }

  /**
   * Size in bytes, or null where there is no such file.
   *
   * @throws DomainError `storage_away`
   */
  async size(storageKey: string): Promise<number | null> {
    try {
      return await this.#disk.exists(storageKey) ? (await this.#disk.getMetaData(storageKey)).contentLength : null
    }
    catch (error) {
      throw away(error)
    }
  }

  /**
   * Removes what nothing refers to and is older than `before`: what came in and was left, and kept files without a row.
   *
   * @param known tells which of some SHA-256 have a row
   * @returns how many were removed
   * @throws DomainError `storage_away`
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
    // Nothing was kept yet: the folder comes with the first file.
    if (this.#root !== null && await stat(this.#root).catch(() => null) === null) return removed
    try {
      return removed + await this.#sweepKept(before, known)
    }
    catch (error) {
      throw away(error)
    }
  }

  async #sweepKept(before: Date, known: (sha256: readonly string[]) => Promise<ReadonlySet<string>>): Promise<number> {
    let removed = 0
    let token: string | undefined
    do {
      const page = await this.#disk.listAll('', { recursive: true, ...(token ? { paginationToken: token } : {}) })
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

function isDiskFull(error: unknown): boolean {
  return ['ENOSPC', 'EDQUOT', 'EROFS', 'EACCES'].includes((error as NodeJS.ErrnoException).code ?? '')
}

/** What went wrong for the caller, and for the log with the reason beneath: the disk's own errors name only the key. */
function away(error: unknown): never {
  if (error instanceof DomainError) throw error
  const { message, cause } = error as Error
  throw new DomainError('storage_away', { logLine: cause instanceof Error ? `${message}: ${cause.message || cause.name}` : message, cause: error })
}
