import { randomBytes } from 'node:crypto'
import { deflateSync } from 'node:zlib'
import sharp from 'sharp'
import { beforeAll, describe, expect, test } from 'vitest'
import { useApp, type Client } from '../support/app'
import { makeScene, type Scene } from '../support/scene'

const app = useApp()
let scene: Scene
let entrant: Client
let other: Client
let uid: string

beforeAll(async () => {
  scene = await makeScene(Object.assign(app.registry, { at: app.clock.set, pass: app.clock.pass }))
  entrant = await app.signIn({ ...scene.cast.entrant })
  other = await app.signIn({ ...scene.cast.other })
  uid = await scene.entry('draft')
})

const picture = (width = 80, height = 60) => sharp({ create: { width, height, channels: 3, background: '#8a6a3a' } })
const send = (by: Client, file: Buffer, name: string, kind = 'photo_front', to = uid) => by.post(`/api/entries/${to}/documents`).field('kind', kind).attach('file', file, name)
const stored = async (id: string) => app.db('documents as d').join('files as f', 'f.id', 'd.file_id').where('d.uid', id).first('d.*', 'f.mime', 'f.storage_key', 'f.size')
const filesOf = async (entry: string) => Number((await app.db('documents as d').join('entries as e', 'e.id', 'd.entry_id').where('e.uid', entry).count({ n: '*' }))[0]!.n)
const bytesOf = async (id: string, view: string): Promise<Buffer> => (await entrant.get(`/api/documents/${id}/${view}`).buffer(true).parse((response, done) => {
  const chunks: Buffer[] = []
  response.on('data', (chunk: Buffer) => chunks.push(chunk))
  response.on('end', () => done(null, Buffer.concat(chunks)))
})).body as Buffer

/** A PNG of a few kilobytes that unpacks to `side` × `side` white pixels, by the layout of RFC 2083. */
function bomb(side: number): Buffer {
  const table = Array.from({ length: 256 }, (_, n) => Array.from({ length: 8 }).reduce<number>(value => (value & 1 ? 0xEDB88320 ^ (value >>> 1) : value >>> 1), n) >>> 0)
  const crc = (bytes: Buffer) => (bytes.reduce((value, byte) => table[(value ^ byte) & 255]! ^ (value >>> 8), 0xFFFFFFFF) ^ 0xFFFFFFFF) >>> 0
  const chunk = (type: string, data: Buffer) => {
    const body = Buffer.concat([Buffer.from(type), data])
    const [length, check] = [Buffer.alloc(4), Buffer.alloc(4)]
    length.writeUInt32BE(data.length)
    check.writeUInt32BE(crc(body))
    return Buffer.concat([length, body, check])
  }
  const head = Buffer.alloc(13)
  head.writeUInt32BE(side, 0)
  head.writeUInt32BE(side, 4)
  head.set([1, 0, 0, 0, 0], 8)
  return Buffer.concat([Buffer.from([0x89, 0x50, 0x4E, 0x47, 0x0D, 0x0A, 0x1A, 0x0A]), chunk('IHDR', head), chunk('IDAT', deflateSync(Buffer.alloc(1024), { level: 9 })), chunk('IEND', Buffer.alloc(0))])
}

/** The smallest PDF that opens (ISO 32000), with a script that would run when it is opened. */
function pdfWithScript(): Buffer {
  const objects = [
    '<< /Type /Catalog /Pages 2 0 R /OpenAction << /S /JavaScript /JS (app.alert\\(1\\)) >> >>',
    '<< /Type /Pages /Kids [3 0 R] /Count 1 >>',
    '<< /Type /Page /Parent 2 0 R /MediaBox [0 0 200 100] >>',
  ]
  let text = '%PDF-1.4\n'
  const offsets = objects.map((object, place) => {
    const at = text.length
    text += `${place + 1} 0 obj\n${object}\nendobj\n`
    return at
  })
  const start = text.length
  text += `xref\n0 ${objects.length + 1}\n0000000000 65535 f \n${offsets.map(at => `${String(at).padStart(10, '0')} 00000 n \n`).join('')}trailer << /Size ${objects.length + 1} /Root 1 0 R >>\nstartxref\n${start}\n%%EOF\n`
  return Buffer.from(text, 'latin1')
}

describe('what is refused, in words, and leaves nothing', () => {
  const script = Buffer.from('#!/bin/sh\nrm -rf /\n')
  const heic = Buffer.concat([Buffer.from([0, 0, 0, 24]), Buffer.from('ftypheic'), Buffer.alloc(4), Buffer.from('mif1heic'), Buffer.alloc(200)])
  test.each([
    ['a picture by its name, a script by its content', script, 'front.png', 415, 'file_kind', /JPEG, PNG, WebP or PDF/],
    ['a PNG signature before a script', Buffer.concat([Buffer.from([0x89, 0x50, 0x4E, 0x47, 0x0D, 0x0A, 0x1A, 0x0A]), script]), 'front.png', 415, 'file_kind', /JPEG, PNG, WebP or PDF/],
    ['a PNG that was cut off', bomb(10).subarray(0, 50), 'front.png', 422, 'file_unreadable', /damaged/],
    ['HEIC, with the way out', heic, 'front.heic', 415, 'file_kind', /HEIC/],
    ['SVG', Buffer.from('<svg xmlns="http://www.w3.org/2000/svg"><script>alert(1)</script></svg>'), 'front.svg', 415, 'file_kind', /SVG/],
    ['an empty file', Buffer.alloc(0), 'front.jpg', 422, 'file_unreadable', /empty/i],
    ['half a PNG of a few bytes that would unpack to 2,500 million pixels', bomb(50_000), 'front.png', 422, 'file_unreadable', /pixels/i],
  ] as const)('%s', async (_what, file, name, status, code, words) => {
    const before = await filesOf(uid)
    const answer = await send(entrant, file, name)
    expect(answer.status).toBe(status)
    expect(answer.headers['content-type']).toMatch(/^application\/problem\+json/)
    expect(answer.body.code).toBe(code)
    expect(answer.body.detail).toMatch(words)
    expect(await filesOf(uid)).toBe(before)
  })

  test('30 MB, where 25 MB are the most', async () => {
    const answer = await send(entrant, randomBytes(30 * 1024 * 1024), 'front.jpg').catch((error: { code?: string }) => error)
    // A client may still be sending when it is told; then the line is closed before it has read the answer.
    if ('status' in answer) expect(answer).toMatchObject({ status: 413, body: { code: 'file_too_large' } })
    else expect(['EPIPE', 'ECONNRESET']).toContain((answer as { code?: string }).code)
    expect((await entrant.get('/api/me')).status).toBe(200)
  })

  test('a PDF where a photograph is asked for; a kind that nobody knows; somebody else\'s entry', async () => {
    expect((await send(entrant, pdfWithScript(), 'front.pdf')).body).toMatchObject({ status: 415, code: 'file_kind' })
    expect((await send(entrant, await picture().jpeg().toBuffer(), 'front.jpg', 'fly')).body.errors).toMatchObject([{ path: 'kind' }])
    expect((await send(other, await picture().jpeg().toBuffer(), 'front.jpg')).status).toBe(404)
    expect((await app.visitor.post(`/api/entries/${uid}/documents`)).status).toBe(401)
  })
})

describe('what is kept', () => {
  test('a photograph stands upright and has lost place, camera and owner (EXIF, CIPA DC-008)', async () => {
    const file = await picture(80, 60).withExif({ IFD0: { Make: 'A camera', Copyright: 'Its owner' }, IFD3: { GPSLatitude: '51/1 30/1 0/1', GPSLatitudeRef: 'N' } }).withMetadata({ orientation: 6 }).jpeg().toBuffer()
    expect((await sharp(file).metadata()).exif).toBeTruthy()
    const answer = await send(entrant, file, 'front.jpg')
    expect(answer.status).toBe(201)
    const kept = await bytesOf(answer.body.id, 'picture')
    const { width, height, exif, xmp, iptc, orientation } = await sharp(kept).metadata()
    expect({ width, height, exif, xmp, iptc, orientation }).toEqual({ width: 60, height: 80, exif: undefined, xmp: undefined, iptc: undefined, orientation: undefined })
    expect(kept.includes('Its owner')).toBe(false)
    expect((await sharp(await bytesOf(answer.body.id, 'thumbnail')).metadata()).format).toBe('webp')
  })

  test('a PDF with a script is shown as pictures of its pages; the file itself is only a download', async () => {
    const answer = await send(entrant, pdfWithScript(), 'tag.pdf', 'tag_or_licence')
    expect(answer.status).toBe(201)
    const page = await entrant.get(`/api/documents/${answer.body.id}/picture?page=1`)
    expect(page.headers['content-type']).toBe('image/webp')
    const original = await entrant.get(`/api/documents/${answer.body.id}/original`)
    expect(original.headers['content-disposition']).toMatch(/^attachment/)
    expect(original.headers['x-content-type-options']).toBe('nosniff')
    expect((await entrant.get(`/api/documents/${answer.body.id}/picture?page=2`)).status).toBe(404)
  })

  test.each([
    ['../../etc/passwd.jpg', 'passwd.jpg'], ['C:\\tmp\\front.png', 'front.jpg'], ['a\u202Egpj.exe', 'agpj.jpg'], ['<b>|y?.jpg', '_b__y_.jpg'], ['.jpg', 'file.jpg'], [`${'n'.repeat(300)}.jpg`, `${'n'.repeat(120)}.jpg`],
  ])('a name like %j becomes %j', async (given, name) => {
    const answer = await send(entrant, await picture().jpeg().toBuffer(), given, 'other')
    expect(answer.status).toBe(201)
    expect((await stored(answer.body.id))!.name).toBe(name)
    expect((await stored(answer.body.id))!.storage_key).not.toMatch(/\.\.|passwd|\\/)
    await entrant.delete(`/api/documents/${answer.body.id}`)
  })

  test('several at once, and the same file twice is stored once', async () => {
    const fresh = await scene.entry('draft')
    const file = await picture(90, 70).jpeg().toBuffer()
    const answers = await Promise.all(['photo_front', 'photo_left', 'photo_right', 'photo_field'].map(kind => send(entrant, file, `${kind}.jpg`, kind, fresh)))
    expect(answers.map(answer => answer.status)).toEqual([201, 201, 201, 201])
    const rows = await Promise.all(answers.map(answer => stored(answer.body.id)))
    expect(new Set(rows.map(row => row!.file_id)).size).toBe(1)
    expect((await entrant.get(`/api/entries/${fresh}/documents`)).body.items).toHaveLength(4)
  })

  test('nobody else reads it; its entrant takes it away, until a decision rests on it', async () => {
    const fresh = await scene.entry('certified')
    const { body: { id } } = await send(entrant, await picture().jpeg().toBuffer(), 'front.jpg', 'photo_front', fresh)
    for (const view of ['thumbnail', 'picture', 'original']) {
      expect((await other.get(`/api/documents/${id}/${view}`)).status).toBe(404)
      expect((await app.visitor.get(`/api/documents/${id}/${view}`)).status).toBe(401)
    }
    expect((await other.delete(`/api/documents/${id}`)).status).toBe(404)
    await scene.papers(fresh, ['photo_left', 'photo_right', 'photo_field', 'tag_or_licence'])
    await scene.statement(fresh)
    await scene.pay(fresh)
    await scene.move(scene.cast.entrant, fresh, { transition: 'submit' })
    expect((await entrant.delete(`/api/documents/${id}`)).body).toMatchObject({ status: 409, code: 'file_settled' })
    const open = await scene.entry('draft')
    const { body: { id: loose } } = await send(entrant, await picture().jpeg().toBuffer(), 'front.jpg', 'photo_front', open)
    expect((await entrant.delete(`/api/documents/${loose}`)).status).toBeLessThan(300)
    expect((await entrant.get(`/api/documents/${loose}/picture`)).status).toBe(404)
  })
})
