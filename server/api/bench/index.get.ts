import { defineRoute } from '../../utils/defineRoute'
import { readBench } from '../../services/bench/readBench'

/** What waits at the bench of whoever asks. */
export default defineRoute({
  access: { roles: ['measurer', 'shop'], note: 'own animals and own walk-ins only' },
  handler: ({ registry, actor }) => readBench(registry, actor),
})
