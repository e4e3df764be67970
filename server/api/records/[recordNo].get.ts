import { recordNoParams } from '#shared/schemas/records'
import { readRecord } from '../../services/records/readRecord'
import { listsVersion } from '../../read-models/records/names'
import { defineRoute } from '../../utils/defineRoute'
import { answerFrom } from '../../utils/etag'
import { localeOfRequest } from '../../utils/problem'

/** One record with its sheet, its ranks and its history. */
export default defineRoute({
  access: 'public',
  params: recordNoParams,
  cache: 'public, max-age=5',
  handler: async ({ event, registry, params }) => {
    const version = await listsVersion(registry.db)
    const locale = localeOfRequest(event)
    return answerFrom(event, [version, locale], () => readRecord(registry, params.recordNo, locale, version))
  },
})
