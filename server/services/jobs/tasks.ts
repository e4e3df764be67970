import type { Registry } from '../../composition'
import { runClock } from '../entries/clock'
import { forgetSpent } from '../../repositories/sweeping'
import { sweepFiles } from '../documents/sweep'

interface Task {
  readonly everyMinutes: number
  /** Safe to repeat; a worker that was killed leaves the round to another one. */
  readonly run: (registry: Registry) => Promise<unknown>
}

/** What happens by the clock alone. A round begins once, however many workers there are. */
export const TASKS: Readonly<Record<string, Task>> = {
  clock: { everyMinutes: 10, run: runClock },
  sweep_files: { everyMinutes: 24 * 60, run: sweepFiles },
  forget_spent: { everyMinutes: 60, run: registry => forgetSpent(registry.db, registry.clock.now()) },
}

export async function runTask(registry: Registry, name: string): Promise<unknown> {
  const task = TASKS[name]
  // A round that an older program planned and this one no longer knows.
  if (!task) return null
  return await task.run(registry)
}

/** The round that an instant belongs to, e.g. `2026-11-30T14:20`. */
export function periodOf(task: Task, now: Date): string {
  const length = task.everyMinutes * 60_000
  return new Date(Math.floor(now.getTime() / length) * length).toISOString().slice(0, 16)
}
