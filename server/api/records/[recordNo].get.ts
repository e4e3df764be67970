import { recordNoParams } from '#shared/schemas/records'
import { readRecord } from '../../services/records/readRecord'
import { defineRoute } from '../../utils/defineRoute'
import { answerWithEtag } from '../../utils/etag'
import { localeOfRequest } from '../../utils/problem'

/** One record with its sheet, its ranks and its history. */
export default defineRoute({
  access: 'public',
  params: recordNoParams,
  cache: 'public, max-age=5',
  handler: async ({ event, registry, params }) => answerWithEtag(event, await readRecord(registry, params.recordNo, localeOfRequest(event))),
})
