import { entryParams } from '#shared/schemas/entries'
import { readEvents } from '../../../services/entries/read'
import { defineRoute } from '../../../utils/defineRoute'

export default defineRoute({
  access: { note: 'whoever may see the entry' },
  params: entryParams,
  handler: ({ registry, actor, params }) => readEvents(registry, actor, params.id),
})
