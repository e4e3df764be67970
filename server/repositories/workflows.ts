import type { Knex } from 'knex'

export interface WorkflowRecord {
  readonly id: number
  readonly number: number
  readonly limits: string
  readonly states: readonly { readonly code: string, readonly turn: string }[]
  readonly transitions: readonly {
    readonly code: string
    readonly from_states: string
    readonly to_state: string | null
    readonly parties: string
    readonly guards: string
    readonly effects: string
    readonly comment_required: 0 | 1
    readonly sort: number
  }[]
}

/** The workflow version that new entries begin under. */
export async function findCurrentWorkflowId(db: Knex): Promise<number | undefined> {
  return (await db('workflow_versions').orderBy('number', 'desc').first('id'))?.id
}

export async function findWorkflow(db: Knex, id: number): Promise<WorkflowRecord | undefined> {
  const version = await db('workflow_versions').where({ id }).first('id', 'number', 'limits')
  if (!version) return undefined
  const states = await db('workflow_states').where({ version_id: id }).orderBy('sort').select('code', 'turn')
  const transitions = await db('workflow_transitions').where({ version_id: id }).orderBy('sort')
    .select('code', 'from_states', 'to_state', 'parties', 'guards', 'effects', 'comment_required', 'sort')
  return { ...version, states, transitions }
}

export async function listWorkflowIds(db: Knex): Promise<number[]> {
  return db('workflow_versions').orderBy('number').pluck('id')
}
