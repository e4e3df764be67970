import type { ListLine, Line, Measurements, PairedLine, Reading, Severity, SheetDefinition, SlipCode, SlipRule } from './sheet'
import { hasSides, isCount, isList } from './sheet'
import { daysBetween } from '../dates'
import { inSum, isPoint, score } from './score'
import type { Argument, Side, Step } from './units'
import { SIDES, STEPS_PER_INCH } from './units'

/** A slip that was caught: code and arguments. `line` and `side` say where, when it is one place. */
export interface Slip {
  readonly code: SlipCode
  readonly line: string | null
  readonly side: Side | null
  readonly severity: Severity
  readonly args: Readonly<Record<string, Argument>>
}

/** What a sheet is certified with. Dates are days in the registry's time zone, `YYYY-MM-DD`. */
export interface Certifying {
  readonly measuredOn: string
  readonly driedSince: string
  /** The antlers stand on a whole skull plate. */
  readonly wholeSkull: boolean
}

/** Days of drying before an official measuring; day 0 is the day counted from (state wildlife agency's news releases, 2020 and 2025). */
export const DRYING_DAYS = 60

/** Names a slip of one sheet, so that a reason given for it stays with it: `gap_in_points:g3:left`. */
export function slipKey(slip: Pick<Slip, 'code' | 'line' | 'side'>): string {
  return `${slip.code}:${slip.line ?? ''}:${slip.side ?? ''}`
}

interface Look {
  readonly definition: SheetDefinition
  readonly measurements: Measurements
  readonly step: Step
  readonly found: Slip[]
}

const length = (look: Look, steps: number): Argument => ({ steps, step: look.step })

const reading = (look: Look, line: Line, value: number): Argument => (isCount(line) ? { count: value } : length(look, value))

function notice(look: Look, code: SlipCode, line: string | null, side: Side | null, args: Slip['args'], severity: Severity = 'notice'): void {
  look.found.push({ code, line, side, severity, args })
}

/**
 * Catches the slips of a sheet that need no statistics, as its definition names them, in the order of the definition.
 *
 * @param certifying given when the sheet is to be certified: adds what blocks that (lines that are neither measured nor
 *   absent, too few days of drying, a spread on a split skull).
 */
export function slips(definition: SheetDefinition, measurements: Measurements, certifying?: Certifying): readonly Slip[] {
  const look: Look = { definition, measurements, step: definition.step, found: [] }
  for (const rule of definition.slips) check(look, rule, certifying)
  alwaysThere(look)
  if (certifying) {
    incomplete(look)
    tooFresh(look, certifying)
  }
  return look.found
}

function check(look: Look, rule: SlipRule, certifying: Certifying | undefined): void {
  switch (rule.code) {
    case 'spread_capped': return spreadCapped(look, rule.line)
    case 'whole_skull': return wholeSkull(look, rule.line, certifying)
    case 'not_a_point': return notAPoint(look)
    case 'unlikely': return unlikely(look)
    case 'circumference_grows': return circumferenceGrows(look, rule)
    case 'quarter_not_smaller': return quarterNotSmaller(look, rule)
    case 'sides_differ': return sidesDiffer(look, rule)
    case 'tape_offset': return tapeOffset(look, rule)
    case 'gap_in_points': return gapInPoints(look, rule)
  }
}

function spreadCapped(look: Look, id: string): void {
  const line = look.definition.lines.find((candidate) => candidate.id === id)
  if (line?.kind !== 'credit' || line.capBy === undefined) return
  const read = inSum(look.measurements.single[id])
  const beams = SIDES.map((side) => look.measurements[side][line.capBy as string])
  // While a beam is still to be measured nobody knows yet what caps the spread.
  if (beams.includes(undefined)) return
  const most = Math.max(...beams.map(inSum))
  if (read > most) notice(look, 'spread_capped', id, null, { read: length(look, read), counted: length(look, most), by: { line: line.capBy } })
}

function wholeSkull(look: Look, id: string, certifying: Certifying | undefined): void {
  if (certifying && !certifying.wholeSkull && typeof look.measurements.single[id] === 'number') {
    notice(look, 'whole_skull', id, null, { line: { line: id } }, 'blocking')
  }
}

function notAPoint(look: Look): void {
  for (const line of look.definition.lines) {
    if (line.kind === 'paired' && line.pointFrom !== undefined) shortPoints(look, line, line.pointFrom)
    else if (isList(line)) bumps(look, line)
  }
}

function shortPoints(look: Look, line: PairedLine, least: number): void {
  for (const side of SIDES) {
    const read = inSum(look.measurements[side][line.id])
    if (read > 0 && read < least) notice(look, 'not_a_point', line.id, side, { read: length(look, read), least: length(look, least) })
  }
}

function bumps(look: Look, line: ListLine): void {
  look.measurements.lists[line.id]?.forEach((point, index) => {
    if (isPoint(line, point)) return
    const args: Record<string, Argument> = {
      number: { count: index + 1 }, read: length(look, point.length), least: length(look, line.pointFrom),
    }
    if (point.width !== undefined) args.width = length(look, point.width)
    notice(look, 'not_a_point', line.id, point.side, args)
  })
}

type RuleOf<Code extends SlipRule['code']> = Extract<SlipRule, { code: Code }>

function circumferenceGrows(look: Look, rule: RuleOf<'circumference_grows'>): void {
  for (const side of SIDES) {
    for (const { from, to, over } of rule.pairs) {
      const lower = inSum(look.measurements[side][from])
      const upper = inSum(look.measurements[side][to])
      if (lower > 0 && upper - lower > over) {
        notice(look, 'circumference_grows', to, side, { from: { line: from }, lower: length(look, lower), upper: length(look, upper) })
      }
    }
  }
}

function quarterNotSmaller(look: Look, rule: RuleOf<'quarter_not_smaller'>): void {
  for (const side of SIDES) {
    const base = inSum(look.measurements[side][rule.base])
    for (const id of rule.quarters) {
      const quarter = inSum(look.measurements[side][id])
      if (base > 0 && quarter - base >= rule.by) {
        notice(look, 'quarter_not_smaller', id, side, { base: length(look, base), read: length(look, quarter) })
      }
    }
  }
}

/** The readings of a paired line when both sides have it. */
function bothSides(look: Look, line: PairedLine): readonly [right: number, left: number] | undefined {
  const least = Math.max(1, line.pointFrom ?? 0)
  const right = inSum(look.measurements.right[line.id])
  const left = inSum(look.measurements.left[line.id])
  return right >= least && left >= least ? [right, left] : undefined
}

function sidesDiffer(look: Look, rule: RuleOf<'sides_differ'>): void {
  for (const line of look.definition.lines) {
    if (line.kind !== 'paired' || !line.difference) continue
    const both = bothSides(look, line)
    if (!both) continue
    const [right, left] = both
    const difference = Math.abs(right - left)
    const slip = line.nature === 'circumference'
      ? difference >= rule.circumferenceFrom
      : difference >= rule.lengthFrom && difference * rule.lengthShare >= Math.max(right, left)
    if (slip) notice(look, 'sides_differ', line.id, null, { right: length(look, right), left: length(look, left), difference: length(look, difference) })
  }
}

function tapeOffset(look: Look, rule: RuleOf<'tape_offset'>): void {
  const differences: number[] = []
  for (const line of look.definition.lines) {
    if (line.kind !== 'paired' || (line.nature !== 'length' && line.nature !== 'point')) continue
    const both = bothSides(look, line)
    if (both) differences.push(both[0] - both[1])
  }
  if (differences.length < rule.lines) return
  const within = (sign: number) => differences.every((difference) => difference * sign >= rule.from && difference * sign <= rule.to)
  const longer: Side | undefined = within(1) ? 'right' : within(-1) ? 'left' : undefined
  if (longer) notice(look, 'tape_offset', null, longer, { lines: { count: differences.length }, longer: { side: longer } })
}

function gapInPoints(look: Look, rule: RuleOf<'gap_in_points'>): void {
  for (const side of SIDES) {
    const last = rule.points.findLastIndex((id) => inSum(look.measurements[side][id]) > 0)
    rule.points.slice(0, Math.max(last, 0)).forEach((id) => {
      if (inSum(look.measurements[side][id]) > 0) return
      notice(look, 'gap_in_points', id, side, { next: { line: rule.points[last] as string } }, rule.severity)
    })
  }
}

function unlikely(look: Look): void {
  for (const line of look.definition.lines) {
    if (!line.wide) continue
    const per = isCount(line) ? 1 : STEPS_PER_INCH[look.step]
    const least = line.wide[0] * per
    const most = line.wide[1] * per
    const judge = (value: Reading | undefined, side: Side | null, at?: number) => {
      if (typeof value !== 'number' || (value >= least && value <= most)) return
      const args = { read: reading(look, line, value), least: reading(look, line, least), most: reading(look, line, most) }
      notice(look, 'unlikely', line.id, side, at === undefined ? args : { ...args, number: { count: at + 1 } })
    }
    if (isList(line)) look.measurements.lists[line.id]?.forEach((point, index) => judge(point.length, point.side, index))
    else if (hasSides(line)) for (const side of SIDES) judge(look.measurements[side][line.id], side)
    else judge(look.measurements.single[line.id], null)
  }
}

/** A circumference always has a place, a skull its bone: `absent` there makes the sheet one that cannot be certified. */
function alwaysThere(look: Look): void {
  for (const line of look.definition.lines) {
    if (!line.always) continue
    const places: readonly (Side | null)[] = hasSides(line) ? SIDES : [null]
    for (const side of places) {
      if (look.measurements[side ?? 'single'][line.id] === 'absent') {
        notice(look, 'incomplete', line.id, side, { reason: { text: 'always_there' } }, 'blocking')
      }
    }
  }
}

function incomplete(look: Look): void {
  const { missing, unrecorded } = score(look.definition, look.measurements)
  const counts = new Set(look.definition.lines.filter(isCount).map((line) => line.id))
  for (const path of [...missing, ...unrecorded]) {
    const [first, second] = path.split('.') as [string, string?]
    const line = second ?? first
    // Points that are only recorded follow from the sheet itself when nobody counted them.
    if (unrecorded.includes(path) && counts.has(line)) continue
    notice(look, 'incomplete', line, second === undefined ? null : first as Side, { reason: { text: 'not_measured' } }, 'blocking')
  }
}

function tooFresh(look: Look, { measuredOn, driedSince }: Certifying): void {
  const days = daysBetween(driedSince, measuredOn)
  if (days >= DRYING_DAYS) return
  notice(look, 'too_fresh', null, null, { days: { count: days }, needed: { count: DRYING_DAYS }, since: { date: driedSince } }, 'blocking')
}
