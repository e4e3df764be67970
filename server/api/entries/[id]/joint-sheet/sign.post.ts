import { entryParams, jointSigning } from '#shared/schemas/sittings'
import { signJointSheet } from '../../../../services/panel/panelSheets'
import { defineRoute } from '../../../../utils/defineRoute'

/** Signs the joint sheet; with the second signature its net stands. */
export default defineRoute({
  access: { roles: ['judge'], note: 'one of the two judges of the second measuring' },
  params: entryParams,
  body: jointSigning,
  handler: async ({ registry, actor, params, body }) => ({
    recorded: await signJointSheet(registry, actor, params.id, body.version, body),
  }),
})
