import { openApiDocument } from '../openapi/document'
import { declaredRoutes } from '../openapi/routes'
import { sessionCookieName } from '../utils/sessionCookie'
import { defineRoute } from '../utils/defineRoute'
import { answerWithEtag } from '../utils/etag'

/** The interface described (OpenAPI 3.1), from the schemas that check the requests. */
export default defineRoute({
  access: 'public',
  cache: 'public, max-age=300',
  handler: async ({ event, registry }) => answerWithEtag(event, openApiDocument(await declaredRoutes(), {
    title: 'Hartroll', url: registry.config.publicUrl, version: '1', sessionCookie: sessionCookieName(registry.config),
  })),
})
