import { entryParams } from '#shared/schemas/entries'
import { readMoney } from '../../../services/payments/read'
import { defineRoute } from '../../../utils/defineRoute'

export default defineRoute({
  access: { note: 'owner, office and registrar' },
  params: entryParams,
  handler: ({ registry, actor, params }) => readMoney(registry, actor, params.id),
})
