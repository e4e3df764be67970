import { defineRoute } from '../../utils/defineRoute'
import { readAccount } from '../../services/people/account'

/** The account of who asks. */
export default defineRoute({
  access: 'signedIn',
  handler: ({ registry, actor }) => readAccount(registry, actor),
})
