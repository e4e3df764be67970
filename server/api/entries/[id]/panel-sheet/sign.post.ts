import { entryParams, signing } from '#shared/schemas/sittings'
import { signPanelSheet } from '../../../../services/panel/panelSheets'
import { defineRoute } from '../../../../utils/defineRoute'

/** Signs a judge's own sheet. */
export default defineRoute({
  access: { roles: ['judge'], note: 'one of the two judges of the second measuring' },
  params: entryParams,
  body: signing,
  handler: async ({ registry, actor, params, body }) => {
    await signPanelSheet(registry, actor, params.id, body)
    return { ok: true }
  },
})
