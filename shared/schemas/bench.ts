import { z } from 'zod'
import { ORIGINS } from '#shared/domain/workflow/origins'
import { STATES } from '#shared/domain/workflow/states'

/** An animal at a measurer's bench. */
export const benchLine = z.object({
  id: z.uuid(),
  category: z.string(),
  species: z.string(),
  district: z.string().nullable(),
  origin: z.enum(ORIGINS),
  person: z.string().nullable(),
  /** whether a measurement has been written down */
  begun: z.boolean(),
  /** who asked for a new certificate of an animal that was certified before */
  askedBy: z.enum(['in_review', 'at_panel']).nullable(),
  driedSince: z.iso.date().nullable(),
  /** first day on which it may be measured officially */
  firstDay: z.iso.date().nullable(),
  /** days until then; 0 or less when it may be measured */
  daysToDry: z.number().int().nullable(),
  since: z.iso.datetime(),
  days: z.number().int(),
})
export type BenchLine = z.infer<typeof benchLine>

/** A sheet that the measurer signed, and where its entry stands now. */
export const benchSigned = z.object({
  id: z.uuid(),
  category: z.string(),
  person: z.string().nullable(),
  net: z.string().nullable(),
  signedAt: z.iso.datetime(),
  state: z.enum(STATES),
  version: z.number().int(),
})
export type BenchSigned = z.infer<typeof benchSigned>

/** An entry begun for somebody who has not claimed it yet. */
export const benchWalkIn = z.object({
  id: z.uuid(),
  category: z.string(),
  person: z.string().nullable(),
  state: z.enum(STATES),
  since: z.iso.datetime(),
  days: z.number().int(),
})

export const benchAnswer = z.object({
  waiting: z.array(benchLine),
  unclaimed: z.array(benchWalkIn),
  signed: z.array(benchSigned),
  accreditations: z.array(z.object({
    number: z.string(), validTo: z.iso.date(), daysLeft: z.number().int(), suspended: z.boolean(), species: z.array(z.string()),
  })),
})
export type BenchAnswer = z.infer<typeof benchAnswer>
