import type { Knex } from 'knex'
import type { DocketItemsRow } from '../../../db/tables'
import { inTransaction } from '../../../db/transaction'
import type { ActiveActor } from '../../../shared/domain/access/roles'
import type { Ground } from '../../../shared/domain/workflow/eligibility'
import { tally, type Outcome } from '../../../shared/domain/workflow/panel'
import { rowForOutcome, transition } from '../../../shared/domain/workflow/transition'
import { DomainError, isDomainError } from '../../../shared/errors'
import type { Registry } from '../../composition'
import { lockEntryById } from '../../repositories/entries'
import { findItem, insertItem, listItems, listUnapplied, lockSitting, updateItem, updateSitting } from '../../repositories/panel'
import { loadContext } from '../entries/context'
import { loadFacts } from '../entries/facts'
import { ANY_VERSION, performMove } from '../entries/move'
import { momentOf, newUid, type Moment } from '../moment'
import { loadWorkflow } from '../workflow/load'
import { matterBefore } from './ballots'
import { isChairOf } from './sittings'

/** The chair's words for the minutes of an item, where the ballots' own are not enough. */
export interface ItemWords {
  readonly item: string
  readonly ground?: Ground
  readonly reason?: string
}

/** Takes an item off its sitting and lets the matter wait for the next one. */
async function carryOver(trx: Knex.Transaction, item: DocketItemsRow, why: string, moment: Moment): Promise<void> {
  await updateItem(trx, item.id, { state: 'carried', reason: item.reason ?? why })
  await insertItem(trx, {
    uid: newUid(moment.now), entry_id: item.entry_id, kind: item.kind, second_measuring_due: item.second_measuring_due,
    judge_a: item.judge_a, judge_b: item.judge_b, created_at: moment.at,
  })
}

/** Decides one item by its ballots: an outcome that the rules allow now, or it is carried over. */
async function decideItem(trx: Knex.Transaction, item: DocketItemsRow, words: ItemWords | undefined, moment: Moment): Promise<void> {
  const entry = (await lockEntryById(trx, item.entry_id))!
  if (words) await updateItem(trx, item.id, { ground: words.ground ?? null, reason: words.reason?.trim() || null })
  const workflow = await loadWorkflow(trx, entry.workflow_version_id)
  const context = await loadContext(trx, entry)
  const facts = await loadFacts(trx, context, workflow, moment)
  const { outcome } = tally(matterBefore(entry.state), facts.decision?.votes ?? [], workflow.limits.quorum)
  if (outcome === null) return carryOver(trx, item, 'no_quorum', moment)
  const row = rowForOutcome(workflow.rows, entry.state, outcome)
  const decided = { outcome, ground: facts.decision?.ground ?? null, reason: facts.decision?.reason || null, decided_at: moment.at }
  // the decision leaves the entry as it is: a strike that an appeal does not undo
  if (!row && entry.state === 'struck') return updateItem(trx, item.id, { ...decided, state: 'applied', applied_at: moment.at })
  const verdict = row && transition(workflow.rows, facts, { kind: 'panel' }, { transition: row.code }, { today: moment.today, limits: workflow.limits })
  if (!verdict?.ok) {
    const why = verdict?.refusal.kind === 'guards' ? verdict.refusal.failed.map(failure => failure.guard).join(', ') : 'wrong_state'
    return carryOver(trx, item, why, moment)
  }
  await updateItem(trx, item.id, { ...decided, state: 'decided' })
}

/**
 * The chair closes the sitting. What every item comes to is fixed in one transaction with the closing, so that no vote is counted
 * after it; the decisions are then carried out one by one, each in a transaction of its own.
 *
 * @throws DomainError `not_found`, `forbidden`, `wrong_state`, `sitting_closed`
 */
export async function closeSitting(registry: Registry, actor: ActiveActor, uid: string, words: readonly ItemWords[] = []): Promise<void> {
  const moment = await momentOf(registry)
  const sittingId = await inTransaction(registry.db, async (trx) => {
    const sitting = await lockSitting(trx, uid)
    if (!sitting) throw new DomainError('not_found')
    if (!isChairOf(actor, sitting)) throw new DomainError('forbidden')
    if (sitting.state === 'closed') throw new DomainError('sitting_closed')
    if (sitting.state !== 'open') throw new DomainError('wrong_state', { details: { state: sitting.state } })
    const open = (await listItems(trx, sitting.id)).filter(item => item.state === 'open').sort((a, b) => a.entry_id - b.entry_id)
    for (const item of open) await decideItem(trx, item, words.find(one => one.item === item.uid), moment)
    await updateSitting(trx, sitting.id, { state: 'closed', closed_at: moment.at, closed_by: actor.userId })
    return sitting.id
  })
  await applyDecisions(registry, sittingId)
}

/**
 * Carries out decisions of closed sittings that were not carried out yet. Safe to repeat and to run twice at once: an item is
 * looked at again under the entry's lock. A decision that the rules no longer allow is carried over.
 *
 * @returns how many were carried out
 */
export async function applyDecisions(registry: Registry, sittingId?: number): Promise<number> {
  let applied = 0
  for (const { uid } of await listUnapplied(registry.db, sittingId)) {
    const moment = await momentOf(registry)
    try {
      if (await inTransaction(registry.db, trx => applyItem(trx, uid, moment))) applied++
    }
    catch (error) {
      if (!isDomainError(error) || !['guard_failed', 'wrong_state', 'on_hold'].includes(error.code)) throw error
      await inTransaction(registry.db, async (trx) => {
        const item = await findItem(trx, uid)
        await lockEntryById(trx, item!.entry_id)
        if ((await findItem(trx, uid))!.state === 'decided') await carryOver(trx, item!, error.code, moment)
      })
    }
  }
  return applied
}

async function applyItem(trx: Knex.Transaction, uid: string, moment: Moment): Promise<boolean> {
  const found = await findItem(trx, uid)
  const entry = await lockEntryById(trx, found!.entry_id)
  const item = (await findItem(trx, uid))!
  if (item.state !== 'decided') return false
  const workflow = await loadWorkflow(trx, entry!.workflow_version_id)
  const row = rowForOutcome(workflow.rows, entry!.state, item.outcome as Outcome)
  if (!row) throw new DomainError('wrong_state', { details: { state: entry!.state } })
  await performMove({
    trx, entry: entry!, performer: { kind: 'panel' }, input: { transition: row.code, version: ANY_VERSION }, moment, passwordVerified: false,
  }, workflow)
  await updateItem(trx, item.id, { state: 'applied', applied_at: moment.at })
  return true
}
