import { officeQueueQuery } from '#shared/schemas/office'
import { defineRoute } from '../../utils/defineRoute'
import { readQueue } from '../../services/office/readQueue'

/** The records office's queue. */
export default defineRoute({
  access: { roles: ['reviewer', 'registrar'] },
  query: officeQueueQuery,
  handler: ({ registry, actor, query }) => readQueue(registry, actor, query),
})
