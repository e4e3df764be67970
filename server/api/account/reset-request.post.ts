import { emailOnlySchema } from '../../../shared/schemas/people'
import { defineRoute } from '../../utils/defineRoute'
import { clientAddress } from '../../utils/clientAddress'
import { askReset } from '../../services/people/reset'

/** Sends a link for a new password. The answer does not tell whether there is an account. */
export default defineRoute({
  access: 'public',
  body: emailOnlySchema,
  async handler({ event, registry, body }) {
    await askReset(registry, body.email, clientAddress(event))
    setResponseStatus(event, 202)
    return { status: 'sent' }
  },
})
