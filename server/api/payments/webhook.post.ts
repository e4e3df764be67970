import { DomainError } from '#shared/errors'
import { takePaymentMessage } from '../../services/payments/messages'
import { defineRoute } from '../../utils/defineRoute'

/** Messages of the payments service. Their signature is made over the very bytes, so nothing parses them before. */
export default defineRoute({
  access: 'public',
  handler: async ({ event, registry }) => {
    const raw = await readRawBody(event, false)
    if (!raw || raw.byteLength > 1024 * 1024) throw new DomainError('bad_request', { details: { reason: 'signature' } })
    return takePaymentMessage(registry, raw, getRequestHeader(event, 'stripe-signature') ?? '')
  },
})
