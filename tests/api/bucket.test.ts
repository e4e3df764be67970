import { randomBytes } from 'node:crypto'
import { readdirSync } from 'node:fs'
import { get } from 'node:http'
import path from 'node:path'
import sharp from 'sharp'
import { afterAll, afterEach, beforeAll, beforeEach, expect, test } from 'vitest'
import { sweepFiles } from '../../server/services/documents/sweep'
import { startApp, type App, type Client } from '../support/app'
import { openBucket, type TestBucket } from '../support/bucket'
import { makeScene, type Scene } from '../support/scene'

/** The built server with its papers in a bucket, as in an installation of several machines. */
let bucket: TestBucket
let app: App
let stop: () => Promise<void>
let scene: Scene
let entrant: Client
let uid: string

beforeAll(async () => {
  bucket = await openBucket()
  ;({ app, stop } = await startApp({ env: bucket.env }))
  scene = await makeScene(Object.assign(app.registry, { at: app.clock.set, pass: app.clock.pass }))
  entrant = await app.signIn({ ...scene.cast.entrant })
})
afterAll(async () => {
  await stop?.()
  await bucket.close()
})
beforeEach(async () => { uid = await scene.entry('draft') })
afterEach(() => bucket.mend())

// Grains that no two pictures share, so that each is a file of its own.
const picture = (side = 80) => sharp(randomBytes(side * side * 3), { raw: { width: side, height: side, channels: 3 } }).jpeg({ quality: 95 }).toBuffer()
const send = (file: Buffer, kind = 'photo_front', replaces?: string) => {
  const request = entrant.post(`/api/entries/${uid}/documents`).field('kind', kind)
  return (replaces ? request.field('replaces', replaces) : request).attach('file', file, 'front.jpg')
}
const papers = async () => (await entrant.get(`/api/entries/${uid}/documents`)).body.items as { id: string }[]
const incoming = () => readdirSync(path.join(app.env.HARTROLL_DATA!, 'files', 'incoming'))
const keysOf = async (id: string) => {
  const row = await app.db('documents as d').join('files as f', 'f.id', 'd.file_id').join('files as t', 't.id', 'd.thumb_file_id').where('d.uid', id).first('f.storage_key as file', 't.storage_key as thumbnail')
  return [row!.file, row!.thumbnail]
}

test('a paper goes into the bucket with its thumbnail, is read from there, and leaves nothing on the machine', async () => {
  const answer = await send(await picture())
  expect(answer.status).toBe(201)
  const [file, thumbnail] = await keysOf(answer.body.id)
  expect([...bucket.objects.keys()]).toEqual(expect.arrayContaining([file, thumbnail]))
  const read = await entrant.get(`/api/documents/${answer.body.id}/picture`)
  expect(read.headers['content-type']).toBe('image/jpeg')
  expect((read.body as Buffer).equals(bucket.objects.get(file)!.bytes)).toBe(true)
  expect((await entrant.get(`/api/documents/${answer.body.id}/picture`).set('if-none-match', read.headers.etag!)).status).toBe(304)
  expect(incoming()).toEqual([])
})

test('while the bucket is away: 503 in words, no row, nothing taken away; the same file goes through later', async () => {
  const standing = (await send(await picture())).body.id
  const file = await picture()
  bucket.fail({ status: 503, code: 'ServiceUnavailable' }, true)
  for (const call of [() => send(file), () => send(file, 'photo_front', standing), () => entrant.get(`/api/documents/${standing}/picture`)]) {
    const answer = await call()
    expect(answer.status).toBe(503)
    expect(answer.headers['content-type']).toMatch(/^application\/problem\+json/)
    expect(answer.body).toMatchObject({ code: 'storage_away', detail: expect.stringMatching(/try again/) })
    expect(answer.headers).not.toHaveProperty('etag')
    expect(JSON.stringify(answer.body)).not.toMatch(/bucket|127\.0\.0\.1|As wished/)
  }
  expect(await papers()).toMatchObject([{ id: standing }])
  expect(incoming()).toEqual([])
  // Whoever keeps the registry reads why.
  expect(app.log()).toMatch(/storage_away[^\n]*As wished/)
  bucket.mend()
  expect((await send(file, 'photo_front', standing)).status).toBe(201)
  expect(await papers()).toHaveLength(1)
})

test('a file that breaks off in the middle breaks the answer too, and the server lives', async () => {
  const { id } = (await send(await picture(600))).body
  bucket.fail('half')
  await expect(entrant.get(`/api/documents/${id}/picture`)).rejects.toThrow(/aborted|socket|reset/i)
  expect((await entrant.get(`/api/documents/${id}/picture`)).status).toBe(200)
})

test('readers who leave in the middle hold no line to the bucket', async () => {
  const { id } = (await send(await picture(3000))).body
  for (let n = 0; n < 3; n++) {
    await new Promise<void>((resolve, reject) => {
      get(`${app.url}/api/documents/${id}/picture`, { headers: { cookie: entrant.cookie }, agent: false }, (response) => {
        response.once('data', () => response.destroy())
        response.once('close', resolve)
      }).once('error', reject)
    })
  }
  // Sooner than the bucket's silence alone would end them.
  await expect.poll(() => bucket.answering(), { timeout: 5_000 }).toBe(0)
})

test('what no row speaks of is swept from the bucket after a day, what stands stays', async () => {
  const { id } = (await send(await picture())).body
  const kept = await keysOf(id)
  const left = await app.registry.storage.keepBytes(randomBytes(100))
  const fresh = await app.registry.storage.keepBytes(randomBytes(100))
  for (const key of [...kept, left.storageKey]) bucket.objects.get(key)!.at = new Date(Date.now() - 2 * 86_400_000)
  await sweepFiles(app.registry)
  expect([...kept, left.storageKey, fresh.storageKey].map(key => bucket.objects.has(key))).toEqual([true, true, false, true])
})
