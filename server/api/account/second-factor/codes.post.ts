import { proofSchema } from '../../../../shared/schemas/people'
import { defineRoute } from '../../../utils/defineRoute'
import { renewRecoveryCodes } from '../../../services/people/secondFactor'

/** New recovery codes. */
export default defineRoute({
  access: 'signedIn',
  body: proofSchema,
  handler: ({ registry, actor, body }) => renewRecoveryCodes(registry, actor, body),
})
