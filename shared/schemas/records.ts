import { z } from 'zod'
import { METHODS, SEXES } from '../domain/workflow/origins'

/** What a list can be sorted by; `-` in front means descending. */
export const RECORD_SORTS = ['net', 'gross', 'takenOn', 'acceptedOn', 'hunter', 'district'] as const
export type RecordSortField = (typeof RECORD_SORTS)[number]
export type RecordSort = RecordSortField | `-${RecordSortField}`
const SORT_VALUES = RECORD_SORTS.flatMap(field => [field, `-${field}`] as const) as [RecordSort, ...RecordSort[]]

/** An empty parameter of a form without JavaScript means that nothing was chosen. */
const chosen = <S extends z.ZodType>(schema: S) => z.preprocess(value => value === '' ? undefined : value, schema.optional())
const code = z.string().trim().max(64).regex(/^[a-z0-9_-]+$/)
const year = z.coerce.number().int().min(1000).max(9999)

/** The filters that say which records a list holds. */
export const recordFilters = z.object({
  category: chosen(code),
  species: chosen(code),
  district: chosen(code),
  method: chosen(z.enum(METHODS)),
  /** First and last year of taking. */
  from: chosen(year),
  to: chosen(year),
  sex: chosen(z.enum(SEXES)),
  /** Least net in inches, `150` or `150.125`. */
  minNet: chosen(z.coerce.number().min(0).max(2000)),
  /** Beginnings of words of hunter, district or record number; every one of them has to be there. */
  q: chosen(z.string().trim().max(100)),
})
export type RecordFilters = z.output<typeof recordFilters>

export const recordsQuery = recordFilters.extend({
  sort: chosen(z.enum(SORT_VALUES)),
  limit: z.preprocess(value => value === '' ? undefined : value, z.coerce.number().int().min(1).max(200).default(50)),
  cursor: chosen(z.string().max(1000)),
})
export type RecordsQuery = z.output<typeof recordsQuery>

export const recordNoParams = z.object({ recordNo: z.coerce.number().int().min(1).max(4294967295) })

/** Inches and steps as the lists write them, never reduced: `187 4/8`. */
const length = z.string().meta({ examples: ['187 4/8'] })
/** `YYYY`, or `YYYY-MM` with consent; null where not even the year is known. */
const takenOn = z.string().nullable()

export const recordLine = z.object({
  recordNo: z.int(),
  /** In the list of its class: of the chosen district or the region, of the chosen method or all. */
  rank: z.int(),
  category: z.string(),
  species: z.string(),
  net: length,
  /** The frame with abnormal and crown points. */
  gross: length,
  /** As the hunter chose to be printed; empty where the name is withheld. */
  hunter: z.string(),
  district: z.string(),
  method: z.enum(METHODS).nullable(),
  origin: z.string(),
  originalOrigin: z.string().nullable(),
  sex: z.enum(SEXES).nullable(),
  takenOn,
  acceptedOn: z.string(),
  status: z.enum(['accepted', 'challenged']),
  source: z.enum(['certified', 'taken_over']),
  formerNo: z.string().nullable(),
  /** What a bench asks first, such as points and widest inside. */
  keyFigures: z.array(z.string()),
  /** Place under filters that a list has no rank for, when sorted by net; otherwise null. */
  position: z.int().nullable(),
})
export type RecordLine = z.output<typeof recordLine>

export const recordsAnswer = z.object({
  items: z.array(recordLine),
  nextCursor: z.string().nullable(),
  prevCursor: z.string().nullable(),
  /** Exact, or null where counting would read too much. */
  total: z.int().nullable(),
  totalAtLeast: z.int(),
  sort: z.enum(SORT_VALUES),
})
export type RecordsAnswer = z.output<typeof recordsAnswer>

const standing = z.object({ rank: z.int(), total: z.int(), sharedBy: z.int() })

export const recordAnswer = recordLine.omit({ position: true }).extend({
  region: standing,
  inDistrict: standing,
  /** Whose lists these are, for quoting. */
  society: z.string(),
  /** Where the record can be read, for quoting. */
  url: z.string(),
  districtCode: z.string(),
  scientificName: z.string(),
  sheet: z.object({
    definition: z.string(),
    step: z.string(),
    measurements: z.record(z.string(), z.unknown()),
    measuredOn: z.string().nullable(),
    totals: z.object({ gross: length, grossAll: length, differences: length, abnormal: length, added: length, net: length }),
    lines: z.array(z.object({
      id: z.string(), label: z.string(), right: z.string().nullable(), left: z.string().nullable(), value: z.string().nullable(),
      points: z.array(z.object({ side: z.enum(['right', 'left']), length, width: length.nullable(), counted: z.boolean() })).nullable(),
      counted: length, difference: length.nullable(), share: length, note: z.string().nullable(),
    })),
  }).nullable(),
  neighbours: z.array(recordLine.pick({ recordNo: true, rank: true, net: true, hunter: true, district: true, takenOn: true })),
  history: z.array(z.object({ on: z.string(), what: z.string(), before: z.record(z.string(), z.string().nullable()).optional(), after: z.record(z.string(), z.string().nullable()).optional() })),
})
export type RecordAnswer = z.output<typeof recordAnswer>

export const facetsAnswer = z.object({
  /** Whose lists these are. */
  society: z.object({ name: z.string(), region: z.string() }),
  categories: z.array(z.object({ category: z.string(), species: z.string(), count: z.int(), best: length.nullable(), bestRecordNo: z.int().nullable() })),
  districts: z.array(z.object({ code: z.string(), name: z.string(), count: z.int() })),
  methods: z.array(z.object({ method: z.enum(METHODS), count: z.int() })),
  years: z.object({ first: z.int().nullable(), last: z.int().nullable() }),
})
export type FacetsAnswer = z.output<typeof facetsAnswer>
