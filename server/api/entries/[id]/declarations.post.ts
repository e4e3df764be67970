import { declaration, entryParams } from '#shared/schemas/sittings'
import { declareStake } from '../../../services/office/stakes'
import { defineRoute } from '../../../utils/defineRoute'

/** Declares one's own stake. */
export default defineRoute({
  access: { roles: ['shop', 'measurer', 'reviewer', 'judge', 'registrar'], note: 'who may see the entry' },
  params: entryParams,
  body: declaration,
  handler: async ({ registry, actor, params, body }) => {
    await declareStake(registry, actor, params.id, body)
    return { ok: true }
  },
})
