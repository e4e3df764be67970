import { signBody } from '#shared/schemas/documents'
import { entryParams } from '#shared/schemas/entries'
import { readStatement, signStatement } from '../../../services/statements/sign'
import { defineRoute } from '../../../utils/defineRoute'
import { localeOfRequest } from '../../../utils/problem'

/** Signs the statement by the typed name of whoever has to. */
export default defineRoute({
  access: { note: 'owner, before submitting or while it is returned' },
  params: entryParams,
  body: signBody,
  handler: async ({ event, registry, actor, params, body }) => {
    const locale = localeOfRequest(event)
    await signStatement(registry, actor, params.id, body, locale)
    return readStatement(registry, actor, params.id, locale)
  },
})
