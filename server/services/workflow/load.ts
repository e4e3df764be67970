import type { Knex } from 'knex'
import type { WorkflowInDoubt, WorkflowProblem } from '../../../shared/domain/workflow/check'
import { checkWorkflow } from '../../../shared/domain/workflow/check'
import type { WorkflowLimits } from '../../../shared/domain/workflow/limits'
import { DEFAULT_LIMITS } from '../../../shared/domain/workflow/limits'
import type { TransitionRow } from '../../../shared/domain/workflow/rows'
import { DomainError } from '../../../shared/errors'
import type { WorkflowRecord } from '../../repositories/workflows'
import { findCurrentWorkflowId, findWorkflow, listWorkflowIds } from '../../repositories/workflows'

export interface Workflow {
  readonly id: number
  readonly number: number
  readonly rows: readonly TransitionRow[]
  readonly limits: WorkflowLimits
}

function inDoubt(record: WorkflowRecord): WorkflowInDoubt {
  return {
    states: record.states,
    transitions: record.transitions.map(row => ({
      code: row.code, from: JSON.parse(row.from_states), to: row.to_state, parties: JSON.parse(row.parties),
      guards: JSON.parse(row.guards), effects: JSON.parse(row.effects), commentRequired: row.comment_required === 1, sort: row.sort,
    })),
    limits: { ...DEFAULT_LIMITS, ...JSON.parse(record.limits) },
  }
}

/** One workflow version. Throws when it is missing or names what the program does not know: nothing may move by such rows. */
export async function loadWorkflow(db: Knex, id: number): Promise<Workflow> {
  const record = await findWorkflow(db, id)
  if (!record) throw new DomainError('internal', { logLine: `no workflow version ${id}` })
  const doubtful = inDoubt(record)
  const problems = checkWorkflow(doubtful)
  if (problems.length > 0) throw new DomainError('internal', { logLine: `workflow version ${record.number}: ${sayProblem(problems[0]!)}` })
  return { id: record.id, number: record.number, rows: doubtful.transitions as unknown as TransitionRow[], limits: doubtful.limits }
}

/** The version under which new entries begin. */
export async function loadCurrentWorkflow(db: Knex): Promise<Workflow> {
  const id = await findCurrentWorkflowId(db)
  if (id === undefined) throw new DomainError('internal', { logLine: 'no workflow is seeded' })
  return loadWorkflow(db, id)
}

function sayProblem(problem: WorkflowProblem): string {
  return `${problem.code} in ${problem.where}: ${problem.name}`
}

/**
 * Refuses a start on workflow rows that cannot be used: unknown names, a guard for stake, signature or quorum that was taken away.
 * Throws an Error of one line that names the row.
 */
export async function assertWorkflowsUsable(db: Knex): Promise<void> {
  for (const id of await listWorkflowIds(db)) {
    const record = await findWorkflow(db, id)
    const [problem] = checkWorkflow(inDoubt(record!))
    if (problem) throw new Error(`Workflow version ${record!.number} cannot be used: ${sayProblem(problem)}`)
  }
}
