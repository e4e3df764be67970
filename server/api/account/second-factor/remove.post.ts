import { proofSchema } from '../../../../shared/schemas/people'
import { defineRoute } from '../../../utils/defineRoute'
import { removeSecondFactor } from '../../../services/people/secondFactor'

/** Takes the second factor off. */
export default defineRoute({
  access: 'signedIn',
  body: proofSchema,
  async handler({ event, registry, actor, body }) {
    await removeSecondFactor(registry, actor, body)
    setResponseStatus(event, 204)
    return null
  },
})
