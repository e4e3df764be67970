import { spawnSync } from 'node:child_process'
import { chownSync, mkdirSync, mkdtempSync, rmSync, writeFileSync } from 'node:fs'
import net from 'node:net'
import os from 'node:os'
import path from 'node:path'
import { fileURLToPath } from 'node:url'
import { afterAll, beforeAll, describe, expect, inject, test } from 'vitest'
import { freePort } from '../../scripts/lib/ports.mjs'
import { useDatabase } from '../support/database'

const ROOT = fileURLToPath(new URL('../..', import.meta.url))
const database = useDatabase()
let folder: string

beforeAll(() => {
  folder = mkdtempSync(path.join(os.tmpdir(), 'hartroll-start-'))
})
afterAll(() => {
  rmSync(folder, { recursive: true, force: true })
})

/** Starts and waits for the end; a start that does not fail is ended after a while, and the test with it. */
async function start(env: Record<string, string>, as: { uid?: number, gid?: number } = {}) {
  const { PATH = '', HOME = '' } = process.env
  const result = spawnSync(process.execPath, [path.join(ROOT, 'scripts/start.mjs')], {
    cwd: ROOT, encoding: 'utf8', timeout: 60_000, env: { PATH, HOME, PORT: String(await freePort()), HARTROLL_DATA: path.join(folder, 'data'), ...env }, ...as,
  })
  return { code: result.status, lines: result.stderr.trim().split('\n') }
}

describe('a start that cannot be says why in one line and ends with a code', () => {
  test('a taken port', async () => {
    const server = net.createServer().listen(0, '127.0.0.1')
    await new Promise(resolve => server.once('listening', resolve))
    const { port } = server.address() as net.AddressInfo
    const { code, lines } = await start({ PORT: String(port) })
    server.close()
    expect(lines).toEqual([`hartroll: Port ${port} on 127.0.0.1 is taken; stop what listens there or set PORT to another one`])
    expect(code).toBe(1)
  })

  test('an address of another machine', async () => {
    const { code, lines } = await start({ HOST: '192.0.2.1', HARTROLL_SECRET: 'x'.repeat(32) })
    expect(lines).toEqual([expect.stringMatching(/^hartroll: HOST 192\.0\.2\.1 is no address of this machine/)])
    expect(code).toBe(1)
  })

  test('a data folder that is a file', async () => {
    const file = path.join(folder, 'a-file')
    writeFileSync(file, '')
    const { code, lines } = await start({ HARTROLL_DATA: file })
    expect(lines).toEqual([expect.stringMatching(/^hartroll: The data folder .* cannot be written to \(EEXIST\)/)])
    expect(code).toBe(1)
  })

  test.runIf(process.getuid?.() === 0)('a data folder of somebody else', async () => {
    const closed = path.join(folder, 'closed')
    mkdirSync(closed, { mode: 0o755 })
    const { code, lines } = await start({ HARTROLL_DATA: path.join(closed, 'data') }, { uid: 65534, gid: 65534 })
    expect(lines).toEqual([expect.stringMatching(/^hartroll: The data folder .* cannot be written to \(EACCES\)/)])
    expect(code).toBe(1)
  })

  test('a database folder that holds something else', async () => {
    const data = path.join(folder, 'strange')
    mkdirSync(path.join(data, 'mariadb', 'data'), { recursive: true })
    writeFileSync(path.join(data, 'mariadb', 'data', 'letter.txt'), 'not a database')
    const { code, lines } = await start({ HARTROLL_DATA: data })
    expect(lines).toEqual([expect.stringMatching(/^hartroll: The database folder .* holds files but no database/)])
    expect(code).toBe(1)
  })

  test('a database folder that is broken', async () => {
    const data = path.join(folder, 'broken')
    const inner = path.join(data, 'mariadb', 'data')
    mkdirSync(path.join(inner, 'mysql'), { recursive: true })
    writeFileSync(path.join(inner, 'ibdata1'), 'rubbish')
    if (process.getuid?.() === 0) {
      const [, , uid = '0', gid = '0'] = spawnSync('getent', ['passwd', 'mysql'], { encoding: 'utf8' }).stdout.split(':')
      for (const target of [inner, path.join(inner, 'mysql'), path.join(inner, 'ibdata1')]) chownSync(target, Number(uid), Number(gid))
    }
    const { code, lines } = await start({ HARTROLL_DATA: data })
    expect(lines).toEqual([expect.stringMatching(/^hartroll: The database in .* does not start: /)])
    expect(code).toBe(1)
  })

  test.each([
    ['the wrong password', (url: URL) => { url.password = 'wrong' }, /refuses the user "hartroll" or the password$/],
    ['an unknown database', (url: URL) => { url.pathname = '/nowhere' }, /has no database "nowhere"$/],
    ['a port where nothing listens', (url: URL) => { url.port = '1' }, /nothing answers at 127\.0\.0\.1:1$/],
  ])('a DATABASE_URL with %s', async (_what, change, line) => {
    const url = new URL(inject('databaseUrl'))
    change(url)
    const { code, lines } = await start({ DATABASE_URL: url.href, HARTROLL_SECRET: 'x'.repeat(32) })
    expect(lines).toEqual([expect.stringMatching(line)])
    expect(lines[0]).toMatch(/^hartroll: DATABASE_URL cannot be used: /)
    expect(lines[0]).not.toContain('wrong')
    expect(code).toBe(1)
  })

  test.each([
    [{ HARTROLL_MODE: 'production' }, /^hartroll: HARTROLL_SECRET is missing/],
    [{ HARTROLL_MODE: 'demo', DATABASE_URL: 'mysql://a:b@127.0.0.1/c' }, /^hartroll: HARTROLL_MODE=demo asks for demo data/],
    [{ SMTP_URL: 'http://mail.example' }, /^hartroll: SMTP_URL must begin with smtp:\/\/ or smtps:\/\//],
    [{ HARTROLL_PUBLIC_URL: 'lists' }, /^hartroll: HARTROLL_PUBLIC_URL is not a URL/],
    [{ HARTROLL_TRUSTED_PROXIES: 'many' }, /^hartroll: HARTROLL_TRUSTED_PROXIES must be a whole number/],
    [{ STRIPE_SECRET_KEY: 'sk_test_x' }, /^hartroll: STRIPE_WEBHOOK_SECRET is missing/],
  ])('%o', async (env, line) => {
    const { code, lines } = await start(env)
    expect(lines).toEqual([expect.stringMatching(line)])
    expect(code).toBe(1)
  })

  test('demo data that are to become production', async () => {
    const data = path.join(folder, 'was-demo')
    mkdirSync(data)
    writeFileSync(path.join(data, 'instance.json'), JSON.stringify({ id: 'abcd', databasePassword: 'x', demo: true }))
    const { code, lines } = await start({ HARTROLL_DATA: data, HARTROLL_MODE: 'production', HARTROLL_SECRET: 'x'.repeat(32) })
    expect(lines).toEqual([expect.stringMatching(/holds demo data with known passwords/)])
    expect(code).toBe(1)
  })
})

test('the database of this file is untouched by all that', async () => {
  expect(await database.db('users').first('id')).toBeUndefined()
})
