import { clearance, entryParams } from '#shared/schemas/sittings'
import { clearStake } from '../../../services/office/stakes'
import { defineRoute } from '../../../utils/defineRoute'

/** Clears a likeness of name or address. */
export default defineRoute({
  access: { roles: ['registrar'], note: 'without a stake, never for oneself' },
  params: entryParams,
  body: clearance,
  handler: async ({ registry, actor, params, body }) => {
    await clearStake(registry, actor, params.id, body)
    return { ok: true }
  },
})
