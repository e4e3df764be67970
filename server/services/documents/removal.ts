import type { Knex } from 'knex'
import { listRequests } from '../../repositories/office'
import type { SeenEntry } from '../entries/sees'
import type { RemovalContext } from './rules'

export async function removalContext(db: Knex, { entry, access }: SeenEntry): Promise<RemovalContext> {
  const open = (await listRequests(db, entry.id)).filter(request => request.closed_at === null)
  return {
    entry: access,
    stateSince: entry.state_since,
    submittedAt: entry.submitted_at,
    wanted: open.flatMap(request => JSON.parse(request.wants) as string[]),
  }
}
