import { z } from 'zod'
import { OFFICE_KEEPERS, OFFICE_SORTS, OFFICE_STATES } from '#shared/domain/desk'
import { STATES, TURNS } from '#shared/domain/workflow/states'
import { ORIGINS } from '#shared/domain/workflow/origins'

/** Filters of the office's queue as they stand in the URL. */
export const officeQueueQuery = z.object({
  state: z.enum([...OFFICE_STATES, 'open']).default('in_review'),
  category: z.string().max(60).optional(),
  district: z.string().max(60).optional(),
  keeper: z.enum(OFFICE_KEEPERS).default('anyone'),
  q: z.string().trim().max(80).optional(),
  sort: z.enum(OFFICE_SORTS).default('age'),
  cursor: z.string().max(200).optional(),
  limit: z.coerce.number().int().min(1).max(100).default(50),
})
export type OfficeQueueQuery = z.infer<typeof officeQueueQuery>

export const officeLine = z.object({
  id: z.uuid(),
  state: z.enum(STATES),
  turn: z.enum(TURNS),
  category: z.string(),
  district: z.string().nullable(),
  origin: z.enum(ORIGINS),
  person: z.string().nullable(),
  net: z.string().nullable(),
  reviewer: z.object({ name: z.string(), isMe: z.boolean() }).nullable(),
  openRequests: z.number().int(),
  checksTicked: z.number().int(),
  onHold: z.boolean(),
  appeal: z.boolean(),
  since: z.iso.datetime(),
  days: z.number().int(),
  dueOn: z.iso.date().nullable(),
  daysLeft: z.number().int().nullable(),
})
export type OfficeLine = z.infer<typeof officeLine>

export const officeQueue = z.object({
  items: z.array(officeLine),
  nextCursor: z.string().nullable(),
  total: z.number().int(),
  /** how many entries stand in each state the office sees, without the filters */
  states: z.record(z.string(), z.number().int()),
  /** choices for the filters: only what occurs in the chosen state */
  categories: z.array(z.string()),
  districts: z.array(z.object({ code: z.string(), name: z.string() })),
})
export type OfficeQueue = z.infer<typeof officeQueue>
