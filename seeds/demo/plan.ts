import { addDays, type Day, type InexactDate, parseInexactDate } from '#shared/domain/dates'
import { compile, currentDefinition, scoreSteps, STEPS_PER_INCH, TOTALS, toSteps, type Category, type Measurements, type SheetDefinition } from '#shared/domain/measuring/index'
import type { Method, Origin, Sex } from '#shared/domain/workflow/origins'
import { sittingDays } from './clock'
import { growHead, type Head } from './heads'
import type { Random } from './random'
import { type DemoClass, type DistrictCode, FIRST_DAY, FIRST_YEAR, FOUNDED, OFFERED, RANGES, TERMS } from './society'
import { minimum16 } from './society-data'

/** How a record came into the lists: by this program, from the paper lists with its sheet, or from them without one. */
export type Way = 'certified' | 'taken_over' | 'taken_over_bare'

/** One animal that stands in the lists, before anybody has a name or a number. */
export interface PlannedRecord {
  readonly label: string
  readonly category: DemoClass
  readonly way: Way
  readonly district: DistrictCode
  readonly origin: Origin
  readonly originalOrigin: Exclude<Origin, 'inherited'> | null
  readonly method: Method | null
  readonly sex: Sex
  readonly taken: InexactDate
  readonly measuredOn: Day
  readonly submittedOn: Day
  readonly acceptedOn: Day
  readonly head: Head
  /** begun and left: neither method nor sex nor guide is said yet */
  readonly bare?: boolean
}

/** The definition of a class with its numeric program, made once. */
export interface Scorer {
  readonly definition: SheetDefinition
  readonly netOf: (head: Head) => number
}

export function scorerFor(category: DemoClass): Scorer {
  const definition = currentDefinition(category as Category)
  const program = compile(definition)
  const totals = new Int32Array(Object.keys(TOTALS).length)
  return {
    definition,
    netOf: head => scoreSteps(program, toSteps(program, head as unknown as Measurements), totals)[TOTALS.net]!,
  }
}

/** Months and days between which a species is hunted, by common practice of a highland region (no source). */
const SEASONS: Readonly<Record<string, readonly (readonly [from: string, to: string])[]>> = {
  whitetail: [['09-15', '12-10']],
  'mule-deer': [['09-10', '11-30']],
  elk: [['09-01', '11-28']],
  moose: [['09-12', '10-31']],
  pronghorn: [['08-20', '10-20']],
  'bighorn-sheep': [['08-28', '10-15']],
  'mountain-goat': [['09-01', '11-10']],
  bison: [['10-01', '12-31']],
  'black-bear': [['04-15', '06-10'], ['09-01', '10-31']],
  'grizzly-bear': [['04-20', '05-31'], ['09-10', '10-20']],
  cougar: [['01-02', '02-25'], ['12-01', '12-30']],
}

/** Few years stand apart: a war that kept people away, and winters after which little had grown. */
const POOR_YEARS: Readonly<Record<number, number>> = { 1942: 0.5, 1943: 0.4, 1944: 0.4, 1945: 0.6, 1984: 0.6, 1985: 0.7, 1997: 0.6, 2012: 0.65, 2020: 0.8 }

function yearWeights(lastYear: number): Record<number, number> {
  const weights: Record<number, number> = {}
  for (let year = FIRST_YEAR; year <= lastYear; year++) {
    const trend = year < 1962 ? 0.15 + (year - FIRST_YEAR) * 0.015 : year < 1990 ? 0.7 + (year - 1962) * 0.02 : 1.3
    weights[year] = trend * (POOR_YEARS[year] ?? 1)
  }
  return weights
}

const METHODS_BY_ERA: readonly { readonly until: number, readonly weights: Readonly<Partial<Record<Method, number>>> }[] = [
  { until: 1969, weights: { rifle: 95, shotgun: 2, recurve_longbow: 3 } },
  { until: 1979, weights: { rifle: 88, shotgun: 2, muzzleloader: 2, recurve_longbow: 6, handgun: 1, compound_bow: 1 } },
  { until: 1994, weights: { rifle: 76, shotgun: 2, muzzleloader: 6, recurve_longbow: 3, handgun: 2, compound_bow: 11 } },
  { until: 9999, weights: { rifle: 66, shotgun: 1, muzzleloader: 9, recurve_longbow: 2, handgun: 1, compound_bow: 18, crossbow: 3 } },
]

const ORIGINS = { hunted: 890, found: 42, road_killed: 22, agency: 8, inherited: 38 } as const
const BORNE_BY_BOTH_SEXES = new Set(['mountain-goat', 'bison', 'black-bear', 'grizzly-bear', 'cougar', 'pronghorn'])

const day = (text: string): InexactDate => parseInexactDate(text)!

/** Mean excess of a record over its minimum, as a share; skulls lie closer together than antlers. */
const EXCESS: Readonly<Partial<Record<DemoClass, number>>> = {
  'black-bear': 0.024, 'grizzly-bear': 0.03, cougar: 0.026, pronghorn: 0.045, 'mountain-goat': 0.042, bison: 0.06,
  'mule-deer-nontypical': 0.07, 'whitetail-nontypical': 0.07,
}

/** A day in the season of a year; a late one of a season that crosses the year's end stays in its year. */
function dayInSeason(species: string, year: number, random: Random): Day {
  const [from, to] = random.pick(SEASONS[species]!)
  const first = `${year}-${from}`
  const length = Math.round((Date.parse(`${year}-${to}`) - Date.parse(first)) / 86_400_000)
  // Most are taken in the first half of a season.
  return addDays(first, Math.floor(length * random.next() ** 1.4))
}

/** The last day of hunting that lies on or before a day. */
export function latestDayInSeason(species: string, until: Day, random: Random): Day {
  for (let year = Number(until.slice(0, 4)); ; year--) {
    for (const [from, to] of [...SEASONS[species]!].reverse()) {
      const [first, last] = [`${year}-${from}`, `${year}-${to}` < until ? `${year}-${to}` : until]
      const length = Math.round((Date.parse(last) - Date.parse(first)) / 86_400_000)
      if (length >= 0) return addDays(last, -random.whole(0, Math.min(length, 25)))
    }
  }
}

interface Dates {
  readonly takenOn: Day
  readonly measuredOn: Day
  readonly submittedOn: Day
  readonly acceptedOn: Day
}

/** When a head was taken, measured, sent in and accepted; undefined where that would lie after today. */
function datesOf(species: string, hunted: boolean, today: Day, weights: Record<number, number>, sittings: readonly Day[], random: Random): Dates | undefined {
  const year = Number(random.weighted(weights))
  const takenOn = hunted ? dayInSeason(species, year, random) : addDays(`${year}-01-01`, random.whole(0, 364))
  const opened = takenOn < `${FOUNDED}-06-01` ? addDays(`${FOUNDED}-06-01`, Math.floor(random.exponential() * 3000)) : takenOn
  const wait = random.chance(0.06) ? random.whole(700, 9000) : 61 + Math.floor(random.exponential() * 110)
  const measuredOn = addDays(opened, wait)
  const submittedOn = addDays(measuredOn, random.whole(1, 45))
  const acceptedOn = sittings.find(sitting => sitting >= addDays(submittedOn, 24))
  if (!acceptedOn || acceptedOn >= addDays(today, -2)) return undefined
  // Nothing was half-way when the paper lists were closed.
  if (acceptedOn > FIRST_DAY && measuredOn < addDays(FIRST_DAY, 60)) return undefined
  return { takenOn, measuredOn, submittedOn, acceptedOn }
}

/** How well a date of taking is known: by the day since this program keeps it, less and less the older it is. */
function asKnown(takenOn: Day, certified: boolean, origin: Origin, random: Random): InexactDate {
  if (certified && origin !== 'inherited') return day(takenOn)
  const known = random.weighted(takenOn < '1962' ? { day: 40, month: 22, year: 36, unknown: 2 } : { day: 78, month: 10, year: 12 })
  switch (known) {
    case 'day': return day(takenOn)
    case 'month': return day(takenOn.slice(0, 7))
    case 'year': return day(takenOn.slice(0, 4))
    case 'unknown': return day('unknown')
  }
}

export interface PlanOptions {
  /** the last day that has been, in the society's zone */
  readonly today: Day
  /** share of the full number of records, at least one a class */
  readonly scale: number
}

/** Every record of the lists, class by class, each from a stream of its own. */
export function* planRecords(options: PlanOptions, random: Random): Generator<PlannedRecord> {
  const { today, scale } = options
  const weights = yearWeights(Number(today.slice(0, 4)))
  const sittings = sittingDays(FOUNDED, today)
  for (const category of Object.keys(OFFERED) as DemoClass[]) {
    const scorer = scorerFor(category)
    const many = Math.max(1, Math.round(OFFERED[category].records * scale))
    for (let number = 0; number < many; number++) {
      yield planRecord(category, scorer, `${category}/${number}`, { today, weights, sittings }, random)
    }
  }
}

interface Frame {
  readonly today: Day
  readonly weights: Record<number, number>
  readonly sittings: readonly Day[]
}

function planRecord(category: DemoClass, scorer: Scorer, label: string, frame: Frame, parent: Random): PlannedRecord {
  const random = parent.fork(label)
  const { species, step } = scorer.definition
  const origin = random.weighted(ORIGINS)
  const originalOrigin = origin === 'inherited' ? random.weighted({ hunted: 88, found: 12 }) : null
  const hunted = (originalOrigin ?? origin) === 'hunted'
  let dates: Dates | undefined
  while (!dates) dates = datesOf(species, hunted, frame.today, frame.weights, frame.sittings, random)
  const certified = dates.acceptedOn > FIRST_DAY
  const taken = asKnown(dates.takenOn, certified, origin, random)
  const year = Number(dates.takenOn.slice(0, 4))

  const per = STEPS_PER_INCH[step]
  const term = TERMS.findLast(one => one.from_on <= dates.submittedOn) ?? TERMS[0]
  const minimum = minimum16(category, term.share, step) * per / 16
  // The eighties and the years after 2005 grew the best heads; a plain trend, invented.
  const era = 1 + 0.18 * Math.sin((year - 1931) / 95 * Math.PI * 3)
  const target = Math.ceil(minimum * (1 + (EXCESS[category] ?? 0.05) * era * random.exponential()))

  return {
    label,
    category,
    way: certified ? 'certified' : random.chance(0.065) ? 'taken_over_bare' : 'taken_over',
    district: random.weighted(RANGES[species as keyof typeof RANGES]),
    origin,
    originalOrigin,
    method: hunted ? random.weighted(METHODS_BY_ERA.find(era => year <= era.until)!.weights) : null,
    sex: BORNE_BY_BOTH_SEXES.has(species) ? random.weighted({ male: 82, female: 16, unknown: 2 }) : random.weighted({ male: 99, unknown: 1 }),
    taken,
    measuredOn: dates.measuredOn,
    submittedOn: dates.submittedOn,
    acceptedOn: dates.acceptedOn,
    head: growHead(category, target, random.fork('head'), scorer.netOf),
  }
}
