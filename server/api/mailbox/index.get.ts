import { z } from 'zod'
import { listMessages } from '../../services/mailbox/read'
import { defineRoute } from '../../utils/defineRoute'

/** Demo only: what would have been sent. */
export default defineRoute({
  access: 'public',
  query: z.object({}),
  handler: ({ registry }) => listMessages(registry),
})
