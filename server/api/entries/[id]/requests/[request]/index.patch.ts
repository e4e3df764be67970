import { requestBody, requestParams } from '#shared/schemas/entries'
import { changeRequest } from '../../../../../services/office/requests'
import { defineRoute } from '../../../../../utils/defineRoute'

export default defineRoute({
  access: { roles: ['reviewer'], note: 'in review, without a stake' },
  params: requestParams,
  body: requestBody,
  handler: async ({ registry, actor, params, body }) => {
    await changeRequest(registry, actor, params.id, params.request, body)
    return { id: params.request }
  },
})
