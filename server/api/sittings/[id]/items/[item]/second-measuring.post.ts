import { itemParams, secondMeasuringAsking } from '#shared/schemas/sittings'
import { askSecondMeasuring } from '../../../../../services/panel/ballots'
import { defineRoute } from '../../../../../utils/defineRoute'

/** A judge asks for a second measuring. */
export default defineRoute({
  access: { roles: ['judge'], note: 'a judge of the sitting without a stake' },
  params: itemParams,
  body: secondMeasuringAsking,
  handler: async ({ registry, actor, params, body }) => {
    await askSecondMeasuring(registry, actor, params.id, params.item, body.reason)
    return { ok: true }
  },
})
