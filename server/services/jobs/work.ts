import { sqlTime } from '../../../db/time'
import type { Registry } from '../../composition'
import { noteProgress, readJob } from '../../repositories/jobs'
import { claimDue, extendLease, giveBack, putBack, settle, type Lease } from '../../repositories/leases'
import { backoff } from './backoff'
import { JOB_HANDLERS } from './handlers'
import type { JobHandler, JobKind } from './kinds'

const LEASE_MS = 60_000
const EXTEND_EVERY_MS = 20_000
const MOST_ATTEMPTS = 12

/**
 * Takes one job and does it. While it runs its lease is extended, so that a long job stays with one worker and that
 * of a killed worker is begun again within a minute.
 *
 * @returns whether there was one
 */
export async function workOneJob(registry: Registry, stop: AbortSignal): Promise<boolean> {
  const [lease] = await claimDue(registry.db, 'jobs', registry.clock.now(), LEASE_MS, 1)
  if (!lease) return false
  if (stop.aborted) {
    await giveBack(registry.db, lease, registry.clock.now())
    return true
  }
  await perform(registry, lease, stop)
  return true
}

async function perform(registry: Registry, first: Lease, stop: AbortSignal): Promise<void> {
  const { db, clock, log } = registry
  const job = await readJob(db, first.id)
  if (!job) return
  const done = () => ({ done_at: sqlTime(clock.now()), claimed_until: null })
  if (job.cancelled) {
    await settle(db, first, { state: 'cancelled', ...done() })
    return
  }
  const handler = JOB_HANDLERS[job.kind as JobKind] as JobHandler<JobKind> | undefined
  if (!handler) {
    await settle(db, first, { state: 'failed', last_error: `There is no work of the kind ${job.kind}`, ...done() })
    return
  }

  let lease = first
  const lost = new AbortController()
  const signal = AbortSignal.any([stop, lost.signal])
  const timer = setInterval(async () => {
    try {
      const extended = await extendLease(db, lease, clock.now(), LEASE_MS)
      if (extended) lease = extended
      else lost.abort()
      if ((await readJob(db, lease.id))?.cancelled) lost.abort()
    }
    catch (error) {
      log.warn({ err: error, job: lease.id }, 'a job could not extend its lease')
    }
  }, EXTEND_EVERY_MS)
  try {
    const result = await handler(registry, job.payload as never, { signal, progress: percent => noteProgress(db, lease, percent, clock.now()) })
    await settle(db, lease, { state: 'done', progress: 100, result: result === undefined ? null : JSON.stringify(result), ...done() })
  }
  catch (error) {
    await failed(registry, lease, error, stop.aborted)
  }
  finally {
    clearInterval(timer)
  }
}

async function failed({ db, clock, log }: Registry, lease: Lease, error: unknown, stopped: boolean): Promise<void> {
  const now = clock.now()
  if (stopped) {
    await giveBack(db, lease, now)
    return
  }
  const message = error instanceof Error ? error.message : String(error)
  log.error({ err: error, job: lease.id, attempt: lease.attempt }, 'a job failed')
  if (lease.attempt >= MOST_ATTEMPTS) {
    await settle(db, lease, { state: 'failed', done_at: sqlTime(now), claimed_until: null, last_error: message.slice(0, 1000) })
    return
  }
  await putBack(db, lease, new Date(now.getTime() + backoff(lease.attempt)), message)
}
