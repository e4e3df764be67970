import { docketAdding, sittingParams } from '#shared/schemas/sittings'
import { addToDocket } from '../../../services/panel/sittings'
import { defineRoute } from '../../../utils/defineRoute'

/** Adds items that wait to the docket. */
export default defineRoute({
  access: { roles: ['reviewer', 'registrar', 'judge'], note: 'who plans sittings, or the chair of this one' },
  params: sittingParams,
  body: docketAdding,
  handler: async ({ registry, actor, params, body }) => {
    await addToDocket(registry, actor, params.id, body.items)
    return { ok: true }
  },
})
