import { listCategories } from '../services/scores/listCategories'
import { defineRoute } from '../utils/defineRoute'
import { answerWithEtag } from '../utils/etag'
import { localeOfRequest } from '../utils/problem'

/** The classes with species, scientific name, sheet lines and the minimum in force. */
export default defineRoute({
  access: 'public',
  cache: 'public, max-age=5',
  handler: async ({ event, registry }) => answerWithEtag(event, await listCategories(registry, localeOfRequest(event))),
})
