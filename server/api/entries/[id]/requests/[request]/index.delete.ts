import { requestParams } from '#shared/schemas/entries'
import { removeRequest } from '../../../../../services/office/requests'
import { defineRoute } from '../../../../../utils/defineRoute'

export default defineRoute({
  access: { roles: ['reviewer'], note: 'in review, without a stake' },
  params: requestParams,
  handler: async ({ registry, actor, params }) => {
    await removeRequest(registry, actor, params.id, params.request)
    return { id: params.request }
  },
})
