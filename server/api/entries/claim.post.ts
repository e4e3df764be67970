import { claimBody } from '#shared/schemas/entries'
import { claimEntry } from '../../services/entries/claim'
import { readEntry } from '../../services/entries/read'
import { defineRoute } from '../../utils/defineRoute'

/** Makes an entry one's own by the code of a walk-in. */
export default defineRoute({
  access: 'signedIn',
  body: claimBody,
  handler: async ({ registry, actor, body }) => readEntry(registry, actor, await claimEntry(registry, actor, body.code)),
})
