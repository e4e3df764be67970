import { idParams } from '../../../../shared/schemas/people'
import { defineRoute } from '../../../utils/defineRoute'
import { endOwnSession } from '../../../services/people/sessions'

/** Ends one of the own sessions. */
export default defineRoute({
  access: 'signedIn',
  params: idParams,
  async handler({ event, registry, actor, params }) {
    await endOwnSession(registry, actor, params.id)
    setResponseStatus(event, 204)
    return null
  },
})
