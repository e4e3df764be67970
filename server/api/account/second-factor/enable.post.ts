import { enableFactorSchema } from '../../../../shared/schemas/people'
import { defineRoute } from '../../../utils/defineRoute'
import { enableSecondFactor } from '../../../services/people/secondFactor'

/** Ends setting it up with a first code. */
export default defineRoute({
  access: 'signedIn',
  body: enableFactorSchema,
  handler: ({ registry, actor, body }) => enableSecondFactor(registry, actor, body.code),
})
