import { expect, test } from 'vitest'
import { assertWorkflowsUsable, loadCurrentWorkflow } from '../../../server/services/workflow/load'
import { seedReference } from '../../../seeds/reference/index'
import { useRegistry } from '../../support/registry'

const on = useRegistry()
const change = (code: string, columns: object) => on.registry.db('workflow_transitions').where({ code }).update(columns)

test('the seeded workflow can be used, with the registrar\'s own limits', async () => {
  await assertWorkflowsUsable(on.registry.db)
  await on.registry.db('workflow_versions').update({ limits: JSON.stringify({ appealDays: 45 }) })
  expect((await loadCurrentWorkflow(on.registry.db)).limits).toMatchObject({ appealDays: 45, lapseDays: 90, quorum: 3 })
})

test('the start refuses a row that names an unknown guard, and one without its quorum, in one line', async () => {
  const { guards } = (await on.registry.db('workflow_transitions').where({ code: 'accept' }).first('guards'))!
  await change('accept', { guards: JSON.stringify([...JSON.parse(guards) as string[], 'a_good_feeling']) })
  await expect(assertWorkflowsUsable(on.registry.db)).rejects.toThrow('Workflow version 2 cannot be used: unknown_guard in accept: a_good_feeling')
  await change('accept', { guards: JSON.stringify((JSON.parse(guards) as string[]).filter(guard => guard !== 'quorum')) })
  await expect(assertWorkflowsUsable(on.registry.db)).rejects.toThrow('Workflow version 2 cannot be used: guard_removed in accept: quorum')
  await expect(loadCurrentWorkflow(on.registry.db)).rejects.toMatchObject({ code: 'internal' })
  await change('accept', { guards })
  await assertWorkflowsUsable(on.registry.db)
})

test('a quorum below three and an effect from nowhere are refused', async () => {
  await on.registry.db('workflow_versions').update({ limits: JSON.stringify({ quorum: 2 }) })
  await expect(assertWorkflowsUsable(on.registry.db)).rejects.toThrow('quorum_too_low')
  await on.registry.db('workflow_versions').update({ limits: '{}' })
  const { effects } = (await on.registry.db('workflow_transitions').where({ code: 'submit' }).first('effects'))!
  await change('submit', { effects: '["fly"]' })
  await expect(assertWorkflowsUsable(on.registry.db)).rejects.toThrow('unknown_effect in submit: fly')
  await change('submit', { effects })
})

test('a comment that the registrar asks for stays asked for after the next start', async () => {
  await change('return', { comment_required: 1 })
  await seedReference(on.registry.db, new Date('2026-03-02T15:00:00Z'))
  expect((await loadCurrentWorkflow(on.registry.db)).rows.find(row => row.code === 'return')!.commentRequired).toBe(true)
})
