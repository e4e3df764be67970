import { entryParams } from '#shared/schemas/entries'
import { documentKind } from '#shared/schemas/documents'
import { DomainError } from '#shared/errors'
import { UUID_PATTERN } from '#shared/uuid'
import { addDocument, assertCanAdd, receiveUpload } from '../../../../services/documents/add'
import { defineRoute } from '../../../../utils/defineRoute'
import { readUpload } from '../../../../utils/upload'

/** A paper or photograph, as a form with the fields `kind` and `file`, and `replaces` where it takes another's place. */
export default defineRoute({
  access: { note: 'owner, keeper, assigned measurer, office or judge, as the state allows' },
  params: entryParams,
  handler: async ({ event, registry, actor, params }) => {
    await assertCanAdd(registry, actor, params.id)
    const { fields, file, name } = await readUpload(event, stream => receiveUpload(registry, stream))
    const kind = documentKind.safeParse(fields.kind)
    const replaces = fields.replaces || undefined
    if (!kind.success || (replaces && !UUID_PATTERN.test(replaces))) {
      await registry.storage.discard(file)
      throw new DomainError('invalid_input', { fields: [{ path: kind.success ? 'replaces' : 'kind', code: 'document_kind' }] })
    }
    const id = await addDocument(registry, actor, params.id, { kind: kind.data, name, incoming: file, replaces })
    setResponseStatus(event, 201)
    return { id }
  },
})
