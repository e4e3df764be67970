import type { Knex } from 'knex'
import { inTransaction } from '../../../db/transaction'
import type { EntriesRow, RequestsRow } from '../../../db/tables'
import type { ActiveActor } from '../../../shared/domain/access/roles'
import { canReadEntry, canReview, isOwner } from '../../../shared/domain/access/abilities'
import { stakesOf } from '../../../shared/domain/access/stakes'
import { isCheckCode } from '../../../shared/domain/workflow/checks'
import { DomainError } from '../../../shared/errors'
import type { RequestInput } from '../../../shared/schemas/entries'
import type { Registry } from '../../composition'
import { lockEntry, updateEntry } from '../../repositories/entries'
import { deleteRequest, findRequest, insertRequest, tickCheck, untickCheck, updateRequest } from '../../repositories/office'
import { accessOf } from '../entries/access'
import { findKeys, loadContext } from '../entries/context'
import { momentOf, newUid, type Moment } from '../moment'

/** Runs an act of the office on a file in review, under its lock; a stake closes the file. */
async function inReview<T>(registry: Registry, actor: ActiveActor, uid: string, act: (trx: Knex.Transaction, entry: EntriesRow, moment: Moment) => Promise<T>): Promise<T> {
  const moment = await momentOf(registry)
  return inTransaction(registry.db, async (trx) => {
    const entry = await lockEntry(trx, uid)
    const access = entry && await accessOf(trx, entry)
    if (!entry || !access || !canReadEntry(actor, access)) throw new DomainError('not_found')
    if (!actor.roles.includes('reviewer')) throw new DomainError('forbidden')
    if (!canReview(actor, access)) throw new DomainError('wrong_state', { details: { state: entry.state } })
    const { stakes } = await loadContext(trx, entry)
    const found = stakesOf(stakes, await findKeys(trx, actor.userId), 'review')
    if (found.length > 0) throw new DomainError('stake', { details: { stakes: found.map(stake => 'part' in stake ? `${stake.kind}.${stake.part}` : stake.kind) } })
    const done = await act(trx, entry, moment)
    await updateEntry(trx, entry.id, entry.reviewer_user_id === null ? { reviewer_user_id: actor.userId } : {})
    return done
  })
}

async function openRequest(trx: Knex, entry: EntriesRow, uid: string): Promise<RequestsRow> {
  const request = await findRequest(trx, entry.id, uid)
  if (!request) throw new DomainError('not_found')
  if (request.closed_at !== null) throw new DomainError('wrong_state', { details: { state: 'closed' } })
  return request
}

/** Asks the entrant for one thing. Returns the request's uid. */
export function askRequest(registry: Registry, actor: ActiveActor, uid: string, input: RequestInput): Promise<string> {
  return inReview(registry, actor, uid, async (trx, entry, moment) => {
    const request = newUid(moment.now)
    await insertRequest(trx, { uid: request, entry_id: entry.id, kind: input.kind, text: input.text, wants: JSON.stringify(input.wants), asked_by: actor.userId, asked_at: moment.at })
    return request
  })
}

/** Changes the wording of a request that was not answered yet. */
export function changeRequest(registry: Registry, actor: ActiveActor, uid: string, requestUid: string, input: RequestInput): Promise<void> {
  return inReview(registry, actor, uid, async (trx, entry) => {
    const request = await openRequest(trx, entry, requestUid)
    if (request.answered_at !== null) throw new DomainError('wrong_state', { details: { state: 'answered' } })
    await updateRequest(trx, request.id, { kind: input.kind, text: input.text, wants: JSON.stringify(input.wants) })
  })
}

/** Takes a request back before it was answered. */
export function removeRequest(registry: Registry, actor: ActiveActor, uid: string, requestUid: string): Promise<void> {
  return inReview(registry, actor, uid, async (trx, entry) => {
    const request = await openRequest(trx, entry, requestUid)
    if (request.answered_at !== null) throw new DomainError('still_used')
    await deleteRequest(trx, request.id)
  })
}

/** Says that an answer is enough. */
export function closeRequest(registry: Registry, actor: ActiveActor, uid: string, requestUid: string): Promise<void> {
  return inReview(registry, actor, uid, async (trx, entry, moment) => {
    const request = await openRequest(trx, entry, requestUid)
    await updateRequest(trx, request.id, { closed_at: moment.at })
  })
}

/** Ticks a check of a file, or takes the tick away; each names who did it and when. */
export async function setCheck(registry: Registry, actor: ActiveActor, uid: string, code: string, ticked: boolean): Promise<void> {
  if (!isCheckCode(code)) throw new DomainError('not_found')
  return inReview(registry, actor, uid, async (trx, entry, moment) => {
    if (ticked) await tickCheck(trx, { entry_id: entry.id, code, ticked_by: actor.userId, ticked_at: moment.at })
    else await untickCheck(trx, entry.id, code)
  })
}

/** The entrant's answer to one request, in words; papers and facts that it names come with it by their own ways. */
export async function answerRequest(registry: Registry, actor: ActiveActor, uid: string, requestUid: string, text: string): Promise<void> {
  const moment = await momentOf(registry)
  await inTransaction(registry.db, async (trx) => {
    const entry = await lockEntry(trx, uid)
    const access = entry && await accessOf(trx, entry)
    if (!entry || !access || !canReadEntry(actor, access)) throw new DomainError('not_found')
    if (!isOwner(actor, access)) throw new DomainError('forbidden')
    const request = await openRequest(trx, entry, requestUid)
    if (entry.state !== 'returned' && !(request.kind === 'reclassify' && entry.state === 'in_review')) throw new DomainError('wrong_state', { details: { state: entry.state } })
    if (text === '' && (request.kind === 'explain' || request.kind === 'other' || request.kind === 'reclassify')) {
      throw new DomainError('invalid_input', { fields: [{ path: 'text', code: 'required' }] })
    }
    if (request.kind === 'reclassify' && text !== 'yes' && text !== 'no') throw new DomainError('invalid_input', { fields: [{ path: 'text', code: 'yes_or_no' }] })
    await updateRequest(trx, request.id, { answered_at: moment.at, answered_by: actor.userId, answer_text: text || null })
    await updateEntry(trx, entry.id, {})
  })
}
