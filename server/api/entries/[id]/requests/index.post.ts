import { entryParams, requestBody } from '#shared/schemas/entries'
import { askRequest } from '../../../../services/office/requests'
import { defineRoute } from '../../../../utils/defineRoute'

export default defineRoute({
  access: { roles: ['reviewer'], note: 'in review, without a stake' },
  params: entryParams,
  body: requestBody,
  handler: async ({ event, registry, actor, params, body }) => {
    const id = await askRequest(registry, actor, params.id, body)
    setResponseStatus(event, 201)
    return { id }
  },
})
