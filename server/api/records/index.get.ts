import { recordsQuery } from '#shared/schemas/records'
import { listRecords } from '../../services/records/listRecords'
import { listsVersion } from '../../read-models/records/names'
import { defineRoute } from '../../utils/defineRoute'
import { answerFrom } from '../../utils/etag'
import { localeOfRequest } from '../../utils/problem'

/** A page of the public lists. */
export default defineRoute({
  access: 'public',
  query: recordsQuery,
  cache: 'public, max-age=5',
  handler: async ({ event, registry, query }) => {
    const version = await listsVersion(registry.db)
    const locale = localeOfRequest(event)
    return answerFrom(event, [version, locale, query], () => listRecords(registry, query, locale, version))
  },
})
