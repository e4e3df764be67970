import { z, type ZodType } from 'zod'
import { benchAnswer } from '#shared/schemas/bench'
import { deskAnswer } from '#shared/schemas/desk'
import { measurersAnswer } from '#shared/schemas/measurers'
import { facetsAnswer, recordAnswer, recordsAnswer } from '#shared/schemas/records'
import { categoriesAnswer, scoreAnswer } from '#shared/schemas/scores'
import { STATES } from '#shared/domain/workflow/states'

const entry = z.looseObject({ id: z.uuid(), state: z.enum(STATES), version: z.int() })
const health = z.object({ status: z.string(), database: z.string(), worker: z.string(), schema: z.string().nullable() })

interface Answer {
  readonly status?: number
  /** JSON unless `media` says otherwise. */
  readonly schema: ZodType
  readonly media?: string
  /** May be answered with 304 to a caller who holds it. */
  readonly cached?: boolean
}

/** What routes answer with, by method and path. A route that is not here answers with JSON that may grow. */
export const ANSWERS: Readonly<Record<string, Answer>> = {
  'GET /api/records': { schema: recordsAnswer, cached: true },
  'GET /api/records/facets': { schema: facetsAnswer, cached: true },
  'GET /api/records/{recordNo}': { schema: recordAnswer, cached: true },
  'GET /api/records/[recordNo]/drawing': { schema: z.string(), media: 'image/svg+xml', cached: true },
  'GET /api/records.csv': { schema: z.string(), media: 'text/csv', cached: true },
  'GET /api/measurers': { schema: measurersAnswer, cached: true },
  'GET /api/categories': { schema: categoriesAnswer, cached: true },
  'GET /api/openapi.json': { schema: z.looseObject({ openapi: z.string() }), cached: true },
  'POST /api/scores': { schema: scoreAnswer },
  'GET /api/desk': { schema: deskAnswer },
  'GET /api/bench': { schema: benchAnswer },
  'GET /api/health': { schema: health },
  'POST /api/entries': { schema: entry, status: 201 },
  'POST /api/entries/for': { schema: entry, status: 201 },
  'GET /api/entries/{id}': { schema: entry },
  'PATCH /api/entries/{id}': { schema: entry },
  'PUT /api/entries/{id}/sheet': { schema: entry },
  'POST /api/entries/{id}/transitions': { schema: entry },
}

/** Routes whose change has to name the version that was seen. */
export const IF_MATCH: ReadonlySet<string> = new Set(['PATCH /api/entries/{id}', 'PUT /api/entries/{id}/sheet'])
