import { signUpSchema } from '../../../shared/schemas/people'
import { defineRoute } from '../../utils/defineRoute'
import { clientAddress } from '../../utils/clientAddress'
import { signUp } from '../../services/people/signUp'

/** Opens an account. The answer is the same when there is one already. */
export default defineRoute({
  access: 'public',
  body: signUpSchema,
  async handler({ event, registry, body }) {
    await signUp(registry, body, clientAddress(event))
    setResponseStatus(event, 202)
    return { status: 'sent' }
  },
})
