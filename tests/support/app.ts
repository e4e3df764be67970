import { spawn, type ChildProcess } from 'node:child_process'
import { once } from 'node:events'
import { mkdtempSync, readFileSync, rmSync, writeFileSync, openSync } from 'node:fs'
import os from 'node:os'
import path from 'node:path'
import { fileURLToPath } from 'node:url'
import type { Knex } from 'knex'
import supertest from 'supertest'
import { afterAll, beforeAll } from 'vitest'
import { freePort } from '../../scripts/lib/ports.mjs'
import { endProcess, sleep, tiedToParent } from '../../scripts/lib/processes.mjs'
import { createRegistry, type Registry } from '../../server/composition'
import { readConfig } from '../../server/config'
import type { Role } from '../../shared/domain/access/roles'
import { takeDatabase, type TestDatabase } from './database'
import { openLine, type DatabaseLine } from './line'
import { makePerson, makeSession, type Person, type PersonWishes } from './people'

const ROOT = fileURLToPath(new URL('../..', import.meta.url))
const SECRET = 'a secret of the tests alone, long enough to be taken'
const READY_LIMIT_MS = 30_000
const METHODS = ['get', 'post', 'put', 'patch', 'delete'] as const
type Method = (typeof METHODS)[number]

/** Requests as one person; nothing is followed and nothing is thrown for a status. */
export type Client = Readonly<Record<Method, (path: string) => supertest.Test>> & {
  readonly person: Person | null
  /** `Cookie` header of the session, empty for a visitor */
  readonly cookie: string
}

export interface TestClock {
  now(): Date
  /** Sets the time for server, worker and registry at once; it stands still until set again. */
  set(to: Date | string): void
  /** Moves the time on. */
  pass(days: number): void
}

export interface App {
  readonly url: string
  readonly db: Knex
  readonly database: TestDatabase
  readonly clock: TestClock
  /** The same registry as the server's, for calling services directly. */
  readonly registry: Registry
  /** A visitor without a session. */
  readonly visitor: Client
  /** Makes a person with these roles and a session. */
  signInAs(roles: Role | readonly Role[], wishes?: PersonWishes): Promise<Client & { readonly person: Person }>
  /** A session for a person who is there already. */
  signIn(person: Person): Promise<Client & { readonly person: Person }>
  /** What the server has written to its log so far. */
  log(): string
  /** The line to the database, where one was asked for: `cut` as if the database's machine were gone, `mend` as if it were back. */
  readonly line: DatabaseLine
  /** Environment of the server, for starting a worker or a script beside it. */
  readonly env: Readonly<Record<string, string>>
}

export interface AppOptions {
  /** The time at which the tests begin. */
  readonly at?: Date | string
  /** More for the environment, such as SMTP_URL. */
  readonly env?: Readonly<Record<string, string>>
  /** Starts a worker process too. */
  readonly worker?: boolean
  /** Puts a line between server and database that can be cut. */
  readonly cuttable?: boolean
}

/**
 * The built server on a database of its own, for the tests of one file. Read its fields inside tests and hooks only.
 */
export function useApp(options: AppOptions = {}): App {
  let running: RunningApp | undefined
  beforeAll(async () => {
    running = await startApp(options)
  })
  afterAll(async () => {
    await running?.stop()
  })
  return new Proxy({} as App, {
    get(_target, property) {
      if (!running) throw new Error('The server is there from beforeAll on')
      return running.app[property as keyof App]
    },
  })
}

interface RunningApp {
  readonly app: App
  stop(): Promise<void>
}

/** As `useApp`, for scripts and tests that start and stop servers themselves. */
export async function startApp({ at = '2026-03-02T15:00:00.000Z', env: more = {}, worker = false, cuttable = false }: AppOptions = {}): Promise<RunningApp> {
  const folder = mkdtempSync(path.join(os.tmpdir(), 'hartroll-app-'))
  const database = await takeDatabase()
  const undo: (() => Promise<unknown>)[] = [async () => rmSync(folder, { recursive: true, force: true }), () => database.release()]
  const stop = async () => {
    for (const step of undo.splice(0).reverse()) await step()
  }
  try {
    const clockFile = path.join(folder, 'clock')
    const clock: TestClock = {
      now: () => new Date(readFileSync(clockFile, 'utf8')),
      set: to => writeFileSync(clockFile, new Date(to).toISOString()),
      pass: days => clock.set(new Date(clock.now().getTime() + days * 86_400_000)),
    }
    clock.set(at)
    const port = await freePort()
    const url = `http://127.0.0.1:${port}`
    const line = cuttable ? await openLine(database.url) : null
    if (line) undo.push(() => line.close())
    const env: Record<string, string> = {
      PATH: process.env.PATH ?? '',
      NODE_ENV: 'production',
      HOST: '127.0.0.1',
      PORT: String(port),
      DATABASE_URL: line?.url ?? database.url,
      HARTROLL_OWN_DATABASE: '1',
      HARTROLL_MODE: 'demo',
      HARTROLL_TESTING: '1',
      HARTROLL_TEST_CLOCK: clockFile,
      HARTROLL_DATA: folder,
      HARTROLL_SECRET: SECRET,
      HARTROLL_INSTANCE: 'test',
      HARTROLL_PUBLIC_URL: url,
      AUTH_ORIGIN: `${url}/api/auth`,
      NEXTAUTH_URL: `${url}/api/auth`,
      ...more,
    }
    const logFile = path.join(folder, 'web.log')
    const web = launch('.output/server/index.mjs', env, logFile)
    undo.push(() => end(web))
    if (worker) {
      const beside = launch('.output/worker/index.mjs', env, path.join(folder, 'worker.log'))
      undo.push(() => end(beside))
    }
    await answering(url, web, logFile)
    const registry = createRegistry(readConfig({ ...env, DATABASE_URL: database.url }), { clock })
    undo.push(() => registry.close())

    const client = (cookie: string, person: Person | null): Client => ({
      person,
      cookie,
      ...Object.fromEntries(METHODS.map(method => [method, (to: string) => {
        const request = supertest(url)[method](to).redirects(0).ok(() => true)
        return cookie ? request.set('Cookie', cookie) : request
      }])) as Record<Method, (path: string) => supertest.Test>,
    })
    const signIn = async (person: Person) => {
      const token = await makeSession(database.db, clock.now(), person.userId, SECRET)
      return { ...client(`hartroll-${env.HARTROLL_INSTANCE}.session=${token}`, person), person }
    }
    const app: App = {
      url,
      db: database.db,
      database,
      clock,
      registry,
      env,
      get line() {
        if (!line) throw new Error('Ask for it: useApp({ cuttable: true })')
        return line
      },
      visitor: client('', null),
      signIn,
      signInAs: async (roles, wishes) => signIn(await makePerson(database.db, clock.now(), typeof roles === 'string' ? [roles] : roles, wishes)),
      log: () => readFileSync(logFile, 'utf8'),
    }
    return { app, stop }
  }
  catch (error) {
    await stop()
    throw error
  }
}

function launch(program: string, env: Record<string, string>, logFile: string): ChildProcess {
  const log = openSync(logFile, 'a')
  const [command, args] = tiedToParent(process.execPath, ['--enable-source-maps', path.join(ROOT, program)])
  return spawn(command, args, { cwd: ROOT, env, stdio: ['ignore', log, log] })
}

async function end(child: ChildProcess): Promise<void> {
  if (child.exitCode !== null || child.signalCode !== null) return
  const exited = once(child, 'exit')
  await endProcess(child.pid!, 5_000)
  await exited
}

async function answering(url: string, web: ChildProcess, logFile: string): Promise<void> {
  const until = Date.now() + READY_LIMIT_MS
  for (;;) {
    if (web.exitCode !== null) throw new Error(`The server ended at its start:\n${readFileSync(logFile, 'utf8')}`)
    try {
      await fetch(`${url}/api/health`, { signal: AbortSignal.timeout(5_000) })
      return
    }
    catch {
      if (Date.now() > until) throw new Error(`The server does not answer:\n${readFileSync(logFile, 'utf8')}`)
      await sleep(30)
    }
  }
}
