import { recordsQuery } from '#shared/schemas/records'
import { listRecords } from '../../services/records/listRecords'
import { defineRoute } from '../../utils/defineRoute'
import { answerWithEtag } from '../../utils/etag'
import { localeOfRequest } from '../../utils/problem'

/** A page of the public lists. */
export default defineRoute({
  access: 'public',
  query: recordsQuery,
  cache: 'public, max-age=5',
  handler: async ({ event, registry, query }) => answerWithEtag(event, await listRecords(registry, query, localeOfRequest(event))),
})
