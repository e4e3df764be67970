import { measurersQuery } from '#shared/schemas/measurers'
import { listMeasurers } from '../services/measurers/listMeasurers'
import { defineRoute } from '../utils/defineRoute'
import { answerWithEtag } from '../utils/etag'

/** The public directory of official measurers. */
export default defineRoute({
  access: 'public',
  query: measurersQuery,
  cache: 'public, max-age=5',
  handler: async ({ event, registry, query }) => answerWithEtag(event, await listMeasurers(registry, query)),
})
