import { randomBytes } from 'node:crypto'
import { existsSync, readFileSync, writeFileSync } from 'node:fs'
import path from 'node:path'

/** Longest that the web finishes requests after it was told to stop. */
const WEB_DRAIN_MS = 4_000

/** @typedef {{ id: string, databasePassword: string, demo: boolean }} Instance what a data folder keeps of itself */

/**
 * The environment that web, worker and command line read.
 *
 * @param {import('./environment.mjs').Environment} wishes
 * @param {Instance} instance
 * @returns {Record<string, string | undefined>}
 */
export function childEnvironment(wishes, instance) {
  const publicUrl = (wishes.publicUrl ?? `http://${urlHost(wishes.host)}:${wishes.port}`).replace(/\/$/, '')
  return {
    ...process.env,
    NODE_ENV: 'production',
    HOST: wishes.host,
    PORT: String(wishes.port),
    NITRO_HOST: wishes.host,
    NITRO_PORT: String(wishes.port),
    NITRO_SHUTDOWN_TIMEOUT: String(WEB_DRAIN_MS),
    HARTROLL_MODE: wishes.mode,
    HARTROLL_DATA: wishes.dataDir,
    HARTROLL_SECRET: wishes.secret ?? demoSecret(wishes.dataDir),
    HARTROLL_PUBLIC_URL: publicUrl,
    HARTROLL_INSTANCE: instance.id,
    AUTH_ORIGIN: `${publicUrl}/api/auth`,
    NEXTAUTH_URL: `${publicUrl}/api/auth`,
    HARTROLL_OWN_DATABASE: undefined,
    ...(wishes.databaseUrl === null ? {} : { DATABASE_URL: wishes.databaseUrl }),
  }
}

/** @param {string} host what a browser on this machine can open */
export function urlHost(host) {
  if (host === '0.0.0.0' || host === '::') return '127.0.0.1'
  return host.includes(':') ? `[${host}]` : host
}

/** @param {string} folder @returns {string} made once, so that nobody is signed out by a restart */
function demoSecret(folder) {
  const file = path.join(folder, 'secret')
  if (!existsSync(file)) writeFileSync(file, randomBytes(32).toString('hex'), { mode: 0o600 })
  return readFileSync(file, 'utf8').trim()
}
