import { documentParams } from '#shared/schemas/documents'
import { removeDocument } from '../../../services/documents/change'
import { defineRoute } from '../../../utils/defineRoute'

export default defineRoute({
  access: { note: 'who sent it, while nothing rests on it' },
  params: documentParams,
  handler: async ({ registry, actor, params }) => {
    await removeDocument(registry, actor, params.id)
    return { id: params.id }
  },
})
