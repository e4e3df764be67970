import { defineRoute } from '../../utils/defineRoute'
import { readPanel } from '../../services/panel/readPanel'

/** Sittings that concern whoever asks, and what no sitting has yet. */
export default defineRoute({
  access: { roles: ['judge', 'reviewer', 'registrar'], note: 'a judge sees the sittings they are named for' },
  handler: ({ registry, actor }) => readPanel(registry, actor),
})
