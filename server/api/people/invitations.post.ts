import { inviteSchema } from '../../../shared/schemas/people'
import { defineRoute } from '../../utils/defineRoute'
import { invite } from '../../services/people/invite'

/** Invites somebody, with a role or without. */
export default defineRoute({
  access: { roles: ['registrar'] },
  body: inviteSchema,
  async handler({ event, registry, actor, body }) {
    const invited = await invite(registry, actor, body)
    setResponseStatus(event, 201)
    return invited
  },
})
