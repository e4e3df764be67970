import type { ActiveActor } from '../../../shared/domain/access/roles'
import { daysBetween } from '../../../shared/domain/dates'
import { WHOSE_TURN } from '../../../shared/domain/workflow/states'
import { DomainError } from '../../../shared/errors'
import type { OfficeQueue, OfficeQueueQuery } from '#shared/schemas/office'
import { dayIn } from '../../clock'
import type { Registry } from '../../composition'
import { writtenNet } from '../../presenters/desk'
import { queueChoices, queuePage, queueTotal, statesCount, type QueuePlace } from '../../read-models/office/queue'

function readCursor(query: OfficeQueueQuery): QueuePlace | null {
  if (!query.cursor) return null
  try {
    const [sort, value, id] = JSON.parse(Buffer.from(query.cursor, 'base64url').toString('utf8')) as [string, string | number, number]
    if (sort !== query.sort || !Number.isInteger(id) || !['string', 'number'].includes(typeof value)) throw new TypeError('foreign')
    return { value, id }
  }
  catch {
    throw new DomainError('cursor_invalid', { fields: [{ path: 'cursor', code: 'invalid' }] })
  }
}

function writeCursor(query: OfficeQueueQuery, row: { state_since: string, net16: number | null, id: number }): string {
  const value = query.sort.endsWith('age') ? row.state_since : row.net16
  return Buffer.from(JSON.stringify([query.sort, value, Number(row.id)])).toString('base64url')
}

/** One page of the office's queue with what its filters can be set to. */
export async function readQueue(registry: Registry, actor: ActiveActor, query: OfficeQueueQuery): Promise<OfficeQueue> {
  const { db } = registry
  const [rows, total, states, choices, { timeZone }] = await Promise.all([
    queuePage(db, query, actor.userId, readCursor(query)), queueTotal(db, query, actor.userId), statesCount(db), queueChoices(db, query, actor.userId), registry.settings(),
  ])
  const today = dayIn(timeZone, registry.clock.now())
  const page = rows.slice(0, query.limit)
  return {
    items: page.map(row => ({
      id: row.uid,
      state: row.state,
      turn: WHOSE_TURN[row.state],
      category: row.category,
      district: row.district,
      origin: row.origin,
      person: row.person,
      net: writtenNet(row.net16, row.step),
      reviewer: row.reviewer_user_id === null ? null : { name: row.reviewer_name, isMe: row.reviewer_user_id === actor.userId },
      openRequests: row.open_requests,
      checksTicked: row.ticked,
      onHold: row.hold_at !== null,
      appeal: row.appealed_at !== null,
      since: row.since,
      days: Math.max(0, daysBetween(dayIn(timeZone, new Date(row.since)), today)),
      dueOn: row.due_on,
      daysLeft: row.due_on === null ? null : daysBetween(today, row.due_on),
    })),
    nextCursor: rows.length > query.limit ? writeCursor(query, page.at(-1)!) : null,
    total,
    states,
    ...choices,
  }
}
