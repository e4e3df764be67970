import { entryFacts, entryParams } from '#shared/schemas/entries'
import { isDomainError, DomainError } from '#shared/errors'
import { changeEntry } from '../../../services/entries/change'
import { readEntry } from '../../../services/entries/read'
import { defineRoute } from '../../../utils/defineRoute'
import { versionOf } from '../../../utils/ifMatch'

/** Changes facts and people of the animal; `If-Match` names the version that was seen. */
export default defineRoute({
  access: { note: 'owner or keeper, while facts are open or a request names them' },
  params: entryParams,
  body: entryFacts,
  handler: async ({ event, registry, actor, params, body }) => {
    try {
      await changeEntry(registry, actor, params.id, versionOf(event), body)
    }
    catch (error) {
      if (!isDomainError(error) || error.code !== 'precondition_failed') throw error
      // The newer facts go with the refusal, so that both can be compared.
      throw new DomainError('precondition_failed', { details: { ...error.details, current: await readEntry(registry, actor, params.id) } })
    }
    const entry = await readEntry(registry, actor, params.id)
    setResponseHeader(event, 'etag', `"${entry.version}"`)
    return entry
  },
})
