/**
 * `npm start`: from a fresh clone to a registry that serves, and from a stopped one to a serving one in seconds.
 * Until the node packages are installed only what Node itself brings may be used here.
 */
import { chmodSync, existsSync, mkdirSync, readFileSync, renameSync, rmSync, statSync, truncateSync, writeFileSync } from 'node:fs'
import { randomBytes } from 'node:crypto'
import path from 'node:path'
import { fileURLToPath } from 'node:url'
import { ensureBuild } from './build.mjs'
import { childEnvironment, urlHost } from './lib/childEnvironment.mjs'
import { installMariadbServer, offerPoppler } from './lib/debian.mjs'
import { readEnvironment } from './lib/environment.mjs'
import { ensurePackages } from './lib/packages.mjs'
import { whyNotListen } from './lib/ports.mjs'
import { commandLine, endCommands, endProcess, isAlive, run, sleep } from './lib/processes.mjs'
import { describe, say, seconds, StartError, step } from './lib/report.mjs'
import { keepRunning } from './lib/supervise.mjs'
import { hasMariadb, startMariadb } from './mariadb.mjs'

const ROOT = fileURLToPath(new URL('..', import.meta.url))
const READY_LIMIT_MS = 60_000
/** Web and worker have this long to finish what they are doing; with the database's turn it stays under 10 s. */
const DRAIN_MS = 5_000
const LOG_LIMIT_BYTES = 10 * 2 ** 20
const DEMO_PASSWORD = 'ochre-basin-demo'
const DEMO_ACCOUNTS = ['entrant', 'shop', 'measurer', 'reviewer', 'reviewer2', 'judge1 … judge8', 'registrar']

const begun = Date.now()
/** @type {(() => Promise<void>)[]} what to stop, the last started first */
const stops = []
let stopping = false
/** @type {{ start: number, databaseUrl: string | null, parts: Record<string, number> }} what this start runs */
const running = { start: process.pid, databaseUrl: null, parts: {} }

for (const signal of /** @type {const} */ (['SIGINT', 'SIGTERM', 'SIGHUP'])) {
  process.on(signal, () => {
    // npm and a terminal may both pass the same Ctrl-C on; once is enough.
    if (!stopping) shutDown(0, signal === 'SIGHUP' ? null : 'Stopping …')
  })
}

try {
  await start()
}
catch (error) {
  if (!stopping) {
    process.stderr.write(describe(error))
    await shutDown(1, null)
  }
}

async function start() {
  const wishes = readEnvironment(process.env, ROOT)
  say(`Hartroll, ${wishes.mode === 'demo' ? 'demo' : 'production'} on ${wishes.host}:${wishes.port}`)
  makeDataFolder(wishes.dataDir)
  await takeDataFolder(wishes.dataDir)
  const taken = await whyNotListen(wishes.port, wishes.host)
  if (taken) throw new StartError(listenFailure(taken, wishes))

  const instance = readInstance(wishes.dataDir)
  if (wishes.mode === 'production' && instance.demo && wishes.databaseUrl === null) {
    throw new StartError(`The database in ${wishes.dataDir} holds demo data with known passwords; set HARTROLL_DATA to another folder for production`)
  }
  // First of all: whoever may not install it is told at once, not after a minute of packages.
  if (wishes.databaseUrl === null && !hasMariadb()) await installMariadbServer()
  await offerPoppler()
  await ensurePackages(ROOT)

  const environment = childEnvironment(wishes, instance)
  // Before anything is made: the address of a database of our own is not known yet, and always right.
  await checkConfiguration({ ...environment, DATABASE_URL: wishes.databaseUrl ?? 'mysql://hartroll@127.0.0.1/hartroll', HARTROLL_OWN_DATABASE: wishes.databaseUrl === null ? '1' : undefined })
  if (wishes.databaseUrl !== null) {
    await checkForeignDatabase(wishes.databaseUrl)
  }
  else {
    const database = await openDatabase(wishes, instance)
    environment.DATABASE_URL = database
    environment.HARTROLL_OWN_DATABASE = '1'
  }
  if (stopping) return
  await ensureBuild()
  if (stopping) return
  await prepareDatabase(wishes, instance, environment)
  if (stopping) return
  await serve(wishes, environment)
  if (stopping) return
  closingBlock(wishes, environment)
}

/** @typedef {import('./lib/environment.mjs').Environment} Environment */
/** @typedef {import('./lib/childEnvironment.mjs').Instance} Instance */

/** @param {string} folder */
function makeDataFolder(folder) {
  try {
    // Others may pass through, not read: the database may run as an account of its own.
    mkdirSync(folder, { recursive: true, mode: 0o711 })
    if (process.getuid?.() === statSync(folder).uid) chmodSync(folder, 0o711)
    mkdirSync(path.join(folder, 'logs'), { recursive: true, mode: 0o700 })
    mkdirSync(path.join(folder, 'files'), { recursive: true, mode: 0o700 })
    const probe = path.join(folder, `.probe-${process.pid}`)
    writeFileSync(probe, '')
    rmSync(probe)
  }
  catch (error) {
    throw new StartError(`The data folder ${folder} cannot be written to (${/** @type {NodeJS.ErrnoException} */ (error).code}); make it writable or set HARTROLL_DATA to another one`)
  }
}

/**
 * One start a data folder. What a killed start left running is ended first.
 *
 * @param {string} folder
 */
async function takeDataFolder(folder) {
  const file = path.join(folder, 'running.json')
  if (existsSync(file)) {
    const { start: other, parts } = readJson(file, { start: 0, parts: {} })
    if (other && other !== process.pid && isAlive(other) && commandLine(other).includes('start.mjs')) {
      throw new StartError(`Hartroll already runs on the data folder ${folder} (process ${other}); stop it or set HARTROLL_DATA and PORT to others`)
    }
    for (const pid of /** @type {number[]} */ (Object.values(parts))) {
      if (isAlive(pid) && commandLine(pid).includes(path.join(ROOT, '.output'))) await endProcess(pid, DRAIN_MS)
    }
  }
  noteRunning(folder, {})
  stops.push(async () => rmSync(file, { force: true }))
}

/** @param {string} folder @param {Record<string, number>} parts */
function noteRunning(folder, parts) {
  Object.assign(running.parts, parts)
  writeJson(path.join(folder, 'running.json'), running)
}

/** @param {string} code @param {Environment} wishes */
function listenFailure(code, { port, host }) {
  if (code === 'EADDRINUSE') return `Port ${port} on ${host} is taken; stop what listens there or set PORT to another one`
  if (code === 'EACCES') return `Port ${port} may not be used by this account; set PORT to one above 1023`
  return `HOST ${host} is no address of this machine (${code}); set HOST to one that is`
}

/** @param {string} folder @returns {Instance} */
function readInstance(folder) {
  const file = path.join(folder, 'instance.json')
  const kept = existsSync(file) ? readJson(file, null) : null
  if (existsSync(file) && kept === null) throw new StartError(`The file ${file} is damaged; restore it from a backup`)
  if (kept) return kept
  const made = { id: randomBytes(4).toString('hex'), databasePassword: randomBytes(24).toString('base64url'), demo: false }
  writeJson(file, made)
  return made
}

/** @param {string} address */
async function checkForeignDatabase(address) {
  const { createConnection } = await import('mysql2/promise')
  const url = new URL(address)
  const where = `${url.hostname}:${url.port || 3306}`
  try {
    const socket = url.searchParams.get('socket')
    const connection = await createConnection({
      ...(socket ? { socketPath: socket } : { host: url.hostname, port: Number(url.port || 3306) }),
      user: decodeURIComponent(url.username),
      password: decodeURIComponent(url.password),
      database: decodeURIComponent(url.pathname.slice(1)),
      connectTimeout: 5_000,
    })
    const [rows] = await connection.query('SELECT VERSION() AS version')
    await connection.end()
    const version = String(/** @type {{ version: string }[]} */ (rows)[0]?.version)
    const [major = 0, minor = 0] = version.split('.').map(Number)
    if (!/mariadb/i.test(version) || major < 10 || (major === 10 && minor < 11)) {
      throw new StartError(`DATABASE_URL leads to a server of version ${version}; Hartroll needs MariaDB 10.11 or newer`)
    }
  }
  catch (error) {
    if (error instanceof StartError) throw error
    const { code, message } = /** @type {NodeJS.ErrnoException} */ (error)
    /** @type {Record<string, string>} */
    const reasons = {
      ECONNREFUSED: `nothing answers at ${where}`,
      ETIMEDOUT: `nothing answers at ${where}`,
      ENOTFOUND: `the host ${url.hostname} is not known`,
      EAI_AGAIN: `the host ${url.hostname} is not known`,
      ER_ACCESS_DENIED_ERROR: `the server at ${where} refuses the user "${decodeURIComponent(url.username)}" or the password`,
      ER_DBACCESS_DENIED_ERROR: `the user "${decodeURIComponent(url.username)}" may not use the database "${url.pathname.slice(1)}"`,
      ER_BAD_DB_ERROR: `the server at ${where} has no database "${url.pathname.slice(1)}"`,
    }
    throw new StartError(`DATABASE_URL cannot be used: ${reasons[code ?? ''] ?? message}`)
  }
}

/**
 * Starts the private database, keeps it running and gives its address.
 *
 * @param {Environment} wishes
 * @param {Instance} instance
 * @returns {Promise<string>}
 */
async function openDatabase(wishes, instance) {
  const folder = path.join(wishes.dataDir, 'mariadb')
  const fresh = !existsSync(path.join(folder, 'data', 'mysql'))
  const open = (/** @type {number | undefined} */ port) => startMariadb({ folder, password: instance.databasePassword, ...(port === undefined ? {} : { port }) })
  const opening = open(wishes.databasePort)
  /** @type {import('./mariadb.mjs').Mariadb | null} */
  let latest = null
  // Also when it is told to stop while the server is still starting.
  stops.push(async () => (latest ?? await opening.catch(() => null))?.stop())
  let server = await (fresh ? step('Making the database', () => opening) : opening)
  latest = server
  let restarts = 0
  const watch = () => {
    server.exited.then(async () => {
      if (stopping) return
      say('The database ended; starting it again')
      for (;;) {
        try {
          if (++restarts > 50) throw new StartError('The database ended fifty times; giving up')
          // The same port: web and worker know it and come back by themselves.
          server = latest = await open(server.port)
          if (stopping) await server.stop()
          noteRunning(wishes.dataDir, { database: server.pid })
          break
        }
        catch (error) {
          if (stopping) return
          process.stderr.write(describe(error))
          if (restarts > 5) return shutDown(1, null)
          await sleep(1_000)
        }
      }
      watch()
    })
  }
  watch()
  running.databaseUrl = server.url
  noteRunning(wishes.dataDir, { database: server.pid })
  return server.url
}

/** @returns {string[]} arguments of node for the command line: the bundle when it is current, else the sources */
function commandLineProgram() {
  const bundle = path.join(ROOT, '.output', 'cli', 'index.mjs')
  return existsSync(bundle) && existsSync(path.join(ROOT, '.output', 'sources.txt')) ? [bundle] : ['--import', 'tsx', path.join(ROOT, 'scripts', 'cli.ts')]
}

/** Values that only the program itself can judge, before minutes are spent on a build. @param {Record<string, string | undefined>} env */
async function checkConfiguration(env) {
  const { code, output } = await run(process.execPath, [...commandLineProgram(), 'config'], { cwd: ROOT, env: /** @type {NodeJS.ProcessEnv} */ (env) })
  if (code !== 0) throw new StartError(output.trim().replace(/^hartroll: /, '').split('\n')[0] ?? 'The configuration is wrong')
}

/** @param {Environment} wishes @param {Instance} instance @param {Record<string, string | undefined>} env */
async function prepareDatabase(wishes, instance, env) {
  const demo = wishes.mode === 'demo'
  // Marked before the first row: a start that is cut short must not let demo passwords into production.
  if (demo && !instance.demo) writeJson(path.join(wishes.dataDir, 'instance.json'), { ...instance, demo: true })
  const { code, output } = await run(process.execPath, [...commandLineProgram(), 'prepare', ...(demo ? ['--demo'] : [])], {
    cwd: ROOT,
    env: /** @type {NodeJS.ProcessEnv} */ (env),
    quiet: false,
  })
  if (code !== 0 && !stopping) throw new StartError(`The database could not be prepared${output ? `: ${output}` : '; the line above says why'}`)
}

/** @param {Environment} wishes @param {Record<string, string | undefined>} env */
async function serve(wishes, env) {
  const logFile = (/** @type {string} */ name) => {
    if (wishes.mode === 'production') return null
    const file = path.join(wishes.dataDir, 'logs', `${name}.log`)
    if (existsSync(file) && statSync(file).size > LOG_LIMIT_BYTES) truncateSync(file)
    return file
  }
  const parts = [['web', '.output/server/index.mjs'], ['worker', '.output/worker/index.mjs']].map(([name = '', file = '']) => keepRunning({
    name,
    args: ['--enable-source-maps', path.join(ROOT, file)],
    env: /** @type {NodeJS.ProcessEnv} */ (env),
    cwd: ROOT,
    logFile: logFile(name),
    graceMs: DRAIN_MS,
    onEvent: say,
    onGivenUp: (part) => {
      const log = logFile(part)
      process.stderr.write(`hartroll: The ${part} ends again and again${log ? `; see ${log}` : ''}\n`)
      shutDown(1, null)
    },
    onStart: pid => noteRunning(wishes.dataDir, { [name]: pid }),
  }))
  stops.push(async () => {
    await Promise.all(parts.map(part => part.stop()))
  })
  const health = `http://${urlHost(wishes.host)}:${wishes.port}/api/health`
  const until = Date.now() + READY_LIMIT_MS
  let last = 'no answer'
  while (!stopping) {
    try {
      const answer = await fetch(health, { signal: AbortSignal.timeout(5_000) })
      if (answer.ok) return
      last = await answer.text()
    }
    catch {
      // Not listening yet.
    }
    if (Date.now() > until) throw new StartError(`The web does not become ready: ${last}`)
    await sleep(50)
  }
}

/** @param {Environment} wishes @param {Record<string, string | undefined>} env */
function closingBlock(wishes, env) {
  const line = '─'.repeat(64)
  say(`\n${line}`)
  say(`  Hartroll is ready after ${seconds(Date.now() - begun)}`)
  say(`  Address      ${env.HARTROLL_PUBLIC_URL}`)
  if (wishes.mode === 'demo') {
    say(`  Sign in as   ${DEMO_ACCOUNTS.slice(0, 5).map(name => `${name}@`).join(' ')}`)
    say(`               ${DEMO_ACCOUNTS.slice(5).map(name => name.replaceAll(/(\w+\d|registrar)/g, '$1@')).join(' ')}`)
    say(`               …ochrebasin.example, password ${DEMO_PASSWORD}`)
    say(`  Mail         ${env.HARTROLL_PUBLIC_URL}/mailbox shows what would have been sent`)
  }
  else {
    say('  First person npm run registrar -- MAIL prints a one-time link')
  }
  say(`  Data         ${wishes.dataDir}${wishes.databaseUrl === null ? '' : ' (files), DATABASE_URL (the rest)'}`)
  say('  Stop         Ctrl-C')
  say(`${line}\n`)
  if (wishes.mode === 'demo' && !['127.0.0.1', 'localhost', '::1'].includes(wishes.host)) {
    say(`  Caution: the demo's passwords are known to everybody, and ${wishes.host} can be reached from other machines.\n`)
  }
}

/** @param {number} code @param {string | null} message */
async function shutDown(code, message) {
  if (stopping) return
  stopping = true
  if (message) say(message)
  await endCommands()
  for (const stop of stops.reverse()) await stop().catch((/** @type {unknown} */ error) => process.stderr.write(describe(error)))
  if (message) say('Stopped.')
  process.exit(code)
}

/** @template T @param {string} file @param {T} otherwise */
function readJson(file, otherwise) {
  try {
    return JSON.parse(readFileSync(file, 'utf8'))
  }
  catch {
    return otherwise
  }
}

/** @param {string} file @param {unknown} value written whole or not at all */
function writeJson(file, value) {
  const unfinished = `${file}.${process.pid}`
  writeFileSync(unfinished, `${JSON.stringify(value, null, 2)}\n`, { mode: 0o600 })
  renameSync(unfinished, file)
}
