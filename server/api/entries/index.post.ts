import { createEntryBody } from '#shared/schemas/entries'
import { createEntry } from '../../services/entries/create'
import { readEntry } from '../../services/entries/read'
import { defineRoute } from '../../utils/defineRoute'
import { idUnderKey } from '../../utils/idempotency'

/** Begins an entry of one's own. A client-made id makes a repetition harmless. */
export default defineRoute({
  access: 'signedIn',
  body: createEntryBody,
  handler: async ({ event, registry, actor, body }) => {
    const { uid } = await createEntry(registry, actor, { ...body, id: body.id ?? idUnderKey(event, actor) })
    setResponseStatus(event, 201)
    setResponseHeader(event, 'location', `/api/entries/${uid}`)
    return readEntry(registry, actor, uid)
  },
})
