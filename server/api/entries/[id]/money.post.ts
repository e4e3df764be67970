import { bookingBody } from '#shared/schemas/documents'
import { entryParams } from '#shared/schemas/entries'
import { bookByOffice } from '../../../services/payments/office'
import { readMoney } from '../../../services/payments/read'
import { defineRoute } from '../../../utils/defineRoute'

/** The office waives a fee, books one that was paid there, or books that it was given back. */
export default defineRoute({
  access: { roles: ['reviewer', 'registrar'], note: 'without a stake' },
  params: entryParams,
  body: bookingBody,
  handler: async ({ registry, actor, params, body }) => {
    await bookByOffice(registry, actor, params.id, body)
    return readMoney(registry, actor, params.id)
  },
})
