import { changeDocumentBody, documentParams } from '#shared/schemas/documents'
import { changeKind } from '../../../services/documents/change'
import { defineRoute } from '../../../utils/defineRoute'

export default defineRoute({
  access: { note: 'who sent it, while nothing rests on it' },
  params: documentParams,
  body: changeDocumentBody,
  handler: async ({ registry, actor, params, body }) => {
    await changeKind(registry, actor, params.id, body.kind)
    return { id: params.id, kind: body.kind }
  },
})
