/**
 * The worker: sends notices, does jobs, plans what happens by the clock. Any number of them may run beside each other
 * and the web; each takes its work under a lease, so one that is killed leaves nothing undone.
 */
import { hostname } from 'node:os'
import { join } from 'node:path'
import { setTimeout as pause } from 'node:timers/promises'
import { registryFromEnvironment, type Registry } from './composition'
import { ConfigError } from './config'
import { localMailbox } from './mail/mailbox'
import { smtpTransport, type MailTransport } from './mail/transport'
import { dropHeartbeat, noteHeartbeat } from './repositories/heartbeats'
import { planRounds } from './services/jobs/schedule'
import { workOneJob } from './services/jobs/work'
import { runPaymentCommands } from './services/payments/commands'
import { deliverNotices } from './services/notices/deliver'
import { testClock } from './utils/testClock'

const IDLE_MS = 500
const HEARTBEAT_MS = 5_000
const PLAN_MS = 15_000
const AFTER_FAILURE_MS = 1_000

/** Repeats `round` until the worker stops; rests when there was nothing to do, and after a failure. */
async function loop(registry: Registry, stop: AbortSignal, name: string, idleMs: number, round: () => Promise<boolean>): Promise<void> {
  while (!stop.aborted) {
    let rest = idleMs
    try {
      if (await round()) rest = 0
    }
    catch (error) {
      // The database may be away; it is asked again until it is back.
      registry.log.error({ err: error, loop: name }, 'a round of the worker failed')
      rest = AFTER_FAILURE_MS
    }
    if (rest > 0) await pause(rest, undefined, { signal: stop }).catch(() => {})
  }
}

async function mailOf({ config }: Registry): Promise<MailTransport | null> {
  if (config.smtpUrl) return smtpTransport(config.smtpUrl)
  return config.mode === 'demo' ? localMailbox(join(config.dataDir, 'mailbox')) : null
}

async function main(): Promise<void> {
  const registry = registryFromEnvironment({ clock: process.env.HARTROLL_TESTING === '1' ? testClock() : undefined })
  const { db, log } = registry
  const name = `${hostname().slice(0, 60)}:${process.pid}`
  const startedAt = new Date()
  const stopping = new AbortController()
  const stop = stopping.signal
  for (const signal of ['SIGTERM', 'SIGINT'] as const) process.on(signal, () => stopping.abort())

  const mail = await mailOf(registry)
  if (!mail) log.warn('SMTP_URL is not set: notices wait in the outbox')
  log.info({ worker: name }, 'the worker works')
  await Promise.all([
    // The life of a process is told in real time, whatever clock the registry's days are counted by.
    loop(registry, stop, 'heartbeat', HEARTBEAT_MS, async () => {
      await noteHeartbeat(db, name, startedAt, new Date())
      return false
    }),
    loop(registry, stop, 'plan', PLAN_MS, async () => {
      await planRounds(registry)
      return false
    }),
    loop(registry, stop, 'payments', IDLE_MS, () => runPaymentCommands(registry, stop)),
    loop(registry, stop, 'jobs', IDLE_MS, () => workOneJob(registry, stop)),
    ...(mail
      ? [loop(registry, stop, 'notices', IDLE_MS, async () => {
          const { sent, serverAway } = await deliverNotices(registry, mail, stop)
          return sent > 0 && !serverAway
        })]
      : []),
  ])
  await dropHeartbeat(db, name).catch(() => {})
  await mail?.close()
  await registry.close()
  log.info({ worker: name }, 'the worker has stopped')
}

main().then(
  // An idle connection of some library must not keep a drained process alive.
  () => process.exit(0),
  (error: unknown) => {
    process.stderr.write(`hartroll: ${error instanceof ConfigError ? error.message : error instanceof Error ? error.stack : String(error)}\n`)
    process.exit(1)
  },
)
