import { expect, test } from 'vitest'
import { sleep } from '../../scripts/lib/processes.mjs'
import { useApp } from '../support/app'

const app = useApp({ cuttable: true, worker: true })
/** Promised is an answer at once; three times the slack of a busy machine. */
const PROMPTLY_MS = 15_000

test('with a worker beside it the health is ok', async () => {
  await expect.poll(async () => (await app.visitor.get('/api/health')).body, { timeout: 20_000 }).toMatchObject({ status: 'ok', worker: 'ok' })
})

test('while the database is away every answer is 503 and prompt, and all is well by itself when it is back', async () => {
  const entrant = await app.signInAs('entrant')
  expect((await entrant.get('/api/desk')).status).toBe(200)
  await app.line.cut()
  for (const path of ['/api/health', '/api/records', '/api/desk', '/api/people']) {
    const begun = Date.now()
    const answer = await entrant.get(path)
    expect([path, answer.status]).toEqual([path, 503])
    expect(Date.now() - begun, path).toBeLessThan(PROMPTLY_MS)
    expect(answer.text, path).not.toMatch(/ECONN|at \/|\.ts:|mysql/)
    if (path !== '/api/health') expect(answer.headers['content-type'], path).toMatch(/^application\/problem\+json/)
  }
  // What needs no database answers as ever.
  expect((await app.visitor.post('/api/scores').send({ category: 'no-such-class', measurements: {} })).status).toBe(404)

  await app.line.mend()
  const until = Date.now() + PROMPTLY_MS
  while ((await entrant.get('/api/desk')).status !== 200 && Date.now() < until) await sleep(100)
  expect((await entrant.get('/api/desk')).status).toBe(200)
  await expect.poll(async () => (await app.visitor.get('/api/health')).status, { timeout: 20_000 }).toBe(200)
})

test('a second copy beside it keeps its own session in the same browser', async () => {
  const { startApp } = await import('../support/app')
  const other = await startApp({ env: { HARTROLL_INSTANCE: 'second' } })
  try {
    const here = await app.signInAs('registrar')
    const there = await other.app.signInAs('judge')
    expect(here.cookie.split('=')[0]).not.toBe(there.cookie.split('=')[0])
    // One browser sends the cookies of a host to every port of it.
    const both = `${here.cookie}; ${there.cookie}`
    expect((await app.visitor.get('/api/me').set('Cookie', both)).body.name).toBe(here.person.name)
    expect((await other.app.visitor.get('/api/me').set('Cookie', both)).body.name).toBe(there.person.name)
  }
  finally {
    await other.stop()
  }
})

test('told to stop, web and worker finish and end by themselves within 10 s', async () => {
  const { startApp } = await import('../support/app')
  const other = await startApp({ worker: true })
  const slow = other.app.visitor.post('/api/scores').send({ category: 'mule-deer-typical', measurements: {} })
  const begun = Date.now()
  await Promise.all([slow, other.stop()])
  expect(Date.now() - begun).toBeLessThan(10_000)
})
