import { Readable } from 'node:stream'
import { recordsQuery } from '#shared/schemas/records'
import { streamCsv } from '../services/records/streamCsv'
import { listsVersion } from '../read-models/records/names'
import { defineRoute } from '../utils/defineRoute'
import { answerFrom } from '../utils/etag'
import { localeOfRequest } from '../utils/problem'

/** The same selection as `/api/records`, whole, as CSV. */
export default defineRoute({
  access: 'public',
  query: recordsQuery.omit({ limit: true, cursor: true }),
  cache: 'public, max-age=5',
  handler: async ({ event, registry, query }) => {
    const locale = localeOfRequest(event)
    const version = await listsVersion(registry.db)
    const chunks = await answerFrom(event, [version, locale, query], () => streamCsv(registry, query, locale, version))
    if (!chunks) return null
    setResponseHeader(event, 'content-type', 'text/csv; charset=utf-8; header=present')
    setResponseHeader(event, 'content-disposition', 'attachment; filename="hartroll-records.csv"')
    return sendStream(event, Readable.from(chunks))
  },
})
