import { emailOnlySchema } from '../../../shared/schemas/people'
import { defineRoute } from '../../utils/defineRoute'
import { clientAddress } from '../../utils/clientAddress'
import { askConfirmation } from '../../services/people/signUp'

/** Sends the letter of confirmation again. The answer does not tell whether there is an account. */
export default defineRoute({
  access: 'public',
  body: emailOnlySchema,
  async handler({ event, registry, body }) {
    await askConfirmation(registry, body.email, clientAddress(event))
    setResponseStatus(event, 202)
    return { status: 'sent' }
  },
})
