import { entryParams } from '#shared/schemas/entries'
import { readEntry } from '../../../services/entries/read'
import { defineRoute } from '../../../utils/defineRoute'

export default defineRoute({
  access: { note: 'owner, keeper, assigned measurer, the office after submission, judges of its docket' },
  params: entryParams,
  handler: async ({ event, registry, actor, params }) => {
    const entry = await readEntry(registry, actor, params.id)
    setResponseHeader(event, 'etag', `"${entry.version}"`)
    return entry
  },
})
