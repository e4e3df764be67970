import type { SheetsRow } from '../../../db/tables'
import type { Measurements, Score, Slip, SheetDefinition } from '../../../shared/domain/measuring/index'
import { checkMeasurements, score, slips, toSixteenths } from '../../../shared/domain/measuring/index'
import { definitionOf } from '../entries/context'

/** What the measurer says about the head beside the readings, and the reasons given for slips. */
export interface SheetAnswers {
  /** whether the antlers stand on a whole skull plate; null where it was not said */
  readonly wholeSkull: boolean | null
  /** reasons by slip (`slipKey`) */
  readonly reasons: Readonly<Record<string, string>>
}

export interface ReadSheet {
  readonly row: SheetsRow
  readonly definition: SheetDefinition
  readonly measurements: Measurements
  readonly answers: SheetAnswers
  readonly score: Score
}

export function answersOf(row: Pick<SheetsRow, 'slip_answers'>): SheetAnswers {
  const stored = JSON.parse(row.slip_answers) as Partial<SheetAnswers>
  return { wholeSkull: stored.wholeSkull ?? null, reasons: stored.reasons ?? {} }
}

/** A stored sheet with its score by its own definition. */
export function readSheet(row: SheetsRow): ReadSheet {
  const definition = definitionOf(row.definition)
  const measurements = checkMeasurements(definition, JSON.parse(row.measurements))
  return { row, definition, measurements, answers: answersOf(row), score: score(definition, measurements) }
}

/** Slips of a sheet; with what blocks certifying once the dates are given. */
export function slipsOf(sheet: ReadSheet): readonly Slip[] {
  const { measured_on: measuredOn, dried_since: driedSince } = sheet.row
  const certifying = measuredOn && driedSince ? { measuredOn, driedSince, wholeSkull: sheet.answers.wholeSkull === true } : undefined
  return slips(sheet.definition, sheet.measurements, certifying)
}

/** Whether the sheet counts a spread, so that the skull plate has to be whole. */
export function countsSpread(definition: SheetDefinition): boolean {
  return definition.lines.some(line => line.kind === 'credit' && line.nature === 'spread')
}

/** Columns of a sheet that follow from its readings. Figures are kept once something was read. */
export function figuresOf(definition: SheetDefinition, measurements: Measurements) {
  const { gross, grossAll, net } = score(definition, measurements)
  return {
    gross, gross_all: grossAll, net,
    net16: toSixteenths(net, definition.step), gross16: toSixteenths(grossAll, definition.step),
  }
}

export function hasReadings(measurements: Measurements): boolean {
  const { single, right, left, lists } = measurements
  return [single, right, left, lists].some(part => Object.keys(part).length > 0)
}
