import { entryParams } from '#shared/schemas/entries'
import { readStatement } from '../../../services/statements/sign'
import { defineRoute } from '../../../utils/defineRoute'
import { localeOfRequest } from '../../../utils/problem'

export default defineRoute({
  access: { note: 'whoever may see the entry' },
  params: entryParams,
  handler: ({ event, registry, actor, params }) => readStatement(registry, actor, params.id, localeOfRequest(event)),
})
