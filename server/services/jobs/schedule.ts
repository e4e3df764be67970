import { sqlTime } from '../../../db/time'
import { inTransaction } from '../../../db/transaction'
import { DomainError } from '../../../shared/errors'
import type { Registry } from '../../composition'
import { hasBegun, noteBegun } from '../../repositories/schedules'
import { enqueueJob } from './enqueue'
import { periodOf, TASKS } from './tasks'

/**
 * Plans the rounds that are due now. The row (task, period) is unique, so of several workers one plans a round, and
 * the job beside it is written in the same transaction, so a planned round is never lost.
 *
 * @returns names of the tasks planned by this call
 */
export async function planRounds(registry: Registry): Promise<string[]> {
  const now = registry.clock.now()
  const planned: string[] = []
  for (const [name, task] of Object.entries(TASKS)) {
    const period = periodOf(task, now)
    if (await hasBegun(registry.db, name, period)) continue
    try {
      await inTransaction(registry.db, async (trx) => {
        await noteBegun(trx, name, period, sqlTime(now))
        await enqueueJob(trx, now, 'task', { task: name, period })
      })
      planned.push(name)
    }
    catch (error) {
      if (!(error instanceof DomainError && error.code === 'duplicate')) throw error
    }
  }
  return planned
}
