import { itemParams, pairNaming } from '#shared/schemas/sittings'
import { namePair } from '../../../../../services/panel/ballots'
import { defineRoute } from '../../../../../utils/defineRoute'

/** Names the two judges of a second measuring. */
export default defineRoute({
  access: { roles: ['judge'], note: 'the chair of the sitting' },
  params: itemParams,
  body: pairNaming,
  handler: async ({ registry, actor, params, body }) => {
    await namePair(registry, actor, params.id, params.item, body.judges)
    return { ok: true }
  },
})
