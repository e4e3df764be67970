import { z } from 'zod'
import { defineRoute } from '../utils/defineRoute'
import { readHealth } from '../services/health/read'

export default defineRoute({
  access: 'public',
  query: z.object({}),
  async handler({ event, registry }) {
    const health = await readHealth(registry)
    if (health.status !== 'ok') setResponseStatus(event, 503)
    return health
  },
})
