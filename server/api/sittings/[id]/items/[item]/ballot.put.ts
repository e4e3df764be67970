import { ballot, itemParams } from '#shared/schemas/sittings'
import { castBallot } from '../../../../../services/panel/ballots'
import { defineRoute } from '../../../../../utils/defineRoute'

/** A judge's ballot on an item, or another one in its place. */
export default defineRoute({
  access: { roles: ['judge'], note: 'a judge of the sitting without a stake' },
  params: itemParams,
  body: ballot,
  handler: async ({ registry, actor, params, body }) => {
    await castBallot(registry, actor, params.id, params.item, body)
    return { ok: true }
  },
})
