/**
 * Lengths as whole steps of an inch, and every way in which a person at a bench writes one.
 *
 * Antlers and horns are measured to the nearest 1/8 in and kept in eighths, never reduced (pronghorn measuring
 * instructions, published leaflet copy); skulls to the nearest 1/16 in (outfitters' guide; Outdoor Life, June 2011).
 * Nothing here uses floating point for a length: a decimal is taken apart digit by digit.
 */

/** How many steps one inch has, by the step's name. */
export const STEPS_PER_INCH = { '1/8': 8, '1/16': 16 } as const

/** The step in which a sheet is measured. */
export type Step = keyof typeof STEPS_PER_INCH

/** The longest length that is believed to be one: a twenty-foot tape. Longer is a slip of the pen and is refused. */
export const LONGEST_INCHES = 240

/** The most points that one line or one list can hold. */
export const MOST_POINTS = 200

/** An argument of a code: what the sentence in the reader's language will name. */
export type Argument
  = | { readonly steps: number, readonly step: Step }
    | { readonly count: number }
    | { readonly line: string }
    | { readonly side: Side }
    | { readonly text: string }
    | { readonly date: string }

/** The animal's own sides. Seen from the front, its right is at the reader's left. */
export const SIDES = ['right', 'left'] as const
export type Side = (typeof SIDES)[number]

/** Why a piece of writing is no length or no count. */
export const UNIT_REFUSALS = [
  'empty',
  'unreadable',
  'other_digits',
  'comma',
  'negative',
  'too_long',
  'off_step',
  'fraction_over_one',
  'not_whole',
  'too_many',
] as const
export type UnitRefusal = (typeof UNIT_REFUSALS)[number]

export interface Refused {
  readonly ok: false
  readonly code: UnitRefusal
  readonly args: Readonly<Record<string, Argument>>
}

/** A length in whole steps, or a count; or why it is none. */
export type Parsed = { readonly ok: true, readonly value: number } | Refused

const refuse = (code: UnitRefusal, args: Record<string, Argument> = {}): Refused => ({ ok: false, code, args })
const accept = (value: number): Parsed => ({ ok: true, value })

/** Longer than any writing of a length; what is longer is not read at all. */
const LONGEST_WRITING = 40

/** Code points of the digit nought in scripts whose digits people type beside Latin ones. */
const OTHER_NOUGHTS = [0x0660, 0x06f0, 0x0966, 0x09e6, 0x0e50, 0xff10]

const WRITTEN_FRACTIONS: Readonly<Record<string, string>> = {
  '⅛': '1/8', '¼': '1/4', '⅜': '3/8', '½': '1/2', '⅝': '5/8', '¾': '3/4', '⅞': '7/8',
}

function withLatinDigits(text: string): string {
  return text.replace(/\p{Nd}/gu, (digit) => {
    const code = digit.codePointAt(0) as number
    const nought = OTHER_NOUGHTS.find((zero) => code >= zero && code <= zero + 9)
    return nought === undefined ? digit : String(code - nought)
  })
}

/** One space between parts, plain dashes and slashes, no inch mark. */
function tidy(text: string): string {
  return text
    .replace(/[⅛¼⅜½⅝¾⅞]/gu, (sign) => ` ${WRITTEN_FRACTIONS[sign]}`)
    .replace(/[\u2010-\u2015\u2212]/gu, '-')
    .replace(/[\u2044\u2215]/gu, '/')
    .replace(/\s+/gu, ' ')
    .trim()
    .replace(/ ?(?:"|″|”|''|in|in\.|inch|inches)$/iu, '')
}

/** A length in steps as a whole part and a numerator over a denominator, exactly. */
function fromParts(whole: string, numerator: number, denominator: number, step: Step): Parsed {
  if (denominator === 0) return refuse('unreadable')
  const per = STEPS_PER_INCH[step]
  // Seven digits of inches are far beyond any tape and keep every product below 2^53.
  if (whole.length > 7 || Number(whole) + numerator / denominator > LONGEST_INCHES) return tooLong()
  const inSteps = numerator * per
  const below = Number(whole) * per + Math.floor(inSteps / denominator)
  if (inSteps % denominator !== 0) return offStep(below, step)
  if (numerator >= denominator) return refuse('fraction_over_one', { instead: { steps: below, step } })
  return accept(below)
}

const tooLong = (): Refused => refuse('too_long', { most: { count: LONGEST_INCHES } })

const offStep = (below: number, step: Step): Refused =>
  refuse('off_step', { below: { steps: below, step }, above: { steps: below + 1, step } })

/** Digits after the point that are read exactly; what differs only beyond them is off every step anyway. */
const EXACT_DECIMALS = 9

function fromDecimal(whole: string, decimals: string, step: Step): Parsed {
  const digits = decimals.replace(/0+$/u, '')
  if (digits === '') return fromParts(whole, 0, 1, step)
  // A last 1 stands for all that was cut off, so that it stays off the step.
  const kept = digits.length > EXACT_DECIMALS ? `${digits.slice(0, EXACT_DECIMALS)}1` : digits
  return fromParts(whole, Number(kept), 10 ** kept.length, step)
}

function fromNumber(inches: number, step: Step): Parsed {
  if (!Number.isFinite(inches)) return refuse('unreadable')
  if (inches < 0) return refuse('negative')
  if (inches > LONGEST_INCHES) return tooLong()
  // Multiplying by 8 or 16 is exact in binary, so the test for a whole step is exact too.
  const steps = inches * STEPS_PER_INCH[step]
  return Number.isInteger(steps) ? accept(steps) : offStep(Math.floor(steps), step)
}

/** What keeps a text from being read at all, before its form is looked at. */
function refusedWriting(text: string): Refused | undefined {
  if (text === '') return refuse('empty')
  if (text.length > LONGEST_WRITING) return refuse('unreadable')
  const latin = withLatinDigits(text)
  if (latin !== text) return refuse('other_digits', { reading: { text: latin } })
  if (/^-/u.test(text)) return /^- ?[\d.]/u.test(text) ? refuse('negative') : refuse('unreadable')
  if (/^\d+,\d+$/u.test(text)) return refuse('comma', { reading: { text: text.replace(',', '.') } })
  return undefined
}

/**
 * Reads a length.
 *
 * @param written `21 3/8`, `21-3` or `21 3` (a bare second number is steps), `21 1/2`, `21.375`, `21`, `3/8`, with or
 *   without an inch mark; or a number of inches.
 * @param step the step of the sheet: 1/8 in, on skulls 1/16 in.
 * @returns whole steps, or a refusal. `off_step` names the two nearest steps, the lower first, because a tape that
 *   reads between two steps is written as the lower (common practice, no source).
 */
export function parseLength(written: string | number, step: Step): Parsed {
  if (typeof written === 'number') return fromNumber(written, step)
  const text = tidy(written)
  const refused = refusedWriting(text)
  if (refused) return refused

  const fraction = /^(?:(\d+)(?: ?- ?| ))?(\d{1,6}) ?\/ ?(\d{1,6})$/u.exec(text)
  if (fraction) return fromParts(fraction[1] ?? '0', Number(fraction[2]), Number(fraction[3]), step)
  const bare = /^(\d+)(?: ?- ?| )(\d{1,6})$/u.exec(text)
  if (bare) return fromParts(bare[1] as string, Number(bare[2]), STEPS_PER_INCH[step], step)
  const decimal = /^(\d*)\.(\d+)$/u.exec(text)
  if (decimal) return fromDecimal(decimal[1] || '0', decimal[2] as string, step)
  if (/^\d+$/u.test(text)) return fromParts(text, 0, 1, step)
  return refuse('unreadable')
}

/** Reads a count of points: a whole number from 0 to `MOST_POINTS`, as a number or as digits. */
export function parseCount(written: string | number): Parsed {
  if (typeof written === 'number') return fromCountNumber(written)
  const text = tidy(written)
  const refused = refusedWriting(text)
  if (refused) return refused
  if (/^\d+$/u.test(text)) return text.length > 7 ? tooMany() : fromCountNumber(Number(text))
  return parseLength(text, '1/16').ok || /^[\d ./-]+$/u.test(text) ? refuse('not_whole') : refuse('unreadable')
}

const tooMany = (): Refused => refuse('too_many', { most: { count: MOST_POINTS } })

function fromCountNumber(count: number): Parsed {
  if (!Number.isFinite(count)) return refuse('unreadable')
  if (count < 0) return refuse('negative')
  if (count > MOST_POINTS) return tooMany()
  return Number.isInteger(count) ? accept(count) : refuse('not_whole')
}

/** A length taken apart for showing: sign, whole inches, and how many steps of `per` follow. */
export interface SplitLength {
  readonly negative: boolean
  readonly whole: number
  readonly fraction: number
  readonly per: number
}

/** Takes a length in steps apart; the fraction is never reduced. */
export function splitSteps(steps: number, step: Step): SplitLength {
  const per = STEPS_PER_INCH[step]
  const size = Math.abs(steps)
  return { negative: steps < 0, whole: Math.floor(size / per), fraction: size % per, per }
}

/** Writes a length in steps as the lists do: `187 4/8`, `18 12/16`, `-8 2/8`; the fraction is never reduced (P1). */
export function formatSteps(steps: number, step: Step): string {
  const { negative, whole, fraction, per } = splitSteps(steps, step)
  return `${negative ? '-' : ''}${whole} ${fraction}/${per}`
}

/** A length in sixteenths of an inch, the common step in which records of all classes are kept. */
export function toSixteenths(steps: number, step: Step): number {
  return steps * (STEPS_PER_INCH['1/16'] / STEPS_PER_INCH[step])
}

/** A length kept in sixteenths in the step of its class. A length off that step is a defect and throws. */
export function fromSixteenths(sixteenths: number, step: Step): number {
  const steps = sixteenths / (STEPS_PER_INCH['1/16'] / STEPS_PER_INCH[step])
  if (!Number.isInteger(steps)) throw new RangeError(`${sixteenths} sixteenths do not fall on a step of ${step} in`)
  return steps
}
