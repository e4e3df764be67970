import { recordFilters } from '#shared/schemas/records'
import { listFacets } from '../../services/records/facets'
import { defineRoute } from '../../utils/defineRoute'
import { answerWithEtag } from '../../utils/etag'

/** How many records stand under each choice of class, district and method. */
export default defineRoute({
  access: 'public',
  query: recordFilters,
  cache: 'public, max-age=5',
  handler: async ({ event, registry, query }) => answerWithEtag(event, await listFacets(registry, query)),
})
