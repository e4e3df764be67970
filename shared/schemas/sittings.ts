import { z } from 'zod'
import { isDay } from '../domain/dates'
import { LIKENESSES } from '../domain/access/stakes'
import { GROUNDS } from '../domain/workflow/eligibility'
import { ENTRY_VOTES, RECORD_VOTES } from '../domain/workflow/panel'
import { UUID_PATTERN } from '../uuid'

export const uid = z.string().regex(UUID_PATTERN)
export const day = z.string().refine(isDay, { error: 'date' })
const words = (most: number) => z.string().trim().min(1).max(most)

export const sittingParams = z.object({ id: uid })
export const itemParams = z.object({ id: uid, item: uid })
export const entryParams = z.object({ id: uid })

export const sittingPlan = z.strictObject({
  heldOn: day,
  place: words(200),
  chair: uid,
  judges: z.array(uid).min(1).max(50),
  items: z.array(uid).max(500).default([]),
})

export const docketAdding = z.strictObject({ items: z.array(uid).min(1).max(500) })
export const judgeCall = z.strictObject({ judge: uid })
export const sittingOpening = z.strictObject({})

export const sittingClosing = z.strictObject({
  items: z.array(z.strictObject({ item: uid, ground: z.enum(GROUNDS).optional(), reason: z.string().trim().max(2000).optional() })).max(500).default([]),
})

export const ballot = z.strictObject({
  vote: z.enum([...new Set([...ENTRY_VOTES, ...RECORD_VOTES])]),
  ground: z.enum(GROUNDS).optional(),
  reason: z.string().trim().max(2000).optional(),
  requests: z.array(words(1000)).max(20).optional(),
})

export const secondMeasuringAsking = z.strictObject({ reason: words(1000) })
export const pairNaming = z.strictObject({ judges: z.tuple([uid, uid]) })

export const panelSheet = z.strictObject({
  measurements: z.record(z.string(), z.unknown()),
  measuredOn: day,
  wholeSkull: z.boolean().optional(),
})
export const signing = z.strictObject({ password: z.string().min(1).max(200), code: z.string().max(40).optional() })
export const jointSigning = signing.extend({ version: z.number().int().positive() })

export const report = z.strictObject({ text: words(4000), signature: words(120) })
export const reportCheck = z.strictObject({ holds: z.boolean() })
export const challengeAnswer = z.strictObject({ text: words(4000) })

export const clearance = z.strictObject({ account: uid, person: uid, kind: z.enum(LIKENESSES), reason: words(1000) })
export const declaration = z.strictObject({ kind: z.enum(['shop', 'other']), reason: z.string().trim().max(1000).nullable().default(null) })

export const recordParams = z.object({ recordNo: z.coerce.number().int().positive() })
