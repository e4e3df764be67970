import { scoreRequest } from '#shared/schemas/scores'
import { scoreSheet } from '../services/scores/scoreSheet'
import { defineRoute } from '../utils/defineRoute'
import { localeOfRequest } from '../utils/problem'

/** Scores a sheet; needs no account and stores nothing. */
export default defineRoute({
  access: 'public',
  body: scoreRequest,
  cache: 'no-store',
  handler: ({ event, registry, body }) => scoreSheet(registry, body, localeOfRequest(event)),
})
