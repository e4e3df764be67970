import { orderBody } from '#shared/schemas/documents'
import { entryParams } from '#shared/schemas/entries'
import { orderDocuments } from '../../../../services/documents/change'
import { readDocuments } from '../../../../services/documents/read'
import { defineRoute } from '../../../../utils/defineRoute'

export default defineRoute({
  access: { note: 'who may add papers to the entry' },
  params: entryParams,
  body: orderBody,
  handler: async ({ registry, actor, params, body }) => {
    await orderDocuments(registry, actor, params.id, body.order)
    return readDocuments(registry, actor, params.id)
  },
})
