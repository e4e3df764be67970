import { z } from 'zod'
import { readMessage } from '../../services/mailbox/read'
import { defineRoute } from '../../utils/defineRoute'

/** Demo only: one message. */
export default defineRoute({
  access: 'public',
  params: z.object({ id: z.string().max(80) }),
  handler: ({ registry, params }) => readMessage(registry, params.id),
})
