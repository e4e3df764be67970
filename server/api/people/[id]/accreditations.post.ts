import { accreditSchema, idParams } from '../../../../shared/schemas/people'
import { defineRoute } from '../../../utils/defineRoute'
import { accredit } from '../../../services/people/accreditations'

/** Accredits a measurer. */
export default defineRoute({
  access: { roles: ['registrar'], note: 'not on oneself' },
  params: idParams,
  body: accreditSchema,
  async handler({ event, registry, actor, params, body }) {
    const made = await accredit(registry, actor, params.id, body)
    setResponseStatus(event, 201)
    return made
  },
})
