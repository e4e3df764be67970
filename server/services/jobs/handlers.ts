import type { JobHandlers } from './kinds'
import { runTask } from './tasks'

export const JOB_HANDLERS: JobHandlers = {
  task: (registry, { task }) => runTask(registry, task),
}
