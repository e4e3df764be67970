import { judgeCall, sittingParams } from '#shared/schemas/sittings'
import { callJudge } from '../../../services/panel/sittings'
import { defineRoute } from '../../../utils/defineRoute'

/** Calls another judge. */
export default defineRoute({
  access: { roles: ['reviewer', 'registrar', 'judge'], note: 'who plans sittings, or the chair of this one' },
  params: sittingParams,
  body: judgeCall,
  handler: async ({ registry, actor, params, body }) => {
    await callJudge(registry, actor, params.id, body.judge)
    return { ok: true }
  },
})
