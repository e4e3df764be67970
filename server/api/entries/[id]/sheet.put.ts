import { entryParams, sheetBody } from '#shared/schemas/entries'
import { DomainError, isDomainError } from '#shared/errors'
import { readEntry } from '../../../services/entries/read'
import { saveSheet } from '../../../services/sheets/save'
import { defineRoute } from '../../../utils/defineRoute'
import { versionOf } from '../../../utils/ifMatch'
import { localeOfRequest } from '../../../utils/problem'

/** Saves the open sheet; `If-Match` names the sheet's own version. */
export default defineRoute({
  access: { note: 'the assigned measurer' },
  params: entryParams,
  body: sheetBody,
  handler: async ({ event, registry, actor, params, body }) => {
    try {
      const saved = await saveSheet(registry, actor, params.id, versionOf(event), body, localeOfRequest(event))
      setResponseHeader(event, 'etag', `"${saved.version}"`)
      return saved
    }
    catch (error) {
      if (!isDomainError(error) || error.code !== 'precondition_failed') throw error
      const { openSheet } = await readEntry(registry, actor, params.id)
      throw new DomainError('precondition_failed', { details: { ...error.details, current: openSheet } })
    }
  },
})
