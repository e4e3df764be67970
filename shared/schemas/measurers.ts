import { z } from 'zod'

const chosen = <S extends z.ZodType>(schema: S) => z.preprocess(value => value === '' ? undefined : value, schema.optional())
const code = z.string().trim().max(64).regex(/^[a-z0-9_-]+$/)

/** `GET /api/measurers`. */
export const measurersQuery = z.object({ district: chosen(code), species: chosen(code) })
export type MeasurersQuery = z.output<typeof measurersQuery>

export const measurersAnswer = z.object({
  items: z.array(z.object({
    id: z.uuid(),
    name: z.string(),
    /** Number of the accreditation. */
    number: z.string(),
    /** Code and name of the district where they measure; null where they said none. */
    district: z.object({ code: z.string(), name: z.string() }).nullable(),
    species: z.array(z.string()),
    /** Last day of the accreditation. */
    validTo: z.string(),
  })),
  /** Species and districts that can be chosen. */
  species: z.array(z.string()),
  districts: z.array(z.object({ code: z.string(), name: z.string() })),
  officeEmail: z.string(),
})
export type MeasurersAnswer = z.output<typeof measurersAnswer>
