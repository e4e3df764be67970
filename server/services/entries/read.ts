import type { Knex } from 'knex'
import type { EntriesRow } from '../../../db/tables'
import type { ActiveActor } from '../../../shared/domain/access/roles'
import { canReadEntry, canWriteFacts, canWriteSheet, isOwner } from '../../../shared/domain/access/abilities'
import { stakesOf } from '../../../shared/domain/access/stakes'
import { hasOpenFacts } from '../../../shared/domain/workflow/states'
import { nextActs } from '../../../shared/domain/workflow/transition'
import { DomainError } from '../../../shared/errors'
import type { Registry } from '../../composition'
import { presentEntry, presentEvent, type EntryShown, type EventShown } from '../../presenters/entries'
import { findDistrictById } from '../../repositories/catalogue'
import { findEntry } from '../../repositories/entries'
import { listEvents, listEventTexts } from '../../repositories/events'
import { listRequests } from '../../repositories/office'
import { listSheets } from '../../repositories/sheets'
import { findAccounts } from '../../repositories/stakes'
import { findRecordOfEntry } from '../../repositories/records'
import { momentOf } from '../moment'
import { loadWorkflow } from '../workflow/load'
import { accessOf } from './access'
import { findKeys, loadContext } from './context'
import { loadFacts } from './facts'
import { readableEntry } from './sees'

async function readable(db: Knex, actor: ActiveActor, uid: string): Promise<{ entry: EntriesRow, access: Awaited<ReturnType<typeof accessOf>> }> {
  const entry = await findEntry(db, uid)
  const access = entry && await accessOf(db, entry)
  if (!entry || !access || !canReadEntry(actor, access)) throw new DomainError('not_found')
  return { entry, access }
}

/**
 * An entry for whoever may see it, with what this viewer may do next and, where something stands in the way, what.
 *
 * @throws DomainError `not_found` for an entry that is not theirs to see, `stake` for staff with a stake in the animal
 */
export async function readEntry(registry: Registry, actor: ActiveActor, uid: string): Promise<EntryShown> {
  const { db } = registry
  const { entry, access } = await readable(db, actor, uid)
  const moment = await momentOf(registry)
  const [context, workflow, keys] = await Promise.all([loadContext(db, entry), loadWorkflow(db, entry.workflow_version_id), findKeys(db, actor.userId)])
  const facts = await loadFacts(db, context, workflow, moment)
  const owner = isOwner(actor, access)
  const bench = entry.measurer_user_id === actor.userId || (entry.owner_user_id === null && entry.begun_by_user_id === actor.userId)
  // Staff look through the desk's file, which notes a judge's opening and hides what a blind pair may not know.
  const act = actor.roles.includes('judge') && access.judgeUserIds.includes(actor.userId) ? 'vote' : 'review'
  if (!owner && !bench) {
    const stakes = stakesOf(context.stakes, keys, act)
    if (stakes.length > 0) throw new DomainError('stake', { details: { stakes: stakes.map(stake => 'part' in stake ? `${stake.kind}.${stake.part}` : stake.kind) } })
  }
  const { second } = facts
  const isBlind = second.due && !second.done && !second.notPresented && second.pair !== null && second.pair.includes(actor.userId)
  const [requests, sheets, record, district] = await Promise.all([
    listRequests(db, entry.id), listSheets(db, entry.id), findRecordOfEntry(db, entry.id),
    entry.district_id === null ? undefined : findDistrictById(db, entry.district_id),
  ])
  const accounts = await findAccounts(db, [entry.measurer_user_id, entry.owner_user_id, entry.reviewer_user_id].filter(id => id !== null))
  return presentEntry({
    context, facts, workflow, moment, requests, sheets, district: district ?? null, isBlind, accounts,
    recordNo: record && (record.status === 'accepted' || record.status === 'challenged') ? record.record_no : null,
    as: owner ? 'owner' : bench ? 'bench' : 'staff',
    canWriteFacts: canWriteFacts(actor, access) && (entry.state === 'returned' || hasOpenFacts(entry.state, entry.return_to)),
    canWriteSheet: canWriteSheet(actor, access),
    acts: nextActs(workflow.rows, facts, { kind: 'person', actor, keys }, { today: moment.today, limits: workflow.limits }),
  })
}

/**
 * What has happened to an entry, oldest first. Only staff are told who of the staff acted.
 *
 * @throws DomainError `not_found`, `stake`, `forbidden` for a judge who is to measure blind
 */
export async function readEvents(registry: Registry, actor: ActiveActor, uid: string): Promise<{ items: EventShown[] }> {
  const { db } = registry
  const { entry, access } = await readableEntry(db, actor, uid)
  const staff = !isOwner(actor, access) && actor.roles.some(role => role === 'reviewer' || role === 'registrar' || role === 'judge')
  const [events, texts] = await Promise.all([listEvents(db, entry.id), listEventTexts(db, entry.id)])
  return { items: events.map(event => presentEvent(event, texts.filter(text => text.event_id === event.id), { staff, actor, entry })) }
}

/** The entry after an act of one's own. By it an entry can pass out of one's sight; then only its state is told. */
export async function readEntryAfter(registry: Registry, actor: ActiveActor, uid: string): Promise<EntryShown | { id: string, state: string, version: number, next: never[] }> {
  try {
    return await readEntry(registry, actor, uid)
  }
  catch (error) {
    if (!(error instanceof DomainError) || error.code !== 'not_found') throw error
    const entry = (await findEntry(registry.db, uid))!
    return { id: uid, state: entry.state, version: entry.version, next: [] }
  }
}
