import { z } from 'zod'
import { DESK_KINDS } from '#shared/domain/desk'
import { ROLES } from '#shared/domain/access/roles'
import { STATES } from '#shared/domain/workflow/states'

/** One line of the desk: what is wanted, of which animal, sitting or person, and since when. */
export const deskLine = z.object({
  kind: z.enum(DESK_KINDS),
  /** entry, sitting or proposal */
  id: z.uuid(),
  /** the sitting that a docket item lies before */
  sittingId: z.uuid().nullable(),
  state: z.enum(STATES).nullable(),
  category: z.string().nullable(),
  district: z.string().nullable(),
  /** hunter, finder or owner, as the file names them; for a proposal the person it is about */
  person: z.string().nullable(),
  role: z.enum(ROLES).nullable(),
  net: z.string().nullable(),
  place: z.string().nullable(),
  heldOn: z.iso.date().nullable(),
  count: z.number().int().nullable(),
  onHold: z.boolean(),
  since: z.iso.datetime(),
  /** whole days in the registry's zone */
  days: z.number().int(),
  dueOn: z.iso.date().nullable(),
  daysLeft: z.number().int().nullable(),
})
export type DeskLine = z.infer<typeof deskLine>

export const deskAnswer = z.object({
  lines: z.array(deskLine),
  /** how many wait of each kind, those that are not in `lines` included */
  counts: z.array(z.object({ kind: z.enum(DESK_KINDS), count: z.number().int(), oldestDays: z.number().int() })),
})
export type DeskAnswer = z.infer<typeof deskAnswer>
