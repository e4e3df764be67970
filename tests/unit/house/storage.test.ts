import { createHash, randomBytes } from 'node:crypto'
import { existsSync, mkdtempSync, readdirSync, rmSync, utimesSync } from 'node:fs'
import os from 'node:os'
import path from 'node:path'
import { Readable } from 'node:stream'
import { afterAll, afterEach, beforeAll, beforeEach, describe, expect, it } from 'vitest'
import { readConfig } from '../../../server/config'
import { FileStorage, storageKeyOf, type Kept } from '../../../server/storage/files'
import { openBucket, type TestBucket } from '../../support/bucket'

const DAY = 86_400_000
const PATIENCE_MS = 300
const base = { DATABASE_URL: 'mysql://u:p@127.0.0.1:3306/h', HARTROLL_SECRET: 'x'.repeat(32) }
const nobodyKnows = () => Promise.resolve(new Set<string>())

let folder: string
let bucket: TestBucket
let storage: FileStorage
beforeAll(async () => { bucket = await openBucket({ pageSize: 2 }) })
afterAll(() => bucket.close())
beforeEach(() => { folder = mkdtempSync(path.join(os.tmpdir(), 'hartroll-storage-')) })
afterEach(() => {
  bucket.mend()
  bucket.objects.clear()
  bucket.requests.length = 0
  rmSync(folder, { recursive: true, force: true })
})

const open = (env: Record<string, string> = {}) => new FileStorage(readConfig({ ...base, HARTROLL_DATA: folder, ...env }), { patienceMs: PATIENCE_MS })
const take = async (bytes: Buffer) => storage.keep(await storage.receive(Readable.from([bytes]), 1_000_000))
const incoming = () => readdirSync(path.join(folder, 'files', 'incoming'))
const bytesOf = async (kept: Kept | string) => Buffer.concat(await (await storage.read(typeof kept === 'string' ? kept : kept.storageKey)).toArray() as Buffer[])
/** What a call was refused with: its code, and what the log is told. */
const refusal = async (call: Promise<unknown>): Promise<{ code: string, logLine: string }> => call.then(() => { throw new Error('it was not refused') }, (error: { code: string, logLine: string }) => error)

describe.each(['a folder', 'a bucket'] as const)('files in %s', (place) => {
  beforeEach(() => { storage = open(place === 'a bucket' ? bucket.env : {}) })
  const age = (kept: Kept, at: Date) => {
    if (place === 'a bucket') bucket.objects.get(kept.storageKey)!.at = at
    else utimesSync(path.join(folder, 'files', 'kept', kept.storageKey), at, at)
  }

  it('lie under the hash of what they are (SHA-256, FIPS 180-4, by Node), and come back as they were', async () => {
    const bytes = randomBytes(70_000)
    const kept = await take(bytes)
    const sha256 = createHash('sha256').update(bytes).digest('hex')
    expect(kept).toEqual({ sha256, size: 70_000, storageKey: storageKeyOf(sha256) })
    expect((await bytesOf(kept)).equals(bytes)).toBe(true)
    expect(await storage.size(kept.storageKey)).toBe(70_000)
    expect(incoming()).toEqual([])
  })

  it('of nothing are files too', async () => {
    const kept = await take(Buffer.alloc(0))
    expect(await storage.size(kept.storageKey)).toBe(0)
    expect(await bytesOf(kept)).toHaveLength(0)
  })

  it('that are too long leave nothing', async () => {
    expect(await refusal(storage.receive(Readable.from([Buffer.alloc(600), Buffer.alloc(600)]), 1_000))).toMatchObject({ code: 'file_too_large' })
    expect(incoming()).toEqual([])
  })

  it('that are not there have no size, and reading them is refused before anything is sent', async () => {
    const key = storageKeyOf('f'.repeat(64))
    expect(await storage.size(key)).toBeNull()
    expect(await refusal(storage.read(key))).toMatchObject({ code: 'storage_away' })
  })

  it('are swept when no row speaks of them and they are old, over all pages of the listing', async () => {
    const kept: Kept[] = []
    for (let n = 0; n < 5; n++) kept.push(await take(Buffer.from(`paper ${n}`)))
    for (const one of kept.slice(0, 4)) age(one, new Date(Date.now() - 2 * DAY))
    const known = new Set([kept[0]!.sha256])
    const removed = await storage.sweep(new Date(Date.now() - DAY), shas => Promise.resolve(new Set(shas.filter(sha => known.has(sha)))))
    expect(removed).toBe(3)
    expect(await Promise.all(kept.map(one => storage.size(one.storageKey)))).toEqual([7, null, null, null, 7])
  })

  it('that come again are young again, and stored once', async () => {
    const kept = await take(Buffer.from('the same paper'))
    age(kept, new Date(Date.now() - 2 * DAY))
    expect(await take(Buffer.from('the same paper'))).toEqual(kept)
    expect(await storage.sweep(new Date(Date.now() - DAY), nobodyKnows)).toBe(0)
    expect(await storage.size(kept.storageKey)).toBe(14)
    expect(incoming()).toEqual([])
  })

  it('can come at the same moment', async () => {
    const same = await Promise.all(Array.from({ length: 5 }, () => take(Buffer.from('five at once'))))
    expect(new Set(same.map(one => one.storageKey)).size).toBe(1)
    expect((await bytesOf(same[0]!)).toString()).toBe('five at once')
  })

  it('are swept from an empty place without a fault', async () => {
    expect(await storage.sweep(new Date(), nobodyKnows)).toBe(0)
  })
})

describe('a bucket', () => {
  beforeEach(() => { storage = open(bucket.env) })

  it('checks what it was sent by the hash that we know, and is asked in path style', async () => {
    const kept = await take(Buffer.from('a paper'))
    expect([...bucket.objects.keys()]).toEqual([kept.storageKey])
    const wrong = { ...await storage.receive(Readable.from([Buffer.from('one thing')]), 100), sha256: createHash('sha256').update('another').digest('hex') }
    expect(await refusal(storage.keep(wrong))).toMatchObject({ code: 'storage_away', logLine: expect.stringContaining('checksum') })
    expect(bucket.objects.size).toBe(1)
  })

  it('that is busy for a moment is asked again, for writing as for reading', async () => {
    bucket.fail({ status: 503, code: 'SlowDown' })
    const kept = await take(Buffer.from('a paper'))
    expect(bucket.requests).toEqual([`PUT ${kept.storageKey}`, `PUT ${kept.storageKey}`])
    bucket.fail({ status: 500, code: 'InternalError' })
    expect((await bytesOf(kept)).toString()).toBe('a paper')
  })

  it('that is away is said to be away by every call, and nothing is kept by half', async () => {
    const kept = await take(Buffer.from('a paper'))
    bucket.fail({ status: 503, code: 'ServiceUnavailable' }, true)
    const held = await storage.receive(Readable.from([Buffer.from('another')]), 100)
    for (const call of [() => storage.keep(held), () => storage.read(kept.storageKey), () => storage.size(kept.storageKey), () => storage.sweep(new Date(Date.now() - DAY), nobodyKnows)]) {
      // The log is told why; an answer to HEAD has no body that could say it in words.
      expect(await refusal(call())).toMatchObject({ code: 'storage_away', logLine: expect.stringMatching(/As wished|Unknown/) })
    }
    bucket.mend()
    // What came in is still here, so that the same call goes through once the bucket is back.
    expect((await storage.keep(held)).size).toBe(7)
    expect(bucket.objects.size).toBe(2)
  })

  it.each([
    ['does not answer', () => bucket.fail('silent', true), {}],
    ['is not there', () => {}, { DOCUMENTS_S3_ENDPOINT: 'http://127.0.0.1:1' }],
    ['knows another secret', () => {}, { DOCUMENTS_S3_SECRET_ACCESS_KEY: 'another' }],
    ['has another name', () => {}, { DOCUMENTS_S3_BUCKET: 'another' }],
  ] as const)('that %s keeps nobody waiting', async (_what, prepare, env) => {
    storage = open({ ...bucket.env, ...env })
    prepare()
    const begun = Date.now()
    expect(await refusal(take(Buffer.from('a paper')))).toMatchObject({ code: 'storage_away' })
    expect(Date.now() - begun).toBeLessThan(20 * PATIENCE_MS)
    expect(bucket.objects.size).toBe(0)
  })

  it('that breaks off in the middle of a file breaks the reading, and does not end it as if all were there', async () => {
    const kept = await take(randomBytes(200_000))
    bucket.fail('half')
    await expect(bytesOf(kept)).rejects.toThrow(/aborted|ECONNRESET|terminated/i)
  })

  it('leaves nothing on this machine', async () => {
    await take(Buffer.from('a paper'))
    expect(existsSync(path.join(folder, 'files', 'kept'))).toBe(false)
    expect(incoming()).toEqual([])
  })
})
