import { changePasswordSchema } from '../../../shared/schemas/people'
import { defineRoute } from '../../utils/defineRoute'
import { changePassword } from '../../services/people/account'

/** Changes the password and ends every other session. */
export default defineRoute({
  access: 'signedIn',
  body: changePasswordSchema,
  async handler({ event, registry, actor, body }) {
    await changePassword(registry, actor, body)
    setResponseStatus(event, 204)
    return null
  },
})
