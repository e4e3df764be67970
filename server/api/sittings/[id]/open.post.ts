import { sittingOpening, sittingParams } from '#shared/schemas/sittings'
import { openSitting } from '../../../services/panel/sittings'
import { defineRoute } from '../../../utils/defineRoute'

/** The chair opens the sitting. */
export default defineRoute({
  access: { roles: ['judge'], note: 'the chair of the sitting' },
  params: sittingParams,
  body: sittingOpening,
  handler: async ({ registry, actor, params }) => {
    await openSitting(registry, actor, params.id)
    return { ok: true }
  },
})
