import { listMine } from '../../services/entries/mine'
import { defineRoute } from '../../utils/defineRoute'

/** One's own entries. */
export default defineRoute({
  access: 'signedIn',
  handler: async ({ registry, actor }) => ({ items: await listMine(registry, actor) }),
})
