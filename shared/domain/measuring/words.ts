import type { Problem } from './measurements'
import type { KeyFigure } from './keyFigures'
import type { Note } from './score'
import type { Line, SheetDefinition } from './sheet'
import type { Slip } from './slips'
import type { Argument, Side, Step } from './units'
import { formatSteps } from './units'

/**
 * From codes and arguments to keys and parameters of the message files. No sentence stands here: `say` finds it in the
 * reader's language, on a page or in an answer.
 */
export type Say = (key: string, params?: Record<string, unknown>) => string

/** Label of a line: words before numbers, `Second point (G2)`. */
export function lineLabel(say: Say, line: Pick<Line, 'text'>): string {
  return say(`sheet.lines.${line.text}.label`)
}

/** Where the tape, cable or caliper starts and ends. */
export function lineInstruction(say: Say, line: Pick<Line, 'text'>): string {
  return say(`sheet.lines.${line.text}.tape`)
}

const labelOf = (say: Say, definition: SheetDefinition, id: string): string => {
  const line = definition.lines.find((candidate) => candidate.id === id)
  return line ? lineLabel(say, line) : id
}

const sideWord = (say: Say, side: Side): string => say(`sheet.sides.${side}`)

function argumentText(say: Say, definition: SheetDefinition, argument: Argument): string | number {
  if ('steps' in argument) return formatSteps(argument.steps, argument.step)
  if ('count' in argument) return argument.count
  if ('line' in argument) return labelOf(say, definition, argument.line)
  if ('side' in argument) return sideWord(say, argument.side)
  return 'date' in argument ? argument.date : argument.text
}

function params(say: Say, definition: SheetDefinition, args: Readonly<Record<string, Argument>>): Record<string, unknown> {
  return Object.fromEntries(Object.entries(args).map(([name, argument]) => [name, argumentText(say, definition, argument)]))
}

/** Codes whose sentence depends on what was found. */
function slipKeyOfText(slip: Slip): string {
  switch (slip.code) {
    case 'not_a_point': return slip.args.width ? 'not_a_point.wide' : slip.args.number ? 'not_a_point.listed' : 'not_a_point.tine'
    case 'unlikely': return slip.args.number ? 'unlikely.listed' : 'unlikely.reading'
    case 'gap_in_points': return `gap_in_points.${slip.severity}`
    case 'incomplete': return `incomplete.${slip.args.reason && 'text' in slip.args.reason ? slip.args.reason.text : 'not_measured'}`
    default: return slip.code
  }
}

/** Lines of these slips are named together with their side. */
const PLACED: ReadonlySet<Slip['code']> = new Set(['unlikely', 'incomplete'])

/** The sentence of a slip. */
export function slipText(say: Say, definition: SheetDefinition, slip: Slip): string {
  const label = slip.line === null ? undefined : labelOf(say, definition, slip.line)
  const side = slip.side === null ? undefined : sideWord(say, slip.side)
  const line = label && side && PLACED.has(slip.code) && !slip.args.number ? say('sheet.placeOnSide', { line: label, side }) : label
  return say(`sheet.slips.${slipKeyOfText(slip)}`, { line, side, ...params(say, definition, slip.args), ...(line ? { line } : {}) })
}

/** The sentence of a measurement that could not be read. */
export function problemText(say: Say, definition: SheetDefinition, problem: Pick<Problem, 'code' | 'args'>): string {
  return say(`sheet.refusals.${problem.code}`, params(say, definition, problem.args))
}

/** What happened to a line beyond plain adding. */
export function noteText(say: Say, definition: SheetDefinition, note: Note): string {
  const { step } = definition
  switch (note.code) {
    case 'capped': return say('sheet.notes.capped', { line: labelOf(say, definition, note.line), ...lengths({ read: note.read, counted: note.counted }, step) })
    case 'left_out': return say('sheet.notes.left_out', { side: sideWord(say, note.side), ...lengths({ read: note.read }, step) })
    case 'one_side_only': return say('sheet.notes.one_side_only', { side: sideWord(say, note.side), ...lengths({ difference: note.difference }, step) })
  }
}

const lengths = (steps: Record<string, number>, step: Step): Record<string, string> =>
  Object.fromEntries(Object.entries(steps).map(([name, value]) => [name, formatSteps(value, step)]))

/** A key figure in words: `6 × 5 points`, `22 3/8 inside`. */
export function keyFigureText(say: Say, definition: SheetDefinition, figure: KeyFigure): string {
  return figure.code === 'points'
    ? say('sheet.keyFigures.points', { right: figure.right, left: figure.left })
    : say(`sheet.keyFigures.${figure.line}`, { length: formatSteps(figure.steps, definition.step) })
}
