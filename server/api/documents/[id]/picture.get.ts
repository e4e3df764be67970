import { documentParams, pictureQuery } from '#shared/schemas/documents'
import { readFile } from '../../../services/documents/read'
import { defineRoute } from '../../../utils/defineRoute'
import { sendFile } from '../../../utils/sendFile'

export default defineRoute({
  access: { note: 'whoever may see the entry, without a stake' },
  params: documentParams,
  query: pictureQuery,
  handler: async ({ event, registry, actor, params, query }) => sendFile(event, await readFile(registry, actor, params.id, 'picture', query.page)),
})
