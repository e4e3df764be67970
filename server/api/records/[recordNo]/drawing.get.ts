import { recordNoParams } from '#shared/schemas/records'
import { drawRecord } from '../../../services/records/drawRecord'
import { listsVersion } from '../../../read-models/records/names'
import { defineRoute } from '../../../utils/defineRoute'
import { answerFrom } from '../../../utils/etag'
import { localeOfRequest } from '../../../utils/problem'

/** The record's antlers, horns or skull, drawn to scale from its sheet, as an SVG. */
export default defineRoute({
  access: 'public',
  params: recordNoParams,
  cache: 'public, max-age=300',
  handler: async ({ event, registry, params }) => {
    const locale = localeOfRequest(event)
    const svg = await answerFrom(event, [await listsVersion(registry.db), locale], () => drawRecord(registry, params.recordNo, locale))
    if (svg !== null) setResponseHeader(event, 'content-type', 'image/svg+xml; charset=utf-8')
    return svg
  },
})
