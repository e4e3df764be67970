import { entryParams, panelSheet } from '#shared/schemas/sittings'
import { savePanelSheet } from '../../../../services/panel/panelSheets'
import { defineRoute } from '../../../../utils/defineRoute'

/** Saves a judge's own sheet of the second measuring. */
export default defineRoute({
  access: { roles: ['judge'], note: 'one of the two judges of the second measuring' },
  params: entryParams,
  body: panelSheet,
  maxBody: 128 * 1024,
  handler: async ({ event, registry, actor, params, body }) => ({
    version: await savePanelSheet(registry, actor, params.id, body, getRequestHeader(event, 'accept-language')?.slice(0, 2) ?? 'en'),
  }),
})
