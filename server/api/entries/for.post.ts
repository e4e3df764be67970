import { beginForBody } from '#shared/schemas/entries'
import { beginFor } from '../../services/entries/create'
import { readEntry } from '../../services/entries/read'
import { defineRoute } from '../../utils/defineRoute'
import { idUnderKey } from '../../utils/idempotency'

/** A walk-in: an entry for somebody who claims it by the code in the answer. */
export default defineRoute({
  access: { roles: ['measurer', 'shop'] },
  body: beginForBody,
  handler: async ({ event, registry, actor, body }) => {
    const { uid, told } = await beginFor(registry, actor, { ...body, id: body.id ?? idUnderKey(event, actor) })
    setResponseStatus(event, 201)
    setResponseHeader(event, 'location', `/api/entries/${uid}`)
    return { ...await readEntry(registry, actor, uid), ...told }
  },
})
