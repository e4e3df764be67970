import type { Nature } from '../measuring/sheet'

export interface ListPlace {
  /** records of the class, region-wide and over all methods */
  readonly total: number
  readonly higher: number
  readonly equal: number
}

/**
 * Whether a second measuring is due for a certified net: it would be a new best or stand among the first places of its class. In a
 * short list only a new best counts, since almost everything would be among the first there.
 */
export function isSecondMeasuringDue(place: ListPlace, limits: { readonly firstPlaces: number, readonly smallList: number }): boolean {
  if (place.higher === 0 && place.equal === 0) return true
  return place.total >= limits.smallList && place.higher < limits.firstPlaces
}

/** How far two measurings may lie apart before a line is taped again together, in steps of the sheet or whole points. */
export const REMEASURE_LIMITS: Readonly<Record<Nature, number>> = {
  length: 2,
  point: 2,
  spread: 2,
  circumference: 1,
  palm: 3,
  width: 1,
  count: 0,
  skull: 1,
}

export const LINE_SIDES = ['single', 'right', 'left'] as const
export type LineSide = (typeof LINE_SIDES)[number]

interface Readings {
  readonly single: Readonly<Record<string, number | 'absent'>>
  readonly right: Readonly<Record<string, number | 'absent'>>
  readonly left: Readonly<Record<string, number | 'absent'>>
  readonly lists: Readonly<Record<string, readonly { readonly side: 'right' | 'left', readonly length: number }[]>>
}

interface MeasuredLine {
  readonly id: string
  readonly nature: Nature
  readonly kind: string
}

export interface LineComparison {
  readonly line: string
  readonly side: LineSide
  /** place on a list of points, longest first; null for a line with one reading */
  readonly place: number | null
  readonly a: number | 'absent' | null
  readonly b: number | 'absent' | null
  /** steps (or points) between the two; null where only one has a length */
  readonly apart: number | null
  readonly beyond: boolean
}

type Figure = number | 'absent' | null

function distance(a: Figure, b: Figure): number | null {
  if (typeof a === 'number' && typeof b === 'number') return Math.abs(a - b)
  return a === b ? 0 : null
}

function compare(line: MeasuredLine, side: LineSide, place: number | null, a: Figure, b: Figure): LineComparison {
  const apart = distance(a, b)
  return { line: line.id, side, place, a, b, apart, beyond: apart === null || apart > REMEASURE_LIMITS[line.nature] }
}

function comparePoints(line: MeasuredLine, a: Readings, b: Readings): LineComparison[] {
  return (['right', 'left'] as const).flatMap((side) => {
    const lengths = (readings: Readings) => (readings.lists[line.id] ?? [])
      .filter(point => point.side === side).map(point => point.length).sort((x, y) => y - x)
    const [ofA, ofB] = [lengths(a), lengths(b)]
    return Array.from({ length: Math.max(ofA.length, ofB.length) }, (_, place) =>
      compare(line, side, place, ofA[place] ?? null, ofB[place] ?? null))
  })
}

/**
 * Two sheets of one head, line by line. Lines that neither measured are left out; a line that one has and the other lacks is
 * beyond every limit. Points of a list are laid beside each other longest first.
 */
export function compareSheets(lines: readonly MeasuredLine[], a: Readings, b: Readings): LineComparison[] {
  return lines.flatMap((line) => {
    if (line.kind === 'deductedList' || line.kind === 'addedList') return comparePoints(line, a, b)
    return LINE_SIDES.flatMap((side) => {
      const [ofA, ofB] = [a[side][line.id] ?? null, b[side][line.id] ?? null]
      return ofA === null && ofB === null ? [] : [compare(line, side, null, ofA, ofB)]
    })
  })
}

/** Lines that both judges tape again together. */
export function linesBeyond(comparisons: readonly LineComparison[]): LineComparison[] {
  return comparisons.filter(comparison => comparison.beyond)
}
