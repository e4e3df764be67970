import { z } from 'zod'
import { defineRoute } from '../../../utils/defineRoute'
import { readFile } from '../../../services/desk/readFile'

/** A file for the desk of the measurer, the office or a judge. */
export default defineRoute({
  access: { roles: ['measurer', 'reviewer', 'judge', 'registrar'], note: 'assigned measurer, the office from the submission on, judges of its sitting; a stake closes the file' },
  params: z.object({ id: z.uuid() }),
  query: z.object({ as: z.enum(['measurer', 'office', 'judge']) }),
  handler: ({ registry, actor, params, query }) => readFile(registry, actor, params.id, query.as),
})
