import type { Registry } from '../../composition'

/** What the worker can do, with what it needs to know for it. A new kind of work is added here and in `handlers.ts`. */
export interface JobPayloads {
  /** One round of a task of `tasks.ts`. */
  task: { readonly task: string, readonly period: string }
}
export type JobKind = keyof JobPayloads

export interface JobControl {
  /** Aborted when the worker stops, the lease is lost or somebody cancelled the job. */
  readonly signal: AbortSignal
  /** @param percent 0 to 100, for whoever waits for the job */
  progress(percent: number): Promise<void>
}

/** Does the work; must be safe to repeat, since a worker may be killed after it and before saying so. */
export type JobHandler<K extends JobKind> = (registry: Registry, payload: JobPayloads[K], control: JobControl) => Promise<unknown>
export type JobHandlers = { readonly [K in JobKind]: JobHandler<K> }
