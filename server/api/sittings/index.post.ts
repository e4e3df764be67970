import { sittingPlan } from '#shared/schemas/sittings'
import { planSitting } from '../../services/panel/sittings'
import { defineRoute } from '../../utils/defineRoute'

/** Plans a sitting with its chair, judges and docket. */
export default defineRoute({
  access: { roles: ['reviewer', 'registrar'] },
  body: sittingPlan,
  handler: async ({ event, registry, actor, body }) => {
    const id = await planSitting(registry, actor, body)
    setResponseStatus(event, 201)
    return { id }
  },
})
