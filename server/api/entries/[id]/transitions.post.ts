import { entryParams, transitionBody } from '#shared/schemas/entries'
import { moveEntry } from '../../../services/entries/move'
import { readEntryAfter } from '../../../services/entries/read'
import { defineRoute } from '../../../utils/defineRoute'

/** Moves an entry. Answers with the entry and what this viewer may do next. */
export default defineRoute({
  access: { note: 'the parties of the transition, without a stake' },
  params: entryParams,
  body: transitionBody,
  handler: async ({ registry, actor, params, body }) => {
    const { told } = await moveEntry(registry, actor, params.id, body)
    return { ...await readEntryAfter(registry, actor, params.id), ...told }
  },
})
