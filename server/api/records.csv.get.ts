import { Readable } from 'node:stream'
import { recordsQuery } from '#shared/schemas/records'
import { streamCsv } from '../services/records/streamCsv'
import { defineRoute } from '../utils/defineRoute'
import { localeOfRequest } from '../utils/problem'

/** The same selection as `/api/records`, whole, as CSV. */
export default defineRoute({
  access: 'public',
  query: recordsQuery.omit({ limit: true, cursor: true }),
  cache: 'public, max-age=5',
  handler: async ({ event, registry, query }) => {
    const chunks = await streamCsv(registry, query, localeOfRequest(event))
    setResponseHeader(event, 'content-type', 'text/csv; charset=utf-8; header=present')
    setResponseHeader(event, 'content-disposition', 'attachment; filename="hartroll-records.csv"')
    return sendStream(event, Readable.from(chunks))
  },
})
