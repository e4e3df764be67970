import { changeEmailSchema } from '../../../shared/schemas/people'
import { defineRoute } from '../../utils/defineRoute'
import { askEmailChange } from '../../services/people/account'

/** Asks for another address; it counts once confirmed there. */
export default defineRoute({
  access: 'signedIn',
  body: changeEmailSchema,
  async handler({ event, registry, actor, body }) {
    await askEmailChange(registry, actor, body)
    setResponseStatus(event, 202)
    return { status: 'sent' }
  },
})
