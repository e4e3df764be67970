import { accreditationChangeSchema, idParams } from '../../../../shared/schemas/people'
import { defineRoute } from '../../../utils/defineRoute'
import { changeAccreditation } from '../../../services/people/accreditations'

/** Renews, suspends or restores an accreditation. */
export default defineRoute({
  access: { roles: ['registrar'], note: 'not on oneself' },
  params: idParams,
  body: accreditationChangeSchema,
  async handler({ event, registry, actor, params, body }) {
    await changeAccreditation(registry, actor, params.id, body)
    setResponseStatus(event, 204)
    return null
  },
})
