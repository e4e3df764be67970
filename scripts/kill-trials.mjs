/**
 * `node scripts/kill-trials.mjs 20`: kills web, worker or database with SIGKILL at random moments while people enter,
 * pay and vote, and then holds every answer of 2xx against the database. Ends with exit code 1 when anything that was
 * answered is lost, or when the integrity check finds something.
 */
import { mkdtempSync, readFileSync, rmSync } from 'node:fs'
import { spawn } from 'node:child_process'
import os from 'node:os'
import path from 'node:path'
import { fileURLToPath } from 'node:url'
import { freePort } from './lib/ports.mjs'
import { endProcess, run, sleep, tiedToParent, trySignal } from './lib/processes.mjs'
import { describe, say, seconds } from './lib/report.mjs'
import { Client } from './kill-trials/client.mjs'
import { entries } from './kill-trials/entries.mjs'
import { payments } from './kill-trials/payments.mjs'
import { votes } from './kill-trials/votes.mjs'

const ROOT = fileURLToPath(new URL('..', import.meta.url))
const VICTIMS = /** @type {const} */ (['web', 'worker', 'database'])
const BACK_LIMIT_MS = 30_000
const trials = Number(process.argv[2] ?? 20)
const seed = Number(process.argv[3] ?? Date.now() % 1_000_000)

const folder = mkdtempSync(path.join(os.tmpdir(), 'hartroll-kill-'))
const port = await freePort()
const url = `http://127.0.0.1:${port}`
const random = mulberry32(seed)
const [command, args] = tiedToParent(process.execPath, [path.join(ROOT, 'scripts', 'start.mjs')])
const env = {
  ...Object.fromEntries(Object.entries(process.env).filter(([name]) => !/^(HARTROLL_|DATABASE_URL|SMTP_URL|STRIPE_|HOST$)/.test(name))),
  HARTROLL_DATA: folder,
  PORT: String(port),
}
const hartroll = spawn(command, args, { cwd: ROOT, env, stdio: ['ignore', 'pipe', 'pipe'] })
let log = ''
for (const stream of [hartroll.stdout, hartroll.stderr]) stream.on('data', chunk => (log += chunk))

let failed = false
try {
  say(`kill trials: ${trials}, seed ${seed}`)
  await healthy(600_000)
  failed = !await trial()
}
catch (error) {
  failed = true
  process.stderr.write(describe(error))
}
finally {
  if (failed) process.stderr.write(`${log.split('\n').slice(-30).join('\n')}\n`)
  await endProcess(/** @type {number} */ (hartroll.pid), 15_000)
  rmSync(folder, { recursive: true, force: true })
}
process.exit(failed ? 1 : 0)

/** @returns {Promise<boolean>} whether all is well */
async function trial() {
  const databaseUrl = running().databaseUrl
  const loads = [await entries(url), await payments(url), await votes(url, databaseUrl)]
  const stopping = new AbortController()
  const working = loads.map(load => load.work(stopping.signal))
  let slowest = 0
  for (let trial = 1; trial <= trials; trial++) {
    await sleep(200 + random() * 1_500)
    const victim = VICTIMS[Math.floor(random() * VICTIMS.length)] ?? 'web'
    const pid = running().parts[victim]
    if (!pid) throw new Error(`nothing is known of the ${victim}`)
    const killedAt = Date.now()
    trySignal(pid, 'SIGKILL')
    while (running().parts[victim] === pid) {
      if (Date.now() - killedAt > BACK_LIMIT_MS) throw new Error(`the ${victim} was not started again`)
      await sleep(20)
    }
    await healthy(BACK_LIMIT_MS)
    slowest = Math.max(slowest, Date.now() - killedAt)
    say(`  ${trial}. ${victim} killed, back after ${seconds(Date.now() - killedAt)}`)
  }
  stopping.abort()
  await Promise.all(working)

  let lost = 0
  for (const load of loads) {
    const { answered, problems } = await load.verify(databaseUrl)
    say(`  ${load.name}: ${answered} answered with 2xx, ${problems.length} lost`)
    for (const problem of problems.slice(0, 10)) say(`    ${problem}`)
    lost += problems.length
    if (answered === 0) throw new Error(`the load "${load.name}" did nothing, so nothing was tried`)
  }
  say(`  slowest return ${seconds(slowest)}`)
  const { code, output } = await run(process.execPath, [path.join(ROOT, 'scripts', 'command.mjs'), 'check'], { cwd: ROOT, env })
  say(`  integrity check: ${code === 0 ? 'clean' : output.trim()}`)
  return lost === 0 && code === 0
}

/** @returns {{ databaseUrl: string, parts: Record<string, number> }} */
function running() {
  return JSON.parse(readFileSync(path.join(folder, 'running.json'), 'utf8'))
}

/** @param {number} limitMs */
async function healthy(limitMs) {
  const until = Date.now() + limitMs
  const client = new Client(url)
  for (;;) {
    if (hartroll.exitCode !== null) throw new Error(`the start ended with code ${hartroll.exitCode}`)
    const answer = await client.send('GET', '/api/health').catch(() => null)
    if (answer?.status === 200) return
    if (Date.now() > until) throw new Error(`not healthy after ${limitMs / 1000} s: ${JSON.stringify(answer?.body ?? null)}`)
    await sleep(50)
  }
}

/** A small generator, so that a run can be repeated by its seed. @param {number} state */
function mulberry32(state) {
  return () => {
    state = (state + 0x6D2B79F5) | 0
    let mixed = Math.imul(state ^ (state >>> 15), 1 | state)
    mixed = (mixed + Math.imul(mixed ^ (mixed >>> 7), 61 | mixed)) ^ mixed
    return ((mixed ^ (mixed >>> 14)) >>> 0) / 4_294_967_296
  }
}
