import { entryParams } from '#shared/schemas/sittings'
import { readSecondMeasuring } from '../../../services/panel/panelSheets'
import { defineRoute } from '../../../utils/defineRoute'

/** The second measuring as one of its two judges may see it. */
export default defineRoute({
  access: { roles: ['judge'], note: 'one of the two judges of the second measuring' },
  params: entryParams,
  handler: ({ registry, actor, params }) => readSecondMeasuring(registry, actor, params.id),
})
