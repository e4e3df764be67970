import { defineRoute } from '../../../utils/defineRoute'
import { listOwnSessions } from '../../../services/people/sessions'

/** Where the account is signed in. */
export default defineRoute({
  access: 'signedIn',
  handler: async ({ registry, actor }) => ({ items: await listOwnSessions(registry, actor) }),
})
