import { z } from 'zod'
import { PARTS } from '../domain/access/stakes'
import { PRINTED_AS } from '../domain/lists'
import { GROUNDS } from '../domain/workflow/eligibility'
import { ANIMAL_FACTS, DOCUMENT_KINDS, METHODS, ORIGINS, SEXES } from '../domain/workflow/origins'
import { UUID_PATTERN } from '../uuid'

const uuid = z.string().regex(UUID_PATTERN)
const code = z.string().trim().max(64).regex(/^[a-z0-9_-]+$/)
const name = z.string().trim().min(1).max(120)
const words = (most: number) => z.string().trim().max(most)
/** `YYYY-MM-DD`, `YYYY-MM`, `YYYY` or `unknown`; read by the domain, which says what is wrong with it. */
const inexactDate = z.string().trim().max(40)
const day = z.string().regex(/^\d{4}-\d{2}-\d{2}$/)

/** From what the days of drying count: since the animal was taken, or since the head was worked on. */
export const DRIED_FROM = ['taken', 'boiled', 'cleaned', 'freeze_dried'] as const
export type DriedFrom = (typeof DRIED_FROM)[number]

export const entryPerson = z.strictObject({
  id: uuid.optional(),
  part: z.enum(PARTS),
  name,
  address: words(300).nullish(),
  email: z.union([z.literal(''), z.email().max(254)]).nullish(),
  phone: words(40).nullish(),
  bornOn: day.nullish(),
  diedOn: day.nullish(),
  isMinor: z.boolean().default(false),
  /** the account that enters it is this person */
  isMe: z.boolean().default(false),
})
export type EntryPersonInput = z.output<typeof entryPerson>

/** Facts of the animal; whatever is left out stays as it is. */
export const entryFacts = z.strictObject({
  category: code,
  origin: z.enum(ORIGINS),
  originalOrigin: z.enum(ORIGINS).exclude(['inherited']).nullable(),
  hunterName: name,
  takenOn: inexactDate,
  district: code.nullable(),
  districtSide: words(20).nullable(),
  method: z.enum(METHODS).nullable(),
  sex: z.enum(SEXES).nullable(),
  guided: z.boolean().nullable(),
  hunterPrintedAs: z.enum(PRINTED_AS),
  /** a guardian chose that a minor's name is printed as it is */
  guardianChoseName: z.boolean(),
  monthPublic: z.boolean(),
  driedSince: day.nullable(),
  driedFrom: z.enum(DRIED_FROM).nullable(),
  people: z.array(entryPerson).max(20),
}).partial()
export type EntryFactsInput = z.output<typeof entryFacts>

const measurements = z.record(z.string(), z.unknown())

export const createEntryBody = entryFacts.extend({
  id: uuid.optional(),
  category: code,
  origin: z.enum(ORIGINS),
  /** a rough sheet that goes with it, for the entrant's own memory */
  rough: measurements.optional(),
})
export type CreateEntryInput = z.output<typeof createEntryBody>

/** A shop or a measurer begins an entry for somebody who claims it later. */
export const beginForBody = createEntryBody.extend({
  /** puts it on the measurer's own bench at once */
  toBench: z.boolean().default(false),
  claimantEmail: z.union([z.literal(''), z.email().max(254)]).nullish(),
})
export type BeginForInput = z.output<typeof beginForBody>

export const entryParams = z.object({ id: uuid })
export const requestParams = z.object({ id: uuid, request: uuid })
export const checkParams = z.object({ id: uuid, check: code })

export const sheetBody = z.strictObject({
  measurements,
  measuredOn: day.nullish(),
  driedSince: day.nullish(),
  driedFrom: z.enum(DRIED_FROM).nullish(),
  wholeSkull: z.boolean().nullish(),
  reasons: z.record(z.string().max(80), words(500)).optional(),
})
export type SheetInput = z.output<typeof sheetBody>

const amendment = z.strictObject({
  hunterName: name, finderName: name, ownerName: name, guideName: name,
  hunterPrintedAs: z.enum(PRINTED_AS), takenOn: inexactDate, monthPublic: z.boolean(), district: code, method: code, sex: code,
}).partial()

export const transitionBody = z.strictObject({
  transition: z.string().trim().min(1).max(40),
  version: z.int().min(1),
  comment: words(2000).optional(),
  confirm: z.boolean().optional(),
  measurer: uuid.optional(),
  place: words(200).optional(),
  at: z.iso.datetime().optional(),
  ground: z.enum(GROUNDS).optional(),
  reason: words(2000).optional(),
  text: words(4000).optional(),
  password: z.string().max(1024).optional(),
  code: z.string().max(40).optional(),
  category: code.optional(),
  sitting: uuid.optional(),
  challenge: uuid.optional(),
  judges: z.tuple([uuid, uuid]).optional(),
  changes: amendment.optional(),
})

export const REQUEST_KINDS = ['paper', 'fact', 'statement', 'fee', 'explain', 'reclassify', 'other'] as const
export type RequestKind = (typeof REQUEST_KINDS)[number]

export const requestBody = z.strictObject({
  kind: z.enum(REQUEST_KINDS),
  text: z.string().trim().min(1).max(2000),
  wants: z.array(z.union([z.enum(DOCUMENT_KINDS), z.enum(ANIMAL_FACTS), code])).max(5).default([]),
})
export type RequestInput = z.output<typeof requestBody>

export const answerBody = z.strictObject({ text: words(2000).default('') })
export const claimBody = z.strictObject({ code: z.string().trim().min(4).max(200) })
