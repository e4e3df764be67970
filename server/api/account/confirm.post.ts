import { confirmSchema } from '../../../shared/schemas/people'
import { defineRoute } from '../../utils/defineRoute'
import { confirmEmail } from '../../services/people/signUp'

/** Confirms an address by the link that was sent to it. */
export default defineRoute({
  access: 'public',
  body: confirmSchema,
  handler: ({ registry, body }) => confirmEmail(registry, body.token, body.password),
})
