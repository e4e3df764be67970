import { defineRoute } from '../../../utils/defineRoute'
import { endOtherSessions } from '../../../services/people/sessions'

/** Ends every session but this one. */
export default defineRoute({
  access: 'signedIn',
  handler: async ({ registry, actor }) => ({ ended: await endOtherSessions(registry, actor) }),
})
