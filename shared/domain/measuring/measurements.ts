import type { Json } from '../canonical'
import { canonicalText } from '../canonical'
import type { Line, ListLine, ListPoint, Measurements, Reading, SheetDefinition } from './sheet'
import { hasSides, isCount, isList } from './sheet'
import type { Argument, Parsed, Side, UnitRefusal } from './units'
import { LONGEST_INCHES, MOST_POINTS, SIDES, STEPS_PER_INCH, formatSteps, parseCount, parseLength } from './units'

/** Why measurements as written are no sheet: the refusals of units, and what concerns the sheet's form. */
export type MeasurementRefusal
  = | UnitRefusal
    | 'not_a_sheet'
    | 'unknown_line'
    | 'not_a_measurement'
    | 'not_a_list'
    | 'not_a_side'
    | 'too_many_points'
    | 'length_missing'

/** One bad field: where it is (`right.g2`, `abnormalPoints.0.length`), why, and what the sentence names. */
export interface Problem {
  readonly path: string
  readonly code: MeasurementRefusal
  readonly args: Readonly<Record<string, Argument>>
}

export interface ReadMeasurements {
  /** All that could be read; a bad field is left out as if it were not measured. */
  readonly measurements: Measurements
  readonly problems: readonly Problem[]
}

const isObject = (value: unknown): value is Record<string, unknown> =>
  typeof value === 'object' && value !== null && !Array.isArray(value)

interface Building {
  single: Record<string, Reading>
  right: Record<string, Reading>
  left: Record<string, Reading>
  lists: Record<string, readonly ListPoint[]>
}

const empty = (): Building => ({ single: {}, right: {}, left: {}, lists: {} })

/** A sheet on which nothing is written yet. */
export const NOTHING_MEASURED: Measurements = empty() as unknown as Measurements

/**
 * Reads measurements as people and programs write them: strings in every way of writing, numbers of inches, `"absent"`;
 * counts as whole numbers; a missing key is a line that was not measured, and so is an empty string.
 *
 * @param raw `{ insideSpread, right: { mainBeam, … }, left: { … }, abnormalPoints: [{ side, length, width? }] }`.
 * @returns what could be read, in whole steps, and every problem with its path.
 */
export function readMeasurements(definition: SheetDefinition, raw: unknown): ReadMeasurements {
  const built = empty()
  const problems: Problem[] = []
  const measurements = built as unknown as Measurements
  if (!isObject(raw)) {
    return { measurements, problems: [{ path: '', code: 'not_a_sheet', args: {} }] }
  }
  const single = new Map<string, Line>()
  const sided = new Map<string, Line>()
  for (const line of definition.lines) (hasSides(line) ? sided : single).set(line.id, line)

  for (const [key, value] of Object.entries(raw)) {
    if (key === 'right' || key === 'left') readSide(definition, sided, key, value, built, problems)
    else readSingle(definition, single.get(key), key, value, built, problems)
  }
  return { measurements, problems }
}

function readSide(
  definition: SheetDefinition, lines: ReadonlyMap<string, Line>, side: Side, raw: unknown, built: Building, problems: Problem[],
): void {
  if (!isObject(raw)) {
    problems.push({ path: side, code: 'not_a_side', args: {} })
    return
  }
  for (const [key, value] of Object.entries(raw)) {
    readReading(definition, lines.get(key), `${side}.${key}`, value, built[side], problems)
  }
}

function readSingle(
  definition: SheetDefinition, line: Line | undefined, key: string, value: unknown, built: Building, problems: Problem[],
): void {
  if (line && isList(line)) {
    const points = readList(definition, line, value, problems)
    if (points) built.lists[line.id] = points
  }
  else readReading(definition, line, key, value, built.single, problems)
}

function readReading(
  definition: SheetDefinition, line: Line | undefined, path: string, value: unknown, into: Record<string, Reading>, problems: Problem[],
): void {
  if (!line) {
    problems.push({ path, code: 'unknown_line', args: { line: { text: path } } })
    return
  }
  const parsed = readValue(definition, line, value)
  if (parsed === undefined) return
  if (parsed === 'absent') into[line.id] = parsed
  else if (parsed.ok) into[line.id] = parsed.value
  else problems.push({ path, code: parsed.code, args: parsed.args })
}

type Unread = { readonly ok: false, readonly code: MeasurementRefusal, readonly args: Readonly<Record<string, Argument>> }

const notAMeasurement: Unread = { ok: false, code: 'not_a_measurement', args: {} }

function readValue(definition: SheetDefinition, line: Line, value: unknown): Parsed | Unread | 'absent' | undefined {
  if (value === undefined || value === null) return undefined
  if (typeof value === 'number') return isCount(line) ? parseCount(value) : parseLength(value, definition.step)
  if (typeof value !== 'string') return notAMeasurement
  const text = value.trim()
  if (text === '') return undefined
  if (text.toLowerCase() === 'absent') return 'absent'
  return isCount(line) ? parseCount(text) : parseLength(text, definition.step)
}

function readList(definition: SheetDefinition, line: ListLine, raw: unknown, problems: Problem[]): readonly ListPoint[] | undefined {
  if (raw === undefined || raw === null) return undefined
  if (raw === 'absent') return []
  if (!Array.isArray(raw)) {
    problems.push({ path: line.id, code: 'not_a_list', args: {} })
    return undefined
  }
  if (raw.length > MOST_POINTS) {
    problems.push({ path: line.id, code: 'too_many_points', args: { most: { count: MOST_POINTS }, given: { count: raw.length } } })
    return undefined
  }
  const points: ListPoint[] = []
  raw.forEach((entry, index) => {
    const point = readPoint(definition, line, `${line.id}.${index}`, entry, problems)
    if (point) points.push(point)
  })
  return points
}

function readPoint(
  definition: SheetDefinition, line: ListLine, path: string, raw: unknown, problems: Problem[],
): ListPoint | undefined {
  if (!isObject(raw)) {
    problems.push({ path, code: 'not_a_measurement', args: {} })
    return undefined
  }
  const before = problems.length
  for (const key of Object.keys(raw)) {
    if (key === 'side' || key === 'length' || (key === 'width' && line.width)) continue
    problems.push({ path: `${path}.${key}`, code: 'unknown_line', args: { line: { text: key } } })
  }
  const side = SIDES.find((name) => name === raw.side)
  if (!side) problems.push({ path: `${path}.side`, code: 'not_a_side', args: {} })
  const length = readPointLength(definition, `${path}.length`, raw.length, problems)
  const width = line.width ? readPointLength(definition, `${path}.width`, raw.width, problems) : undefined
  if (problems.length > before) return undefined
  if (length === undefined) {
    problems.push({ path: `${path}.length`, code: 'length_missing', args: {} })
    return undefined
  }
  return width === undefined ? { side: side as Side, length } : { side: side as Side, length, width }
}

function readPointLength(definition: SheetDefinition, path: string, value: unknown, problems: Problem[]): number | undefined {
  if (value === undefined || value === null || (typeof value === 'string' && value.trim() === '')) return undefined
  const parsed = typeof value === 'string' || typeof value === 'number' ? parseLength(value, definition.step) : notAMeasurement
  if (parsed.ok) return parsed.value
  problems.push({ path, code: parsed.code, args: parsed.args })
  return undefined
}

/**
 * Takes stored measurements (whole steps, as `Measurements`) back from where they were kept.
 *
 * @throws TypeError when they are not a sheet of this definition: a stored sheet that does not fit is a defect.
 */
export function checkMeasurements(definition: SheetDefinition, stored: unknown): Measurements {
  const fault = storedFault(definition, stored)
  if (fault) throw new TypeError(`stored measurements do not fit ${definition.id}: ${fault}`)
  return stored as Measurements
}

function storedFault(definition: SheetDefinition, stored: unknown): string | undefined {
  if (!isObject(stored)) return 'not an object'
  const parts = ['single', 'right', 'left', 'lists'] as const
  for (const key of Object.keys(stored)) if (!parts.includes(key as (typeof parts)[number])) return key
  for (const part of parts) {
    const values = stored[part]
    if (!isObject(values)) return part
    for (const [id, value] of Object.entries(values)) {
      const line = definition.lines.find((candidate) => candidate.id === id)
      if (!line || placeOf(line) !== (part === 'left' ? 'right' : part)) return `${part}.${id}`
      const sound = isList(line) ? isStoredList(definition, line, value) : isStoredReading(definition, line, value)
      if (!sound) return `${part}.${id}`
    }
  }
  return undefined
}

const placeOf = (line: Line): 'single' | 'right' | 'lists' => (isList(line) ? 'lists' : hasSides(line) ? 'right' : 'single')

const isStoredLength = (definition: SheetDefinition, value: unknown): boolean =>
  Number.isInteger(value) && (value as number) >= 0 && (value as number) <= LONGEST_INCHES * STEPS_PER_INCH[definition.step]

function isStoredReading(definition: SheetDefinition, line: Line, value: unknown): boolean {
  if (value === 'absent') return true
  if (!isCount(line)) return isStoredLength(definition, value)
  return Number.isInteger(value) && (value as number) >= 0 && (value as number) <= MOST_POINTS
}

function isStoredList(definition: SheetDefinition, line: ListLine, value: unknown): boolean {
  if (!Array.isArray(value) || value.length > MOST_POINTS) return false
  return value.every((point) => {
    if (!isObject(point)) return false
    const keys = Object.keys(point)
    return keys.every((key) => key === 'side' || key === 'length' || (key === 'width' && line.width))
      && SIDES.some((side) => side === point.side)
      && isStoredLength(definition, point.length)
      && (!('width' in point) || isStoredLength(definition, point.width))
  })
}

/** A sheet as it is written for people and in answers: the same form that `readMeasurements` reads. */
export interface WrittenMeasurements {
  [line: string]: string | number | Record<string, string | number> | { side: Side, length: string, width?: string }[]
}

/** Writes checked measurements the way the contract does: `"22 3/8"`, counts as numbers, `"absent"`. */
export function writeMeasurements(definition: SheetDefinition, measurements: Measurements): WrittenMeasurements {
  const written: WrittenMeasurements = {}
  const sides: Record<Side, Record<string, string | number>> = { right: {}, left: {} }
  const put = (into: Record<string, unknown>, line: Line, reading: Reading | undefined) => {
    if (reading === undefined) return
    into[line.id] = reading === 'absent' || isCount(line) ? reading : formatSteps(reading, definition.step)
  }
  for (const line of definition.lines) {
    if (isList(line)) {
      const points = measurements.lists[line.id]
      if (points) written[line.id] = points.map((point) => writePoint(definition, point))
    }
    else if (hasSides(line)) {
      for (const side of SIDES) put(sides[side], line, measurements[side][line.id])
    }
    else put(written, line, measurements.single[line.id])
  }
  for (const side of SIDES) if (Object.keys(sides[side]).length > 0) written[side] = sides[side]
  return written
}

function writePoint(definition: SheetDefinition, point: ListPoint): { side: Side, length: string, width?: string } {
  const length = formatSteps(point.length, definition.step)
  return point.width === undefined
    ? { side: point.side, length }
    : { side: point.side, length, width: formatSteps(point.width, definition.step) }
}

/**
 * The one text that stands for a sheet's readings, in the canonical form of RFC 8785. Equal sheets have equal texts
 * however they were written or stored.
 */
export function canonicalSheet(definition: SheetDefinition, measurements: Measurements): string {
  return canonicalText({ definition: definition.id, ...plain(measurements) })
}

const plain = ({ single, right, left, lists }: Measurements): { readonly [part: string]: Json } => ({
  single,
  right,
  left,
  lists: Object.fromEntries(Object.entries(lists).map(([id, points]) => [id, points.map((point) => ({ ...point }))])),
})
