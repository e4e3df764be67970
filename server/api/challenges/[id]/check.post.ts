import { reportCheck, sittingParams } from '#shared/schemas/sittings'
import { checkReport } from '../../../services/panel/challenges'
import { defineRoute } from '../../../utils/defineRoute'

/** The office says whether a report is worth the chair's time. */
export default defineRoute({
  access: { roles: ['reviewer'], note: 'without a stake' },
  params: sittingParams,
  body: reportCheck,
  handler: async ({ registry, actor, params, body }) => {
    await checkReport(registry, actor, params.id, body.holds)
    return { ok: true }
  },
})
