import { entryParams } from '#shared/schemas/entries'
import { readDocuments } from '../../../../services/documents/read'
import { defineRoute } from '../../../../utils/defineRoute'

export default defineRoute({
  access: { note: 'whoever may see the entry, without a stake' },
  params: entryParams,
  handler: ({ registry, actor, params }) => readDocuments(registry, actor, params.id),
})
