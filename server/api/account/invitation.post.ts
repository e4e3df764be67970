import { acceptInviteSchema } from '../../../shared/schemas/people'
import { defineRoute } from '../../utils/defineRoute'
import { acceptInvitation } from '../../services/people/invite'

/** Accepts an invitation. */
export default defineRoute({
  access: 'public',
  body: acceptInviteSchema,
  handler: ({ registry, body }) => acceptInvitation(registry, body),
})
