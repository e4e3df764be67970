import type { Line, ListLine, ListPoint, Measurements, Nature, Reading, SheetDefinition } from './sheet'
import { hasSides, isCount, isList } from './sheet'
import type { Side, Step } from './units'
import { STEPS_PER_INCH } from './units'

/** What happened to a line beyond plain adding; said in the reader's language as `sheet.notes.<code>`. */
export type Note
  /** The line counts no more than the longer side of `line`. */
  = | { readonly code: 'capped', readonly line: string, readonly read: number, readonly counted: number }
  /** A projection that is no point: left out of the sum. */
    | { readonly code: 'left_out', readonly side: Side, readonly read: number }
  /** One side lacks the line: the difference is the other side's whole length. */
    | { readonly code: 'one_side_only', readonly side: Side, readonly difference: number }

/** A point of a list, and whether it is one. */
export interface ScoredPoint extends ListPoint {
  readonly counted: boolean
}

/** One line of a sheet with what it gave. Lengths in steps; readings of count lines in points. */
export interface ScoredLine {
  readonly id: string
  readonly kind: Line['kind']
  readonly nature: Nature
  readonly text: string
  readonly single: Reading | null
  readonly right: Reading | null
  readonly left: Reading | null
  readonly points: readonly ScoredPoint[] | null
  /** What the line gives in steps before anything is taken off; 0 for what is only recorded. */
  readonly counted: number
  /** |right - left| in steps, or null where the sides are not compared. */
  readonly difference: number | null
  /** What the line adds to the net, in steps; below 0 for what is taken off. */
  readonly share: number
  readonly notes: readonly Note[]
}

export interface Totals {
  /** Steps. credit + right column + left column: the frame. */
  readonly gross: number
  /** The frame with abnormal and crown points: what a bench calls "gross". */
  readonly grossAll: number
  readonly differences: number
  /** All abnormal points, taken off or added. */
  readonly abnormal: number
  /** What lists add to the net: abnormal points on a non-typical sheet, crown points. */
  readonly added: number
  readonly net: number
}

/** A score with every line explained. Lengths in whole steps of the sheet. */
export interface Score extends Totals {
  readonly definition: string
  readonly category: string
  readonly step: Step
  /** Every line that counts was measured or is absent. */
  readonly complete: boolean
  /** Paths of counting lines that were not measured, such as `right.g2`. */
  readonly missing: readonly string[]
  /** Paths of lines that are only recorded and have no reading. */
  readonly unrecorded: readonly string[]
  readonly credit: number
  readonly right: number
  readonly left: number
  readonly crown: number
  /** In the order in which a person would add them. */
  readonly lines: readonly ScoredLine[]
}

/** The columns of the sum while it is being added. */
interface Columns {
  credit: number
  right: number
  left: number
  differences: number
  abnormal: number
  crown: number
  deducted: number
  added: number
  missing: string[]
  unrecorded: string[]
}

const NO_NOTES: readonly Note[] = []

/** A reading as it enters a sum: what is absent or not measured is 0. */
export const inSum = (reading: Reading | undefined): number => (typeof reading === 'number' ? reading : 0)

/**
 * Whether a projection on a list is a point: at least `pointFrom` long and, where its width was taken, longer than wide;
 * equal is not longer (a public agency's slides on scoring; half an inch for caribou is from memory).
 */
export function isPoint(line: ListLine, point: ListPoint): boolean {
  return point.length >= line.pointFrom && (point.width === undefined || point.length > point.width)
}

/**
 * Scores a sheet by its definition, exactly, and explains every line.
 *
 * net = gross - differences - deducted points + added points (published sheet walk-throughs).
 */
export function score(definition: SheetDefinition, measurements: Measurements): Score {
  const per = STEPS_PER_INCH[definition.step]
  const columns: Columns = { credit: 0, right: 0, left: 0, differences: 0, abnormal: 0, crown: 0, deducted: 0, added: 0, missing: [], unrecorded: [] }
  const lines: ScoredLine[] = []
  for (const line of definition.lines) lines.push(scoreLine(line, measurements, columns, per))

  const gross = columns.credit + columns.right + columns.left
  return {
    definition: definition.id,
    category: definition.category,
    step: definition.step,
    complete: columns.missing.length === 0,
    missing: columns.missing,
    unrecorded: columns.unrecorded,
    credit: columns.credit,
    right: columns.right,
    left: columns.left,
    gross,
    grossAll: gross + columns.abnormal + columns.crown,
    differences: columns.differences,
    abnormal: columns.abnormal,
    crown: columns.crown,
    added: columns.added,
    net: gross - columns.differences - columns.deducted + columns.added,
    lines,
  }
}

function scoreLine(line: Line, measurements: Measurements, columns: Columns, per: number): ScoredLine {
  if (isList(line)) return scoreList(line, measurements, columns)
  if (hasSides(line)) return scoreSides(line, measurements, columns, per)
  return scoreSingle(line, measurements, columns, per)
}

function scoreSingle(line: Line, measurements: Measurements, columns: Columns, per: number): ScoredLine {
  const reading = measurements.single[line.id]
  if (reading === undefined) (line.kind === 'recordOnly' ? columns.unrecorded : columns.missing).push(line.id)
  const read = inSum(reading)
  let counted = 0
  let share = 0
  let notes = NO_NOTES
  if (line.kind === 'credit') {
    counted = read
    if (line.capBy !== undefined) {
      const most = Math.max(inSum(measurements.right[line.capBy]), inSum(measurements.left[line.capBy]))
      if (read > most) {
        counted = most
        notes = [{ code: 'capped', line: line.capBy, read, counted }]
      }
    }
    share = counted
    columns.credit += counted
  }
  else if (line.kind === 'deductedCount') {
    counted = read * per
    share = 0 - counted
    columns.abnormal += counted
    columns.deducted += counted
  }
  return {
    id: line.id, kind: line.kind, nature: line.nature, text: line.text,
    single: reading ?? null, right: null, left: null, points: null, counted, difference: null, share, notes,
  }
}

function scoreSides(line: Line, measurements: Measurements, columns: Columns, per: number): ScoredLine {
  const right = measurements.right[line.id]
  const left = measurements.left[line.id]
  const open = line.kind === 'recordOnly' ? columns.unrecorded : columns.missing
  if (right === undefined) open.push(`right.${line.id}`)
  if (left === undefined) open.push(`left.${line.id}`)
  let counted = 0
  let difference: number | null = null
  let notes = NO_NOTES
  if (line.kind === 'paired' || line.kind === 'countPair') {
    const scale = isCount(line) ? per : 1
    const from = line.kind === 'paired' ? line.pointFrom ?? 0 : 0
    const rightRead = inSum(right)
    const leftRead = inSum(left)
    const rightCounts = rightRead >= from ? rightRead * scale : 0
    const leftCounts = leftRead >= from ? leftRead * scale : 0
    counted = rightCounts + leftCounts
    columns.right += rightCounts
    columns.left += leftCounts
    if (line.difference) {
      difference = Math.abs(rightCounts - leftCounts)
      columns.differences += difference
    }
    if (rightCounts === 0 || leftCounts === 0) notes = notesOfSides(rightRead, leftRead, rightCounts, leftCounts, difference)
  }
  return {
    id: line.id, kind: line.kind, nature: line.nature, text: line.text,
    single: null, right: right ?? null, left: left ?? null, points: null, counted, difference, share: counted - (difference ?? 0), notes,
  }
}

function notesOfSides(rightRead: number, leftRead: number, rightCounts: number, leftCounts: number, difference: number | null): readonly Note[] {
  const notes: Note[] = []
  if (rightRead > 0 && rightCounts === 0) notes.push({ code: 'left_out', side: 'right', read: rightRead })
  if (leftRead > 0 && leftCounts === 0) notes.push({ code: 'left_out', side: 'left', read: leftRead })
  if (difference !== null && difference > 0) {
    notes.push({ code: 'one_side_only', side: rightCounts > 0 ? 'right' : 'left', difference })
  }
  return notes
}

function scoreList(line: ListLine, measurements: Measurements, columns: Columns): ScoredLine {
  const given = measurements.lists[line.id]
  if (given === undefined) columns.missing.push(line.id)
  let counted = 0
  const points: ScoredPoint[] = []
  const notes: Note[] = []
  for (const point of given ?? []) {
    const counts = isPoint(line, point)
    points.push({ ...point, counted: counts })
    if (counts) counted += point.length
    else notes.push({ code: 'left_out', side: point.side, read: point.length })
  }
  columns[line.tally] += counted
  columns[line.kind === 'addedList' ? 'added' : 'deducted'] += counted
  return {
    id: line.id, kind: line.kind, nature: line.nature, text: line.text,
    single: null, right: null, left: null, points: given === undefined ? null : points,
    counted, difference: null, share: line.kind === 'addedList' ? counted : 0 - counted, notes,
  }
}

/** Points that stand on one side of the head by a sheet's lists. */
export function countedOnList(score: Score, side: Side): number {
  return score.lines.reduce((sum, line) => sum + (line.points ?? []).filter((point) => point.counted && point.side === side).length, 0)
}

/** The sheet turned round: what was right is left. The net of a sheet does not change by it. */
export function swapSides(measurements: Measurements): Measurements {
  const other = (side: Side): Side => (side === 'right' ? 'left' : 'right')
  const lists = Object.fromEntries(Object.entries(measurements.lists).map(([id, points]) =>
    [id, points.map((point) => ({ ...point, side: other(point.side) }))]))
  return { ...measurements, right: measurements.left, left: measurements.right, lists }
}
