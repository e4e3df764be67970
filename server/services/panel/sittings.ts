import type { Knex } from 'knex'
import type { SittingsRow } from '../../../db/tables'
import { inTransaction } from '../../../db/transaction'
import { canPlanSittings } from '../../../shared/domain/access/abilities'
import { hasRole, type ActiveActor } from '../../../shared/domain/access/roles'
import type { Day } from '../../../shared/domain/dates'
import { LEAST_QUORUM } from '../../../shared/domain/workflow/limits'
import { DomainError } from '../../../shared/errors'
import type { Registry } from '../../composition'
import { findItem, insertJudges, insertSitting, listJudges, lockSitting, nextPosition, setPresent, updateItem, updateSitting } from '../../repositories/panel'
import { findAccountByUid, holdsRole } from '../../repositories/stakes'
import { momentOf, newUid, type Moment } from '../moment'

export interface SittingPlan {
  readonly heldOn: Day
  readonly place: string
  /** uids; the chair is one of the judges */
  readonly chair: string
  readonly judges: readonly string[]
  /** uids of items that wait for a sitting */
  readonly items: readonly string[]
}

async function judgeByUid(trx: Knex, uid: string, path: string, moment: Moment): Promise<number> {
  const account = await findAccountByUid(trx, uid)
  if (!account || !await holdsRole(trx, account.id, 'judge', moment.at)) throw new DomainError('invalid_input', { fields: [{ path, code: 'no_judge' }] })
  return account.id
}

/**
 * Plans a sitting with its chair, at least three judges and a docket.
 *
 * @throws DomainError `forbidden`, `invalid_input` (a day that is over, too few judges, somebody who is none)
 */
export async function planSitting(registry: Registry, actor: ActiveActor, plan: SittingPlan): Promise<string> {
  if (!canPlanSittings(actor)) throw new DomainError('forbidden')
  const moment = await momentOf(registry)
  if (plan.heldOn < moment.today) throw new DomainError('invalid_input', { fields: [{ path: 'heldOn', code: 'in_past' }] })
  return inTransaction(registry.db, async (trx) => {
    const chair = await judgeByUid(trx, plan.chair, 'chair', moment)
    const judges = new Set([chair])
    for (const [place, uid] of plan.judges.entries()) judges.add(await judgeByUid(trx, uid, `judges.${place}`, moment))
    if (judges.size < LEAST_QUORUM) throw new DomainError('invalid_input', { fields: [{ path: 'judges', code: 'too_few_judges', params: { minimum: LEAST_QUORUM } }] })
    const uid = newUid(moment.now)
    const id = await insertSitting(trx, { uid, held_on: plan.heldOn, place: plan.place.trim(), chair_user_id: chair, created_at: moment.at })
    await insertJudges(trx, id, [...judges], moment.at)
    await putItems(trx, id, plan.items)
    return uid
  })
}

async function putItems(trx: Knex, sittingId: number, uids: readonly string[]): Promise<void> {
  for (const [place, uid] of uids.entries()) {
    const item = await findItem(trx, uid)
    if (!item || item.state !== 'open' || (item.sitting_id !== null && item.sitting_id !== sittingId)) {
      throw new DomainError('invalid_input', { fields: [{ path: `items.${place}`, code: 'not_waiting' }] })
    }
    if (item.sitting_id === null) await updateItem(trx, item.id, { sitting_id: sittingId, position: await nextPosition(trx, sittingId) })
  }
}

async function withSitting<T>(registry: Registry, uid: string, act: (trx: Knex.Transaction, sitting: SittingsRow, moment: Moment) => Promise<T>): Promise<T> {
  const moment = await momentOf(registry)
  return inTransaction(registry.db, async (trx) => {
    const sitting = await lockSitting(trx, uid)
    if (!sitting) throw new DomainError('not_found')
    if (sitting.state === 'closed') throw new DomainError('sitting_closed')
    return act(trx, sitting, moment)
  })
}

/** The chair of the sitting, while they are a judge. */
export function isChairOf(actor: ActiveActor, sitting: SittingsRow): boolean {
  return hasRole(actor, 'judge') && sitting.chair_user_id === actor.userId
}

/** Adds items that wait to the docket of a sitting that is not closed. */
export function addToDocket(registry: Registry, actor: ActiveActor, uid: string, items: readonly string[]): Promise<void> {
  return withSitting(registry, uid, async (trx, sitting) => {
    if (!canPlanSittings(actor) && !isChairOf(actor, sitting)) throw new DomainError('forbidden')
    await putItems(trx, sitting.id, items)
  })
}

/** Calls another judge, as a substitute too when a quorum is in doubt. */
export function callJudge(registry: Registry, actor: ActiveActor, uid: string, judgeUid: string): Promise<void> {
  return withSitting(registry, uid, async (trx, sitting, moment) => {
    if (!canPlanSittings(actor) && !isChairOf(actor, sitting)) throw new DomainError('forbidden')
    const judge = await judgeByUid(trx, judgeUid, 'judge', moment)
    const named = (await listJudges(trx, sitting.id)).some(one => one.user_id === judge)
    if (!named) await insertJudges(trx, sitting.id, [judge], moment.at)
  })
}

/** The chair opens the sitting: from now on its judges vote. */
export function openSitting(registry: Registry, actor: ActiveActor, uid: string): Promise<void> {
  return withSitting(registry, uid, async (trx, sitting, moment) => {
    if (!isChairOf(actor, sitting)) throw new DomainError('forbidden')
    if (sitting.state !== 'planned') throw new DomainError('wrong_state', { details: { state: sitting.state } })
    await updateSitting(trx, sitting.id, { state: 'open', opened_at: moment.at })
    await setPresent(trx, sitting.id, actor.userId)
  })
}
