import { answerBody, requestParams } from '#shared/schemas/entries'
import { answerRequest } from '../../../../../services/office/requests'
import { defineRoute } from '../../../../../utils/defineRoute'

export default defineRoute({
  access: { note: 'owner, while it is returned' },
  params: requestParams,
  body: answerBody,
  handler: async ({ registry, actor, params, body }) => {
    await answerRequest(registry, actor, params.id, params.request, body.text)
    return { id: params.request }
  },
})
