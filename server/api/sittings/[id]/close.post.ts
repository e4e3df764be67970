import { sittingClosing, sittingParams } from '#shared/schemas/sittings'
import { closeSitting } from '../../../services/panel/close'
import { defineRoute } from '../../../utils/defineRoute'

/** The chair closes the sitting; its decisions are carried out. */
export default defineRoute({
  access: { roles: ['judge'], note: 'the chair of the sitting' },
  params: sittingParams,
  body: sittingClosing,
  handler: async ({ registry, actor, params, body }) => {
    await closeSitting(registry, actor, params.id, body.items)
    return { ok: true }
  },
})
