import { defineRoute } from '../../utils/defineRoute'
import { readDesk } from '../../services/desk/read'

/** What waits for whoever asks, whatever their roles. */
export default defineRoute({
  access: 'signedIn',
  handler: ({ registry, actor }) => readDesk(registry, actor),
})
