import { describe, expect, it } from 'vitest'
import { useApp } from '../support/app'

const app = useApp()

describe('problem documents (RFC 9457)', () => {
  it.each([
    ['an unknown address', 'get', '/api/there-is-no-such-thing', 404],
    ['an unknown record', 'get', '/api/records/4000000000', 404],
    ['a record number that is none', 'get', '/api/records/%27%3B--', 422],
  ] as const)('answer %s', async (_what, method, path, status) => {
    const answer = await app.visitor[method](path)
    expect(answer.status).toBe(status)
    expect(answer.headers['content-type']).toContain('application/problem+json')
    expect(answer.body).toMatchObject({ status, title: expect.any(String), detail: expect.any(String), type: expect.stringMatching(/^urn:hartroll:problem:/) })
    expect(JSON.stringify(answer.body)).not.toMatch(/node_modules|\.(?:ts|mjs):\d+|at async/)
  })

  it('answer a request that is no JSON, of another kind, or too large, each in its own words', async () => {
    const broken = await app.visitor.post('/api/scores').set('content-type', 'application/json').send('{"category":')
    expect([broken.status, broken.body.detail]).toEqual([400, 'The request is not valid JSON.'])
    const other = await app.visitor.post('/api/scores').set('content-type', 'text/plain').send('hello')
    expect(other.status).toBe(415)
    const large = await app.visitor.post('/api/scores').send({ category: 'x', measurements: { note: 'x'.repeat(70_000) } })
    expect([large.status, large.body.code]).toEqual([413, 'body_too_large'])
  })

  it('name every field that was refused by its path', async () => {
    const answer = await app.visitor.get('/api/records?from=abc&limit=900&sort=wings')
    expect(answer.status).toBe(422)
    expect(answer.body.errors.map((error: { path: string }) => error.path).sort()).toEqual(['from', 'limit', 'sort'])
    for (const error of answer.body.errors) expect(error.message).toMatch(/\S/)
  })
})

describe('requests from another site', () => {
  const body = { category: 'cougar', measurements: { skullLength: '9', skullWidth: '6' } }

  it.each([
    ['a foreign origin', { origin: 'https://elsewhere.example' }],
    ['a foreign page, said by the browser', { 'sec-fetch-site': 'cross-site' }],
    ['another host of the same site', { 'sec-fetch-site': 'same-site' }],
    ['an opaque origin', { origin: 'null' }],
  ])('are not carried out: %s', async (_what, headers) => {
    const answer = await app.visitor.post('/api/scores').set(headers).send(body)
    expect([answer.status, answer.body.code]).toEqual([403, 'foreign_origin'])
  })

  it('include a form post', async () => {
    const answer = await app.visitor.post('/api/scores').set({ origin: 'https://elsewhere.example', 'content-type': 'application/x-www-form-urlencoded' }).send('category=cougar')
    expect(answer.status).toBe(403)
  })

  it('are told from our own pages and from programs', async () => {
    expect((await app.visitor.post('/api/scores').set({ origin: app.url, 'sec-fetch-site': 'same-origin' }).send(body)).status).toBe(200)
    expect((await app.visitor.post('/api/scores').send(body)).status).toBe(200)
  })
})

describe('headers', () => {
  it('keep every answer from being sniffed or framed', async () => {
    for (const path of ['/', '/api/me', '/api/no', '/nothing-here']) {
      const { headers } = await app.visitor.get(path).set('accept', path.startsWith('/api') ? '*/*' : 'text/html')
      expect(headers['x-content-type-options']).toBe('nosniff')
      expect(headers['x-frame-options']).toBe('DENY')
      expect(headers['x-request-id']).toMatch(/^[0-9a-f-]{36}$/)
    }
  })

  // W3C Content Security Policy Level 3, section 2.3.1: a hash source lets exactly one inline script run.
  it('let pages run only scripts that stand in them, by hash', async () => {
    const { headers, text } = await app.visitor.get('/').set('accept', 'text/html')
    const policy = headers['content-security-policy'] as string
    expect(policy).toContain('default-src \'self\'')
    expect(policy).not.toMatch(/script-src[^;]*unsafe/)
    const inline = [...text.matchAll(/<script(?![^>]*\bsrc=)(?![^>]*type="application\/json")[^>]*>/g)]
    expect(policy.match(/'sha256-/g)).toHaveLength(inline.length)
  })

  it('say nothing of the signed-in to a cache', async () => {
    const me = await app.visitor.get('/api/me')
    expect(me.headers['cache-control']).toBe('no-store')
  })
})
