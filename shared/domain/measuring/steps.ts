import type { Measurements, Reading, SheetDefinition } from './sheet'
import { hasSides, isList } from './sheet'
import type { Side } from './units'
import { STEPS_PER_INCH } from './units'

/**
 * The numeric path: the same totals as `score()`, without words, for many sheets at once (statistics, checks, estimates).
 * A sheet is one `Int32Array`: a slot for every reading, then every list as its length and pairs of length and width.
 * `NOT_THERE` stands for absent, not measured, and a width that was not taken; a sum makes no difference between them.
 */
export const NOT_THERE = -1

/** Where each total stands in the answer of `scoreSteps`. */
export const TOTALS = { gross: 0, grossAll: 1, differences: 2, abnormal: 3, added: 4, net: 5 } as const

/** A definition turned into columns of small integers. */
export interface Program {
  readonly definition: string
  /** Which reading each slot holds, in order. */
  readonly slots: readonly { readonly id: string, readonly place: 'single' | Side }[]
  readonly lists: readonly string[]
  /** Per credit: slot, slots of the line that caps it (or NOT_THERE twice). */
  readonly credits: Int32Array
  /** Per pair: right slot, left slot, least reading that counts, steps per unit, 1 when the sides are compared. */
  readonly pairs: Int32Array
  /** Per deducted count: slot, steps per unit. */
  readonly counts: Int32Array
  /** Per list: least length of a point, 1 when added to the net, 1 when it holds abnormal points. */
  readonly points: Int32Array
}

/** Turns a definition into a program. Do it once for many sheets. */
export function compile(definition: SheetDefinition): Program {
  const per = STEPS_PER_INCH[definition.step]
  const slots: { id: string, place: 'single' | Side }[] = []
  const at = new Map<string, number>()
  for (const line of definition.lines) {
    if (isList(line)) continue
    at.set(line.id, slots.length)
    if (hasSides(line)) slots.push({ id: line.id, place: 'right' }, { id: line.id, place: 'left' })
    else slots.push({ id: line.id, place: 'single' })
  }
  const credits: number[] = []
  const pairs: number[] = []
  const counts: number[] = []
  const points: number[] = []
  for (const line of definition.lines) {
    const slot = at.get(line.id) ?? NOT_THERE
    if (line.kind === 'credit') {
      const cap = line.capBy === undefined ? NOT_THERE : at.get(line.capBy) as number
      credits.push(slot, cap, cap === NOT_THERE ? NOT_THERE : cap + 1)
    }
    else if (line.kind === 'paired') pairs.push(slot, slot + 1, line.pointFrom ?? 0, 1, line.difference ? 1 : 0)
    else if (line.kind === 'countPair') pairs.push(slot, slot + 1, 0, per, line.difference ? 1 : 0)
    else if (line.kind === 'deductedCount') counts.push(slot, per)
    else if (isList(line)) points.push(line.pointFrom, line.kind === 'addedList' ? 1 : 0, line.tally === 'abnormal' ? 1 : 0)
  }
  return {
    definition: definition.id,
    slots,
    lists: definition.lines.filter(isList).map((line) => line.id),
    credits: Int32Array.from(credits),
    pairs: Int32Array.from(pairs),
    counts: Int32Array.from(counts),
    points: Int32Array.from(points),
  }
}

const slotValue = (reading: Reading | undefined): number => (typeof reading === 'number' ? reading : NOT_THERE)

/** A sheet as numbers for `scoreSteps`. */
export function toSteps(program: Program, measurements: Measurements): Int32Array {
  const values = program.slots.map(({ id, place }) => slotValue(measurements[place][id]))
  for (const id of program.lists) {
    const points = measurements.lists[id] ?? []
    values.push(points.length)
    for (const point of points) values.push(point.length, point.width ?? NOT_THERE)
  }
  return Int32Array.from(values)
}

/**
 * Scores a sheet of numbers.
 *
 * @param totals six steps, at `TOTALS`; written over, so that one array serves a whole run.
 */
export function scoreSteps(program: Program, values: Int32Array, totals: Int32Array): Int32Array {
  const { credits, pairs, counts, points } = program
  const value = (slot: number): number => {
    const reading = values[slot] as number
    return reading > 0 ? reading : 0
  }
  let gross = 0
  for (let i = 0; i < credits.length; i += 3) {
    const read = value(credits[i] as number)
    const cap = credits[i + 1] as number
    if (cap === NOT_THERE) gross += read
    else {
      const right = value(cap)
      const left = value(credits[i + 2] as number)
      const most = right > left ? right : left
      gross += read < most ? read : most
    }
  }
  let differences = 0
  for (let i = 0; i < pairs.length; i += 5) {
    const from = pairs[i + 2] as number
    const scale = pairs[i + 3] as number
    let right = value(pairs[i] as number)
    let left = value(pairs[i + 1] as number)
    right = right < from ? 0 : right * scale
    left = left < from ? 0 : left * scale
    gross += right + left
    if (pairs[i + 4] === 1) differences += right > left ? right - left : left - right
  }
  let abnormal = 0
  let deducted = 0
  let added = 0
  let onHead = 0
  for (let i = 0; i < counts.length; i += 2) deducted += value(counts[i] as number) * (counts[i + 1] as number)
  abnormal = onHead = deducted
  let next = program.slots.length
  for (let i = 0; i < points.length; i += 3) {
    const from = points[i] as number
    let sum = 0
    const end = next + 1 + 2 * (values[next] as number)
    for (next += 1; next < end; next += 2) {
      const length = values[next] as number
      if (length >= from && length > (values[next + 1] as number)) sum += length
    }
    onHead += sum
    if (points[i + 1] === 1) added += sum
    else deducted += sum
    if (points[i + 2] === 1) abnormal += sum
  }
  totals[TOTALS.gross] = gross
  totals[TOTALS.grossAll] = gross + onHead
  totals[TOTALS.differences] = differences
  totals[TOTALS.abnormal] = abnormal
  totals[TOTALS.added] = added
  totals[TOTALS.net] = gross - differences - deducted + added
  return totals
}
