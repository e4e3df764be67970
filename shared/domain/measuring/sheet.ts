import type { Side, Step } from './units'

/**
 * What a score sheet is: lines of a few kinds, as data. The scoring function knows these kinds and no species.
 */

/** What the tape or caliper measures on a line; slips and the limits of a second measuring go by it. */
export const NATURES = ['length', 'point', 'spread', 'circumference', 'palm', 'width', 'count', 'skull'] as const
export type Nature = (typeof NATURES)[number]

interface AnyLine {
  readonly id: string
  readonly nature: Nature
  /** Key of the line's label and instruction in the message files, below `sheet.lines`. */
  readonly text: string
  /** Whole inches (or points) outside which a reading is a slip of the pen, until the lists have enough records. */
  readonly wide?: readonly [least: number, most: number]
  /** There is always a place for it: `absent` is no answer when a sheet is certified. */
  readonly always?: true
}

/** One value that counts once. */
export interface CreditLine extends AnyLine {
  readonly kind: 'credit'
  /** A paired line: the longer of its sides is the most that this line may count. */
  readonly capBy?: string
}

/** A right and a left; both count. */
export interface PairedLine extends AnyLine {
  readonly kind: 'paired'
  /** Whether the sides are compared and |right - left| is taken off. */
  readonly difference: boolean
  /** Steps below which a projection is no point and is left out of the sum. */
  readonly pointFrom?: number
}

/** A right and a left in whole points; one point counts one inch. */
export interface CountPairLine extends AnyLine {
  readonly kind: 'countPair'
  readonly difference: boolean
}

/** One number for both sides; each costs one inch. */
export interface DeductedCountLine extends AnyLine {
  readonly kind: 'deductedCount'
}

/** A list of points, each with its side and length, taken off or added. */
export interface ListLine extends AnyLine {
  readonly kind: 'deductedList' | 'addedList'
  readonly tally: 'abnormal' | 'crown'
  readonly pointFrom: number
  /** Whether a point's width may be given, to tell a point from a bump. */
  readonly width: boolean
}

/** Written down, never counted. */
export interface RecordLine extends AnyLine {
  readonly kind: 'recordOnly'
  readonly sides: boolean
}

export type Line = CreditLine | PairedLine | CountPairLine | DeductedCountLine | ListLine | RecordLine
export type LineKind = Line['kind']

/** Slips that a sheet's definition asks for. Codes of measuring slips are one vocabulary everywhere. */
export const SLIP_CODES = [
  'spread_capped',
  'not_a_point',
  'circumference_grows',
  'quarter_not_smaller',
  'sides_differ',
  'tape_offset',
  'gap_in_points',
  'unlikely',
  'incomplete',
  'too_fresh',
  'whole_skull',
] as const
export type SlipCode = (typeof SLIP_CODES)[number]

export const SEVERITIES = ['notice', 'blocking'] as const
export type Severity = (typeof SEVERITIES)[number]

export type SlipRule
  = | { readonly code: 'spread_capped' | 'whole_skull', readonly line: string }
    | { readonly code: 'not_a_point' | 'unlikely' }
    | {
      readonly code: 'circumference_grows'
      /** `to` over `from` by more than `over` steps is a slip. */
      readonly pairs: readonly { readonly from: string, readonly to: string, readonly over: number }[]
    }
    | {
      readonly code: 'quarter_not_smaller'
      readonly base: string
      readonly quarters: readonly string[]
      /** Above the base by this many steps or more is a slip. */
      readonly by: number
    }
    | {
      readonly code: 'sides_differ'
      /** Lengths: by this share of the longer (1/n) and by at least so many steps. */
      readonly lengthShare: number
      readonly lengthFrom: number
      readonly circumferenceFrom: number
    }
    | {
      readonly code: 'tape_offset'
      readonly from: number
      readonly to: number
      readonly lines: number
    }
    | {
      readonly code: 'gap_in_points'
      readonly severity: Severity
      /** Points in the order in which they rise from the beam; one given after one that is not there is a slip. */
      readonly points: readonly string[]
    }

/** The first things that are asked at a bench, by family. */
export type KeyFigureRule
  = | { readonly code: 'points', readonly beam: string, readonly points: readonly string[] }
    | { readonly code: 'counted_points', readonly lines: readonly string[] }
    | { readonly code: 'single', readonly line: string }
    | { readonly code: 'longer', readonly line: string }

export const FAMILIES = ['deer', 'elk', 'moose', 'caribou', 'pronghorn', 'sheep', 'goat', 'bison', 'muskox', 'skull'] as const
export type Family = (typeof FAMILIES)[number]

export const TYPICALITIES = ['typical', 'nontypical', 'single'] as const
export type Typicality = (typeof TYPICALITIES)[number]

/** A numbered sheet. It is never edited once used: a correction is a new number, and old sheets keep theirs. */
export interface SheetDefinition<Category extends string = string> {
  /** `<category>@<number>`. */
  readonly id: `${Category}@${number}`
  readonly category: Category
  readonly number: number
  readonly species: string
  readonly typicality: Typicality
  readonly family: Family
  readonly step: Step
  /** The head is scored on a whole skull plate because a spread counts. */
  readonly lines: readonly Line[]
  readonly slips: readonly SlipRule[]
  readonly keyFigures: readonly KeyFigureRule[]
}

/** The steps of a line, or that the animal does not have it. A line that was not measured has no reading. */
export type Reading = number | 'absent'

/** A point on a list: whole steps. */
export interface ListPoint {
  readonly side: Side
  readonly length: number
  readonly width?: number
}

declare const checked: unique symbol

/**
 * Checked measurements of one sheet in whole steps of that sheet (counts in whole points). Only `readMeasurements` and
 * `checkMeasurements` make them. This is the form in which a sheet is kept.
 */
export interface Measurements {
  readonly single: Readonly<Record<string, Reading>>
  readonly right: Readonly<Record<string, Reading>>
  readonly left: Readonly<Record<string, Reading>>
  readonly lists: Readonly<Record<string, readonly ListPoint[]>>
  readonly [checked]: true
}

/** Whether a line has a right and a left. */
export function hasSides(line: Line): boolean {
  return line.kind === 'paired' || line.kind === 'countPair' || (line.kind === 'recordOnly' && line.sides)
}

/** Whether a line is a list of points. */
export function isList(line: Line): line is ListLine {
  return line.kind === 'deductedList' || line.kind === 'addedList'
}

/** Whether a line's readings are whole points and not lengths. */
export function isCount(line: Pick<Line, 'nature'>): boolean {
  return line.nature === 'count'
}
