/**
 * What the public lists cost beside bare routes (tests/load/bare) on the same database, in one run: requests a second of
 * the list by API and as a page, and the client JavaScript of the page. Run by `npm run bench:lists`; figures depend on
 * the machine, the ratios less.
 */
import { spawn } from 'node:child_process'
import { existsSync, mkdtempSync, readFileSync, rmSync } from 'node:fs'
import os from 'node:os'
import path from 'node:path'
import { fileURLToPath } from 'node:url'
import { gzipSync } from 'node:zlib'
import autocannon from 'autocannon'
import mysql from 'mysql2/promise'
import { freePort } from '../lib/ports.mjs'
import { endProcess, run, sleep, tiedToParent } from '../lib/processes.mjs'
import { say, step, StartError } from '../lib/report.mjs'

const ROOT = fileURLToPath(new URL('../..', import.meta.url))
const BARE = path.join(ROOT, '.cache', 'bare', 'output', 'server', 'index.mjs')
const CATEGORY = 'mule-deer-typical'
const CONNECTIONS = 8
const SECONDS = Number(process.argv[2] ?? 8)
const ROUNDS = 3

const folder = mkdtempSync(path.join(os.tmpdir(), 'hartroll-lists-'))
/** @type {import('node:child_process').ChildProcess[]} */
const started = []
try {
  await step('Building the bare routes', async () => {
    const { code, output } = await run(process.execPath, [path.join(ROOT, 'node_modules/nuxt/bin/nuxt.mjs'), 'build', path.join(ROOT, 'tests', 'load', 'bare')], { cwd: ROOT, env: { ...process.env, NODE_ENV: 'production' } })
    if (code !== 0) throw new StartError(output.trim().split('\n').slice(-5).join('\n'))
  })
  const ours = await startOurs()
  const { databaseUrl } = JSON.parse(readFileSync(path.join(folder, 'running.json'), 'utf8'))
  const classId = await idOf(databaseUrl)
  const bare = await startBare(databaseUrl, classId)

  say(`\n${CONNECTIONS} connections, ${ROUNDS} rounds of ${SECONDS} s each in turn, best round; 50 lines of ${CATEGORY}`)
  await compare('list by API', `${ours}/api/records?category=${CATEGORY}`, `${bare}/api/list?class=${classId}`)
  await compare('list as a page, made anew', `${ours}/records?category=${CATEGORY}`, `${bare}/?class=${classId}`, true)
  await compare('list as a page', `${ours}/records?category=${CATEGORY}`, `${bare}/?class=${classId}`)
  const [ourScripts, bareScripts] = [await scriptBytes(`${ours}/records?category=${CATEGORY}`), await scriptBytes(`${bare}/?class=${classId}`)]
  say(`client JavaScript of the page, gzip: ${kilobytes(ourScripts)}, bare ${kilobytes(bareScripts)}, ${kilobytes(ourScripts - bareScripts)} more`)
  say(`HTML of the page, gzip: ${kilobytes(gzipSync(await text(`${ours}/records?category=${CATEGORY}`)).length)}`)
}
finally {
  for (const child of started) if (child.pid) await endProcess(child.pid, 15_000)
  rmSync(folder, { recursive: true, force: true })
}

/** @returns {Promise<string>} address of a registry of its own with the demo's records */
async function startOurs() {
  const port = await freePort()
  const clean = Object.fromEntries(Object.entries(process.env).filter(([name]) => !/^(HARTROLL_|DATABASE_URL|SMTP_URL|STRIPE_|HOST$)/.test(name)))
  start([path.join(ROOT, 'scripts', 'start.mjs')], { ...clean, HARTROLL_DATA: folder, PORT: String(port) })
  return step('Starting Hartroll with the demo', () => answering(`http://127.0.0.1:${port}`, '/api/health'))
}

/** @param {string} databaseUrl @param {number} classId @returns {Promise<string>} */
async function startBare(databaseUrl, classId) {
  const port = await freePort()
  start([BARE], { ...process.env, NODE_ENV: 'production', NITRO_HOST: '127.0.0.1', NITRO_PORT: String(port), DATABASE_URL: databaseUrl })
  return answering(`http://127.0.0.1:${port}`, `/api/list?class=${classId}`)
}

/** @param {string[]} args @param {Record<string, string | undefined>} env */
function start(args, env) {
  if (!existsSync(/** @type {string} */ (args[0]))) throw new StartError(`${args[0]} is not there`)
  const [command, all] = tiedToParent(process.execPath, args)
  started.push(spawn(command, all, { cwd: ROOT, env, stdio: 'ignore' }))
}

/** @param {string} url @param {string} at @returns {Promise<string>} the address, once it answers */
async function answering(url, at) {
  for (let tries = 0; tries < 6_000; tries++) {
    const answer = await fetch(url + at).catch(() => null)
    if (answer?.ok) return url
    await sleep(100)
  }
  throw new StartError(`${url} does not answer`)
}

/** @param {string} databaseUrl @returns {Promise<number>} */
async function idOf(databaseUrl) {
  const connection = await mysql.createConnection(databaseUrl)
  const [rows] = await connection.query('SELECT id FROM classes WHERE code = ?', [CATEGORY])
  await connection.end()
  return /** @type {{ id: number }[]} */ (rows)[0]?.id ?? 0
}

/**
 * @param {string} url
 * @param {boolean} anew each request under an address of its own, so that no answer was made before
 * @returns {Promise<{ perSecond: number, p99: number }>}
 */
async function load(url, anew) {
  const result = await autocannon({ url: anew ? `${url}&asked=[<id>]` : url, idReplacement: anew, connections: CONNECTIONS, duration: SECONDS })
  if (result.non2xx > 0 || result.errors > 0) throw new StartError(`${url}: ${result.non2xx} answers other than 2xx, ${result.errors} errors`)
  return { perSecond: result.requests.average, p99: result.latency.p99 }
}

/** @param {string} what @param {string} ours @param {string} bare @param {boolean} anew */
async function compare(what, ours, bare, anew = false) {
  const best = { ours: { perSecond: 0, p99: 0 }, bare: { perSecond: 0, p99: 0 } }
  await autocannon({ url: ours, connections: CONNECTIONS, duration: 3 })
  await autocannon({ url: bare, connections: CONNECTIONS, duration: 3 })
  for (let round = 0; round < ROUNDS; round++) {
    for (const [name, url] of /** @type {const} */ ([['ours', ours], ['bare', bare]])) {
      const measured = await load(url, anew)
      if (measured.perSecond > best[name].perSecond) best[name] = measured
    }
  }
  say(`${what}: ${best.ours.perSecond.toFixed(0)}/s (p99 ${best.ours.p99} ms), bare ${best.bare.perSecond.toFixed(0)}/s (p99 ${best.bare.p99} ms), ratio ${(best.ours.perSecond / best.bare.perSecond).toFixed(2)}`)
}

/** @param {string} url @returns {Promise<string>} */
async function text(url) {
  return (await fetch(url)).text()
}

/** Scripts that the page loads at once, as a browser is told to by the HTML. @param {string} url @returns {Promise<number>} bytes in gzip */
async function scriptBytes(url) {
  const html = await text(url)
  const sources = new Set([...html.matchAll(/<(?:script[^>]+src|link[^>]+rel="modulepreload"[^>]+href)="([^"]+\.js)"/g)].map(match => /** @type {string} */ (match[1])))
  let bytes = 0
  for (const source of sources) bytes += gzipSync(await text(new URL(source, url).href)).length
  return bytes
}

/** @param {number} bytes */
function kilobytes(bytes) {
  return `${(bytes / 1000).toFixed(1)} kB`
}
