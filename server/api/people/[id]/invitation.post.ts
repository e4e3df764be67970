import { idParams } from '../../../../shared/schemas/people'
import { defineRoute } from '../../../utils/defineRoute'
import { inviteAgain } from '../../../services/people/invite'

/** Sends an invitation again. */
export default defineRoute({
  access: { roles: ['registrar'] },
  params: idParams,
  async handler({ event, registry, actor, params }) {
    await inviteAgain(registry, actor, params.id)
    setResponseStatus(event, 202)
    return { status: 'sent' }
  },
})
