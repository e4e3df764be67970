import { parse } from 'csv-parse/sync'
import { beforeAll, describe, expect, it } from 'vitest'
import { seedDemo } from '../../seeds/demo'
import { markRecord } from '../../server/services/listing/publish'
import { facetsAnswer, recordAnswer, recordsAnswer, type RecordsAnswer } from '../../shared/schemas/records'
import { measurersAnswer } from '../../shared/schemas/measurers'
import { useApp } from '../support/app'

const app = useApp()
beforeAll(() => seedDemo(app.db, { now: app.clock.now(), scale: 0.04 }))

const get = (path: string) => app.visitor.get(path)
const listOf = async (query: string): Promise<RecordsAnswer> => {
  const answer = await get(`/api/records?${query}`)
  expect(answer.status, JSON.stringify(answer.body)).toBe(200)
  return recordsAnswer.parse(answer.body)
}

describe('GET /api/records', () => {
  it('answers as the contract says', async () => {
    const { body, headers } = await get('/api/records?category=mule-deer-typical&limit=5')
    expect(recordsAnswer.strict().parse(body).items).toHaveLength(5)
    expect(Object.keys(body.items[0])).toEqual(expect.arrayContaining([
      'recordNo', 'rank', 'category', 'species', 'net', 'gross', 'hunter', 'district', 'method', 'origin', 'takenOn', 'acceptedOn', 'status', 'source',
    ]))
    expect(headers['cache-control']).toMatch(/^public/)
    expect(body.items.map((item: { rank: number }) => item.rank)).toEqual([...body.items.map((item: { rank: number }) => item.rank)].sort((a, b) => a - b))
  })

  it('begins with the newest where the nets of several classes would not compare, and with the highest net in a class', async () => {
    expect((await listOf('')).sort).toBe('-acceptedOn')
    expect((await listOf('species=elk')).sort).toBe('-net')
  })

  it('tells neither day nor place, address, contact or tag of anybody', async () => {
    const { body } = await get('/api/records?limit=200')
    for (const item of body.items) expect(String(item.takenOn)).toMatch(/^(\d{4}|\d{4}-\d{2}|null)$/)
    const one = await get(`/api/records/${body.items[0].recordNo}`)
    const people = await app.db('entry_people').whereNotNull('address').limit(200).pluck('address') as string[]
    for (const address of people) expect(one.text + JSON.stringify(body)).not.toContain(address)
  })

  it.each([
    ['limit=0', 'limit'], ['limit=201', 'limit'], ['limit=x', 'limit'], ['sort=name', 'sort'], ['category=unicorn', 'category'], ['district=%27', 'district'],
    ['method=bazooka', 'method'], ['from=19', 'from'], ['from=2020&to=2010', 'to'], ['minNet=-1', 'minNet'], ['sex=both', 'sex'],
  ])('refuses %s and names the field', async (query, field) => {
    const { status, body, headers } = await get(`/api/records?${query}`)
    expect(status).toBe(422)
    expect(headers['content-type']).toMatch(/^application\/problem\+json/)
    expect(body.errors[0].path).toBe(field)
    expect(body.errors[0].message).not.toBe('')
  })

  it('takes the empty fields of a form for nothing chosen', async () => {
    expect((await listOf('species=&category=&district=&method=&from=&to=&sex=&minNet=&q=')).total).toBe((await listOf('')).total)
  })

  it('refuses a cursor that was changed, or that belongs to another sort, other filters or nobody', async () => {
    const { nextCursor } = await listOf('category=elk-typical&limit=2')
    const turned = `${nextCursor!.slice(0, -2)}${nextCursor!.endsWith('A') ? 'B' : 'A'}${nextCursor!.at(-1)}`
    for (const query of [`category=elk-typical&cursor=${turned}`, `category=elk-typical&sort=gross&cursor=${nextCursor}`, `category=moose&cursor=${nextCursor}`, 'cursor=eyJpZCI6MX0', 'cursor=%00']) {
      const { status, body } = await get(`/api/records?${query}`)
      expect(status).toBe(422)
      expect(body.code).toBe('cursor_invalid')
    }
    expect((await get(`/api/records?category=elk-typical&cursor=${nextCursor}`)).status).toBe(200)
  })

  it('keeps the day of taking out of the cursor', async () => {
    const { nextCursor } = await listOf('category=elk-typical&limit=2')
    expect(Buffer.from(nextCursor!, 'base64url').toString('latin1')).not.toMatch(/\d{4}-\d{2}-\d{2}/)
  })

  it('answers 304 to a caller who holds the page, until the lists change', async () => {
    const path = '/api/records?category=moose'
    const { headers: { etag } } = await get(path)
    expect((await get(path).set('If-None-Match', etag!)).status).toBe(304)
    expect((await get('/api/records?category=bison').set('If-None-Match', etag!)).status).toBe(200)
    const { entry_id: entryId } = (await app.db('records').where({ status: 'accepted' }).first('entry_id'))!
    await app.db.transaction(trx => markRecord(trx, entryId, 'challenged'))
    expect((await get(path).set('If-None-Match', etag!)).status).toBe(200)
    await app.db.transaction(trx => markRecord(trx, entryId, 'accepted'))
  })

  it('finds the beginnings of words whatever their marks and case, and numbers, and nothing by SQL or HTML', async () => {
    const marked = (await app.db('records').where('hunter_shown', 'like', '%á%').whereRaw('hunter_shown REGEXP \'Márta\'').first('hunter_shown', 'record_no'))
    if (marked) expect((await listOf('q=MARTA&limit=200')).items.map(item => item.recordNo)).toContain(marked.record_no)
    const { items: [one] } = await listOf('limit=1')
    expect((await listOf(`q=${one!.recordNo}`)).items.map(item => item.recordNo)).toContain(one!.recordNo)
    const all = (await listOf('')).total
    for (const q of ['\' OR 1=1 --', '"; DROP TABLE records; --', '<script>alert(1)</script>', '%', '_', '\\', '((((']) {
      const found = await listOf(`q=${encodeURIComponent(q)}`)
      expect(found.total, q).not.toBe(all)
    }
    expect((await listOf('')).total).toBe(all)
  })

  it('keeps the rank of the list under other filters, and takes it in the list of a district or a method', async () => {
    const region = new Map((await listOf('category=whitetail-typical&limit=200')).items.map(item => [item.recordNo, item.rank]))
    const { items } = await listOf('category=whitetail-typical&from=1990&limit=200')
    for (const item of items) expect(item.rank).toBe(region.get(item.recordNo))
    expect(items.map(item => item.position)).toEqual(items.map((_, place) => place + 1))
    const district = (await get('/api/records/facets?category=whitetail-typical')).body.districts.find((one: { count: number }) => one.count > 1).code
    const there = (await listOf(`category=whitetail-typical&district=${district}`)).items
    expect(there[0]!.rank).toBe(1)
    expect(there[0]!.position).toBeNull()
  })

  it('pages forth and back over every record once, and totals agree with what is there', async () => {
    const seen: number[] = []
    let page = await listOf('species=elk&limit=7')
    const { total } = page
    for (;;) {
      seen.push(...page.items.map(item => item.recordNo))
      if (!page.nextCursor) break
      page = await listOf(`species=elk&limit=7&cursor=${page.nextCursor}`)
    }
    expect(new Set(seen).size).toBe(seen.length)
    expect(seen).toHaveLength(total!)
    const last = page
    const before = await listOf(`species=elk&limit=7&cursor=${last.prevCursor}`)
    expect(before.items.map(item => item.recordNo)).toEqual(seen.slice(-last.items.length - 7, -last.items.length))
  })
})

describe('GET /api/records/:recordNo', () => {
  it('shows the sheet line by line with the net of the list, the two ranks and what has happened', async () => {
    const { record_no: no } = (await app.db('records').where({ source: 'certified', status: 'accepted' }).first('record_no'))!
    const { body } = await get(`/api/records/${no}`)
    const record = recordAnswer.parse(body)
    expect(record.sheet!.totals.net).toBe(record.net)
    expect(record.sheet!.lines.length).toBeGreaterThan(1)
    expect(record.region.rank).toBeLessThanOrEqual(record.region.total)
    expect(record.inDistrict.total).toBeLessThanOrEqual(record.region.total)
    expect(record.neighbours.map(one => one.recordNo)).toContain(no)
    expect(record.history.map(one => one.what)).toContain('accept')
  })

  it('says that a record taken over has no sheet where it has none', async () => {
    const row = await app.db('records').whereNull('sheet_id').where({ status: 'accepted' }).first('record_no')
    expect((await get(`/api/records/${row!.record_no}`)).body.sheet).toBeNull()
  })

  it('knows nothing of a number that is none, or that no record in the lists has', async () => {
    for (const no of ['0', 'x', '99999999999', '-1', '1e3x']) expect([404, 422]).toContain((await get(`/api/records/${no}`)).status)
    expect((await get('/api/records/4000000000')).status).toBe(404)
  })

  it('no longer shows a record that was struck', async () => {
    const row = (await app.db('records').where({ status: 'accepted' }).orderBy('id', 'desc').first('id', 'record_no', 'status'))!
    await app.db('records').where({ id: row.id }).update({ status: 'struck' })
    expect((await get(`/api/records/${row.record_no}`)).status).toBe(404)
    await app.db('records').where({ id: row.id }).update({ status: row.status })
  })
})

describe('GET /api/records.csv', () => {
  it('is the same selection, whole, as RFC 4180 has it', async () => {
    const { text, headers } = await get('/api/records.csv?species=mule-deer')
    expect(headers['content-type']).toMatch(/^text\/csv/)
    expect(text.endsWith('\r\n')).toBe(true)
    const rows: Record<string, string>[] = parse(text, { columns: true, record_delimiter: '\r\n' })
    const list = await listOf('species=mule-deer&limit=200')
    expect(rows).toHaveLength(list.total!)
    expect(rows.slice(0, 200).map(row => Number(row.recordNo))).toEqual(list.items.map(item => item.recordNo))
  })

  it('has no cell that a spreadsheet would run as a formula', async () => {
    const row = (await app.db('records').where({ status: 'accepted' }).first('id', 'hunter_shown', 'record_no'))!
    for (const name of ['=1+1', '+1', '-1', '@SUM(A1)', 'a "quoted", name\r\nover two lines']) {
      await app.db('records').where({ id: row.id }).update({ hunter_shown: name })
      const rows: Record<string, string>[] = parse((await get('/api/records.csv')).text, { columns: true, record_delimiter: '\r\n' })
      const cell = rows.find(one => Number(one.recordNo) === row.record_no)!.hunter!
      expect(cell).toBe(/^[=+\-@]/.test(name) ? `'${name}` : name)
    }
    await app.db('records').where({ id: row.id }).update({ hunter_shown: row.hunter_shown })
  })
})

describe('counts and directory', () => {
  it('counts what the lists hold', async () => {
    const facets = facetsAnswer.parse((await get('/api/records/facets')).body)
    const total = (await listOf('')).total
    for (const counts of [facets.categories, facets.districts]) expect(counts.reduce((sum, one) => sum + one.count, 0)).toBe(total)
    for (const one of facets.categories.filter(category => category.count > 0)) {
      const { items: [best] } = await listOf(`category=${one.category}&limit=1`)
      expect([one.best, one.bestRecordNo]).toEqual([best!.net, best!.recordNo])
    }
  })

  it('lists official measurers by district and species, with no address or contact', async () => {
    const { body, text } = await get('/api/measurers')
    const { items } = measurersAnswer.strict().parse(body)
    expect(items.length).toBeGreaterThan(5)
    for (const { uid, email, address, phone } of await app.db('users').whereIn('uid', items.map(one => one.id)).select('uid', 'email', 'address', 'phone')) {
      for (const secret of [email, address, phone]) if (secret) expect(text, uid).not.toContain(secret)
    }
    const { district } = items.find(one => one.district)!
    expect((await get(`/api/measurers?district=${district!.code}`)).body.items.every((one: { district: { code: string } }) => one.district.code === district!.code)).toBe(true)
    expect((await get('/api/measurers?species=unicorn')).status).toBe(422)
  })

  it('no longer lists a measurer whose accreditation was suspended or ran out', async () => {
    const { items: [one] } = (await get('/api/measurers')).body
    await app.db('accreditations').where({ number: one.number }).update({ suspended_at: '2026-03-01 00:00:00.000' })
    expect((await get('/api/measurers')).body.items.map((item: { number: string }) => item.number)).not.toContain(one.number)
  })
})

describe('pages of the lists', () => {
  it('are kept by caches for a moment, carry an ETag, read no session and set no cookie', async () => {
    for (const path of ['/', '/records', '/records?category=moose', '/measurers']) {
      const { status, headers } = await get(path).set('Accept', 'text/html')
      expect(status, path).toBe(200)
      expect(headers['cache-control'], path).toBe('public, max-age=5')
      expect(headers['set-cookie'], path).toBeUndefined()
      expect((await get(path).set('If-None-Match', headers.etag!)).status, path).toBe(304)
    }
  })

  it('are made once for many readers, are the same for whoever is signed in, and change with the lists at once', async () => {
    const path = '/records?category=moose&sort=gross'
    const first = await get(path)
    const again = await get(path)
    const reader = await app.signInAs('registrar')
    const signedIn = await reader.get(path)
    expect([again.text, signedIn.text]).toEqual([first.text, first.text])
    for (const name of ['content-security-policy', 'content-type', 'cache-control', 'etag', 'x-content-type-options']) expect(again.headers[name], name).toBe(first.headers[name])
    const { entry_id: entryId } = (await app.db('records as r').join('classes as c', 'c.id', 'r.class_id').where({ 'r.status': 'accepted', 'c.code': 'moose' }).orderBy('r.gross16').first('r.entry_id'))!
    await app.db.transaction(trx => markRecord(trx, entryId, 'challenged'))
    expect((await get(path)).text).not.toBe(first.text)
    await app.db.transaction(trx => markRecord(trx, entryId, 'accepted'))
  })

  it('are not kept when they say that something is wrong', async () => {
    for (const [path, expected] of [['/records/4000000000', 404], ['/records?cursor=x', 422], ['/records?category=unicorn', 422]] as const) {
      const { status, headers } = await get(path).set('Accept', 'text/html')
      expect(status, path).toBe(expected)
      expect(headers['cache-control'], path).toBe('no-store')
    }
  })
})

describe('the drawing of a record', () => {
  it('is an SVG by itself, in words too, and kept by its tag; there is none without a sheet', async () => {
    const { record_no: withSheet } = (await app.db('records').whereNotNull('sheet_id').where('status', 'accepted').first('record_no'))!
    const answer = await app.visitor.get(`/api/records/${withSheet}/drawing`).buffer(true).parse((response, done) => {
      let text = ''
      response.setEncoding('utf8')
      response.on('data', (chunk: string) => (text += chunk))
      response.on('end', () => done(null, text))
    })
    expect(answer.status).toBe(200)
    expect(answer.headers['content-type']).toMatch(/^image\/svg\+xml/)
    expect(answer.body).toMatch(/^<svg xmlns="http:\/\/www\.w3\.org\/2000\/svg"[^>]*role="img"><title>[^<]+<\/title>/)
    expect(answer.body).not.toMatch(/NaN|Infinity|undefined|<script/)
    expect((await app.visitor.get(`/api/records/${withSheet}/drawing`).set('if-none-match', answer.headers.etag!)).status).toBe(304)
    expect((await app.visitor.get('/api/records/999999/drawing')).status).toBe(404)
    const bare = await app.db('records').whereNull('sheet_id').where('status', 'accepted').first('record_no')
    if (bare) expect((await app.visitor.get(`/api/records/${bare.record_no}/drawing`)).status).toBe(404)
  })
})
