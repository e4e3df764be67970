import { linkSchema } from '../../../shared/schemas/people'
import { defineRoute } from '../../utils/defineRoute'
import { readLink } from '../../services/people/links'

/** What a link from a letter is for. Reading does not spend it. */
export default defineRoute({
  access: 'public',
  body: linkSchema,
  handler: ({ registry, body }) => readLink(registry, body.token),
})
