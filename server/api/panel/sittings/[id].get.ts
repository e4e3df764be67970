import { z } from 'zod'
import { defineRoute } from '../../../utils/defineRoute'
import { readSitting } from '../../../services/panel/readPanel'

/** A sitting with its docket. */
export default defineRoute({
  access: { roles: ['judge', 'reviewer', 'registrar'], note: 'judges of the sitting, its chair, and whoever plans sittings; ballots of others when it is closed' },
  params: z.object({ id: z.uuid() }),
  handler: ({ registry, actor, params }) => readSitting(registry, actor, params.id),
})
