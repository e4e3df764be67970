import type { Knex } from 'knex'
import type { DocketItemsRow, SittingsRow } from '../../../db/tables'
import { inTransaction } from '../../../db/transaction'
import { hasRole, type ActiveActor } from '../../../shared/domain/access/roles'
import { stakesOf } from '../../../shared/domain/access/stakes'
import type { Ground } from '../../../shared/domain/workflow/eligibility'
import { isVoteOn, needsGround, needsReason, type Matter, type Vote } from '../../../shared/domain/workflow/panel'
import type { State } from '../../../shared/domain/workflow/states'
import { DomainError, type FieldError } from '../../../shared/errors'
import type { Registry } from '../../composition'
import { lockEntryById, updateEntry } from '../../repositories/entries'
import { findItem, listJudges, listOpeners, lockSitting, putBallot, setPresent, updateItem } from '../../repositories/panel'
import { findAccountByUid, findAccounts } from '../../repositories/stakes'
import { appendEvent } from '../events/append'
import { assertNoStake, stakeCodes } from '../entries/locked'
import { keysOf, loadContext, type EntryContext } from '../entries/context'
import { ASK_SECOND_MEASURING } from '../entries/facts'
import { momentOf, type Moment } from '../moment'
import { isChairOf } from './sittings'

export interface Ballot {
  readonly vote: string
  readonly ground?: Ground
  readonly reason?: string
  readonly requests?: readonly string[]
}

interface ItemAct {
  readonly trx: Knex.Transaction
  readonly sitting: SittingsRow
  readonly item: DocketItemsRow
  readonly context: EntryContext
  readonly moment: Moment
}

/** What the panel votes on when an entry is in a state: whether to take it in, or whether it stays in the lists. */
export function matterBefore(state: State): Matter {
  return state === 'challenged' || state === 'struck' ? 'record' : 'entry'
}

/** Runs an act on a docket item: sitting and entry are locked, in this order, as the closing takes them. */
async function withItem<T>(registry: Registry, sittingUid: string, itemUid: string, act: (on: ItemAct) => Promise<T>): Promise<T> {
  const moment = await momentOf(registry)
  return inTransaction(registry.db, async (trx) => {
    const sitting = await lockSitting(trx, sittingUid)
    const found = await findItem(trx, itemUid)
    if (!sitting || !found || found.sitting_id !== sitting.id) throw new DomainError('not_found')
    const entry = (await lockEntryById(trx, found.entry_id))!
    const item = (await findItem(trx, itemUid))!
    return act({ trx, sitting, item, context: await loadContext(trx, entry), moment })
  })
}

async function assertJudge({ trx, sitting }: ItemAct, actor: ActiveActor): Promise<void> {
  const judges = await listJudges(trx, sitting.id)
  if (!hasRole(actor, 'judge') || !judges.some(judge => judge.user_id === actor.userId)) throw new DomainError('forbidden')
}

function ballotFaults(matter: Matter, { vote, ground, reason }: Ballot): FieldError[] {
  if (!isVoteOn(matter, vote)) return [{ path: 'vote', code: 'no_such_vote' }]
  return [
    ...(needsReason(vote) && (reason ?? '').trim() === '' ? [{ path: 'reason', code: 'required' }] : []),
    ...(needsGround(vote) && ground === undefined ? [{ path: 'ground', code: 'required' }] : []),
  ]
}

/**
 * A judge's ballot, or another one in its place while the sitting is open. A stake bars every vote but standing aside.
 *
 * @throws DomainError `not_found`, `forbidden`, `sitting_closed` (409), `wrong_state` (409), `on_hold`, `stake`, `invalid_input`
 */
export function castBallot(registry: Registry, actor: ActiveActor, sittingUid: string, itemUid: string, ballot: Ballot): Promise<void> {
  return withItem(registry, sittingUid, itemUid, async (on) => {
    const { trx, sitting, item, context, moment } = on
    await assertJudge(on, actor)
    if (sitting.state === 'closed') throw new DomainError('sitting_closed')
    if (sitting.state !== 'open' || item.state !== 'open') throw new DomainError('wrong_state', { details: { state: sitting.state === 'open' ? item.state : sitting.state } })
    if (!['at_panel', 'challenged', 'struck'].includes(context.entry.state)) throw new DomainError('wrong_state', { details: { state: context.entry.state } })
    if (context.entry.hold_at !== null) throw new DomainError('on_hold')
    const faults = ballotFaults(matterBefore(context.entry.state), ballot)
    if (faults.length > 0) throw new DomainError('invalid_input', { fields: faults })
    if (ballot.vote !== 'stand_aside') await assertNoStake(trx, context, actor, 'vote')
    const requests = (ballot.requests ?? []).map(text => text.trim()).filter(text => text !== '')
    await putBallot(trx, {
      docket_item_id: item.id, judge_user_id: actor.userId, vote: ballot.vote as Vote, cast_at: moment.at,
      ground: needsGround(ballot.vote as Vote) ? ballot.ground ?? null : null, reason: ballot.reason?.trim() || null,
      requests: ballot.vote === 'return' ? JSON.stringify(requests) : null,
    })
    await setPresent(trx, sitting.id, actor.userId)
  })
}

/** A judge asks for a second measuring; when two do, it is due. Asking twice counts once. */
export function askSecondMeasuring(registry: Registry, actor: ActiveActor, sittingUid: string, itemUid: string, reason: string): Promise<void> {
  return withItem(registry, sittingUid, itemUid, async (on) => {
    const { trx, sitting, context, moment } = on
    await assertJudge(on, actor)
    if (sitting.state === 'closed') throw new DomainError('sitting_closed')
    if (context.entry.state !== 'at_panel') throw new DomainError('wrong_state', { details: { state: context.entry.state } })
    await assertNoStake(trx, context, actor, 'vote')
    await appendEvent(trx, context.entry, { kind: ASK_SECOND_MEASURING, actor, texts: { reason } }, moment)
    await updateEntry(trx, context.entry.id, {})
  })
}

/**
 * Names the two judges of a second measuring: of this sitting, without a stake, and neither has opened the file.
 *
 * @throws DomainError `forbidden`, `sitting_closed`, `wrong_state`, `invalid_input` with `judges.0` or `judges.1`
 */
export function namePair(registry: Registry, actor: ActiveActor, sittingUid: string, itemUid: string, pair: readonly [string, string]): Promise<void> {
  return withItem(registry, sittingUid, itemUid, async ({ trx, sitting, item, context }) => {
    if (!isChairOf(actor, sitting)) throw new DomainError('forbidden')
    if (sitting.state === 'closed') throw new DomainError('sitting_closed')
    if (context.remeasuring || item.state !== 'open') throw new DomainError('wrong_state', { details: { state: context.entry.state } })
    const judges = (await listJudges(trx, sitting.id)).map(judge => judge.user_id)
    const ids: number[] = []
    for (const [place, uid] of pair.entries()) {
      const fault = (code: string, items: string[] = []) => new DomainError('invalid_input', { fields: [{ path: `judges.${place}`, code, params: { items: items.join(', ') } }] })
      const account = await findAccountByUid(trx, uid)
      if (!account || !judges.includes(account.id)) throw fault('not_of_sitting')
      if (ids.includes(account.id)) throw fault('twice')
      const [row] = await findAccounts(trx, [account.id])
      const stakes = stakesOf(context.stakes, keysOf(row!), 'remeasure')
      if (stakes.length > 0) throw fault('has_stake', stakeCodes(stakes))
      if ((await listOpeners(trx, context.entry.id, [account.id])).length > 0) throw fault('opened_file')
      ids.push(account.id)
    }
    await updateItem(trx, item.id, { judge_a: ids[0], judge_b: ids[1] })
  })
}
