import { entryParams } from '#shared/schemas/entries'
import { beginCheckout } from '../../../services/payments/checkout'
import { defineRoute } from '../../../utils/defineRoute'

/** The page of the payments service for what is owed: a new one, or the one that is open already. */
export default defineRoute({
  access: { note: 'owner' },
  params: entryParams,
  handler: ({ registry, actor, params }) => beginCheckout(registry, actor, params.id),
})
