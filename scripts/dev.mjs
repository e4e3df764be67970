/**
 * `npm run dev`: the private database, the worker and Nuxt's development server, for working on Hartroll itself.
 * Data lie apart from those of `npm start`, in .data/dev.
 */
import { spawn } from 'node:child_process'
import { randomBytes } from 'node:crypto'
import { existsSync, mkdirSync, readFileSync, writeFileSync } from 'node:fs'
import path from 'node:path'
import { fileURLToPath } from 'node:url'
import { installMariadbServer } from './lib/debian.mjs'
import { readEnvironment } from './lib/environment.mjs'
import { ensurePackages } from './lib/packages.mjs'
import { endProcess, run } from './lib/processes.mjs'
import { failWith, say, StartError, step } from './lib/report.mjs'
import { hasMariadb, startMariadb } from './mariadb.mjs'

const ROOT = fileURLToPath(new URL('..', import.meta.url))

try {
  const wishes = readEnvironment({ HARTROLL_DATA: '.data/dev', ...process.env, HARTROLL_MODE: 'demo', DATABASE_URL: undefined }, ROOT)
  mkdirSync(wishes.dataDir, { recursive: true, mode: 0o711 })
  if (!hasMariadb()) await installMariadbServer()
  await ensurePackages(ROOT)
  const secretFile = path.join(wishes.dataDir, 'secret')
  if (!existsSync(secretFile)) writeFileSync(secretFile, randomBytes(32).toString('hex'), { mode: 0o600 })
  const database = await step('Starting the database', () => startMariadb({ folder: path.join(wishes.dataDir, 'mariadb'), password: 'dev', port: wishes.databasePort }))
  const publicUrl = `http://${wishes.host}:${wishes.port}`
  const env = {
    ...process.env,
    HOST: wishes.host,
    PORT: String(wishes.port),
    DATABASE_URL: database.url,
    HARTROLL_OWN_DATABASE: '1',
    HARTROLL_MODE: 'demo',
    HARTROLL_DATA: wishes.dataDir,
    HARTROLL_SECRET: readFileSync(secretFile, 'utf8').trim(),
    HARTROLL_INSTANCE: 'dev',
    HARTROLL_PUBLIC_URL: publicUrl,
    AUTH_ORIGIN: `${publicUrl}/api/auth`,
    NEXTAUTH_URL: `${publicUrl}/api/auth`,
  }
  const prepared = await run(process.execPath, ['--import', 'tsx', 'scripts/cli.ts', 'prepare', '--demo'], { cwd: ROOT, env, quiet: false })
  if (prepared.code !== 0) {
    await database.stop()
    throw new StartError('The database could not be prepared; the lines above say why')
  }
  const children = [
    ['node_modules/nuxt/bin/nuxt.mjs', 'dev', '--host', wishes.host, '--port', String(wishes.port)],
    ['--import', 'tsx', '--watch', 'server/worker.ts'],
  ].map(args => spawn(process.execPath, args, { cwd: ROOT, env, stdio: 'inherit', detached: true }))
  let stopping = false
  for (const signal of /** @type {const} */ (['SIGINT', 'SIGTERM', 'SIGHUP'])) {
    process.on(signal, async () => {
      if (stopping) return
      stopping = true
      say('Stopping …')
      await Promise.all(children.map(child => child.pid && endProcess(child.pid, 5_000)))
      await database.stop()
      process.exit(0)
    })
  }
}
catch (error) {
  failWith(error)
}
