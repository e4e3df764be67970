import { checkParams } from '#shared/schemas/entries'
import { setCheck } from '../../../../services/office/requests'
import { defineRoute } from '../../../../utils/defineRoute'

export default defineRoute({
  access: { roles: ['reviewer'], note: 'in review, without a stake' },
  params: checkParams,
  handler: async ({ registry, actor, params }) => {
    await setCheck(registry, actor, params.id, params.check, false)
    return { code: params.check, ticked: false }
  },
})
