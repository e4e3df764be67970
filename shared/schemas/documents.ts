import { z } from 'zod'
import { DOCUMENT_KINDS } from '../domain/workflow/origins'
import { UUID_PATTERN } from '../uuid'

const uuid = z.string().regex(UUID_PATTERN)

export const documentParams = z.object({ id: uuid })
export const documentKind = z.enum(DOCUMENT_KINDS)
export const changeDocumentBody = z.strictObject({ kind: documentKind })
export const orderBody = z.strictObject({ order: z.array(uuid).max(200) })
/** Which picture of a document: a PDF has one a page. */
export const pictureQuery = z.object({ page: z.coerce.number().int().min(1).max(500).default(1) })

export const bookingBody = z.strictObject({ kind: z.enum(['office_payment', 'waiver', 'refund']), reason: z.string().trim().min(1).max(500) })
export const signBody = z.strictObject({
  part: z.enum(['hunter', 'finder', 'owner', 'club', 'guardian', 'heir']),
  name: z.string().trim().min(1).max(120),
  textVersion: z.int().min(1),
})
