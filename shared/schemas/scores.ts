import { z } from 'zod'
import { ROUNDINGS } from '../domain/measuring/roundDown'
import { SEVERITIES, SLIP_CODES } from '../domain/measuring/sheet'
import { SIDES } from '../domain/measuring/units'

/** `POST /api/scores`. The measurements are read line by line by the sheet itself, which says what is wrong with each. */
export const scoreRequest = z.strictObject({
  category: z.string().min(1).max(64),
  roundDown: z.enum(ROUNDINGS).default('none'),
  measurements: z.record(z.string(), z.unknown()),
})
export type ScoreRequest = z.output<typeof scoreRequest>

/** A length as it is written: inches and steps, `169 4/8`. */
const length = z.string().meta({ examples: ['169 4/8'] })
/** Whole steps of the class's step. */
const units = z.int()
const side = z.enum(SIDES)

const scoreLine = z.object({
  id: z.string(),
  label: z.string(),
  /** As read; counts are whole numbers in a string; `absent`, or null where nothing was measured or the line has no sides. */
  right: z.string().nullable(),
  left: z.string().nullable(),
  value: z.string().nullable(),
  points: z.array(z.object({ side, length, width: length.nullable(), counted: z.boolean() })).nullable(),
  counted: length,
  difference: length.nullable(),
  share: length,
  note: z.string().nullable(),
})

const slip = z.object({
  code: z.enum(SLIP_CODES),
  line: z.string().nullable(),
  side: side.nullable(),
  severity: z.enum(SEVERITIES),
  message: z.string(),
})

const classStanding = z.object({
  category: z.string(),
  net: length,
  /** Null for a class that the registry does not offer. */
  minimum: length.nullable(),
  margin: length.nullable(),
  /** The rank that this net would take in the region's list; null under the minimum. */
  rank: z.int().min(1).nullable(),
})
export type ClassStanding = z.output<typeof classStanding>

export const scoreAnswer = z.object({
  category: z.string(),
  definition: z.string(),
  step: z.enum(['1/8 in', '1/16 in']),
  complete: z.boolean(),
  missing: z.array(z.string()),
  gross: length,
  grossUnits: units,
  grossAll: length,
  differences: length,
  abnormal: length,
  crown: length,
  added: length,
  net: length,
  netUnits: units,
  lines: z.array(scoreLine),
  slips: z.array(slip),
  classes: z.array(classStanding),
})
export type ScoreAnswer = z.output<typeof scoreAnswer>

const categoryLine = z.object({
  id: z.string(),
  label: z.string(),
  kind: z.enum(['credit', 'paired', 'countPair', 'deductedCount', 'deductedList', 'addedList', 'recordOnly']),
  sides: z.boolean(),
  difference: z.boolean(),
  capBy: z.string().nullable(),
})

/** `GET /api/categories`. */
export const categoriesAnswer = z.object({
  items: z.array(z.object({
    category: z.string(),
    name: z.string(),
    species: z.string(),
    speciesName: z.string(),
    scientificName: z.string(),
    typicality: z.enum(['typical', 'nontypical', 'single']),
    definition: z.string(),
    step: z.enum(['1/8 in', '1/16 in']),
    offered: z.boolean(),
    minimum: length.nullable(),
    lines: z.array(categoryLine),
  })),
})
export type CategoriesAnswer = z.output<typeof categoriesAnswer>
