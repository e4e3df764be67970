import { proofSchema, roleParams } from '../../../../../../shared/schemas/people'
import { defineRoute } from '../../../../../utils/defineRoute'
import { takeRole } from '../../../../../services/people/roles'

/** Takes a role away, at once. */
export default defineRoute({
  access: { roles: ['registrar'], note: 'not on oneself' },
  params: roleParams,
  body: proofSchema,
  async handler({ event, registry, actor, params, body }) {
    await takeRole(registry, actor, { userUid: params.id, role: params.role, ...body })
    setResponseStatus(event, 204)
    return null
  },
})
