import { idParams } from '../../../../shared/schemas/people'
import { defineRoute } from '../../../utils/defineRoute'
import { findPerson } from '../../../services/people/list'

/** One account with its roles and accreditations. */
export default defineRoute({
  access: { roles: ['registrar'] },
  params: idParams,
  handler: ({ registry, actor, params }) => findPerson(registry, actor, params.id),
})
