import { idParams, roleSchema } from '../../../../../shared/schemas/people'
import { defineRoute } from '../../../../utils/defineRoute'
import { giveRole } from '../../../../services/people/roles'

/** Gives a role, or proposes it to a second registrar. */
export default defineRoute({
  access: { roles: ['registrar'], note: 'not on oneself' },
  params: idParams,
  body: roleSchema,
  handler: async ({ registry, actor, params, body }) => ({ outcome: await giveRole(registry, actor, { userUid: params.id, ...body }) }),
})
