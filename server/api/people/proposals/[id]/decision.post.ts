import { decisionSchema, idParams } from '../../../../../shared/schemas/people'
import { defineRoute } from '../../../../utils/defineRoute'
import { decideOnRole } from '../../../../services/people/roles'

/** The second registrar's word on a proposed role. */
export default defineRoute({
  access: { roles: ['registrar'], note: 'a second registrar, not about oneself; the proposer can only withdraw' },
  params: idParams,
  body: decisionSchema,
  async handler({ event, registry, actor, params, body }) {
    await decideOnRole(registry, actor, { proposalUid: params.id, ...body })
    setResponseStatus(event, 204)
    return null
  },
})
