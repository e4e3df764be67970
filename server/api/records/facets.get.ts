import { recordFilters } from '#shared/schemas/records'
import { listFacets } from '../../services/records/facets'
import { listsVersion } from '../../read-models/records/names'
import { defineRoute } from '../../utils/defineRoute'
import { answerFrom } from '../../utils/etag'

/** How many records stand under each choice of class, district and method. */
export default defineRoute({
  access: 'public',
  query: recordFilters,
  cache: 'public, max-age=5',
  handler: async ({ event, registry, query }) => {
    const version = await listsVersion(registry.db)
    return answerFrom(event, [version, query], () => listFacets(registry, query, version))
  },
})
