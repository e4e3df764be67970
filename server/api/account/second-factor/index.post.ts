import { proofSchema } from '../../../../shared/schemas/people'
import { defineRoute } from '../../../utils/defineRoute'
import { beginSecondFactor } from '../../../services/people/secondFactor'

/** Begins to set up an authenticator. */
export default defineRoute({
  access: 'signedIn',
  body: proofSchema,
  handler: ({ registry, actor, body }) => beginSecondFactor(registry, actor, body),
})
