import { recordParams, report } from '#shared/schemas/sittings'
import { reportRecord } from '../../../services/panel/challenges'
import { defineRoute } from '../../../utils/defineRoute'

/** A signed report on a listed record. */
export default defineRoute({
  access: 'signedIn',
  params: recordParams,
  body: report,
  handler: async ({ event, registry, actor, params, body }) => {
    const id = await reportRecord(registry, actor, params.recordNo, body)
    setResponseStatus(event, 201)
    return { id }
  },
})
