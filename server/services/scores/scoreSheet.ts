import {
  classesFor, currentDefinition, formatSteps, isCategory, isCount, lineLabel, noteText, problemText, readMeasurements, roundDown, score, slips, slipText, fromSixteenths, toSixteenths,
  type Category, type Measurements, type Reading, type Score, type ScoredLine, type SheetDefinition,
} from '#shared/domain/measuring/index'
import { DomainError } from '#shared/errors'
import type { ClassStanding, ScoreAnswer, ScoreRequest } from '#shared/schemas/scores'
import { dayIn } from '../../clock'
import type { Registry } from '../../composition'
import { classesInForce, rankOf } from '../../read-models/classStandings'
import { t } from '../texts/translate'

/**
 * Scores a sheet for anyone and stores nothing: the score with every line, the slips, and every class that the same
 * measurements could enter with its minimum in force, its margin and the rank it would take.
 *
 * Throws `not_found` for a class nobody knows, `invalid_input` with a path such as `measurements.right.g2` for what
 * cannot be read.
 */
export async function scoreSheet(registry: Registry, request: ScoreRequest, locale: string): Promise<ScoreAnswer> {
  if (!isCategory(request.category)) throw new DomainError('not_found')
  const definition = currentDefinition(request.category)
  const measurements = roundDown(definition, read(definition, request.measurements, locale), request.roundDown)
  const result = score(definition, measurements)
  const say = (key: string, params?: Record<string, unknown>) => t(locale, key, params)
  const shown = (steps: number) => formatSteps(steps, definition.step)
  return {
    category: definition.category,
    definition: definition.id,
    step: `${definition.step} in`,
    complete: result.complete,
    missing: [...result.missing],
    gross: shown(result.gross),
    grossUnits: result.gross,
    grossAll: shown(result.grossAll),
    differences: shown(result.differences),
    abnormal: shown(result.abnormal),
    crown: shown(result.crown),
    added: shown(result.added),
    net: shown(result.net),
    netUnits: result.net,
    lines: result.lines.map(line => presentLine(definition, line, say)),
    slips: slips(definition, measurements).map(slip => ({
      code: slip.code, line: slip.line, side: slip.side, severity: slip.severity, message: slipText(say, definition, slip),
    })),
    classes: await standings(registry, request.category, measurements),
  }
}

function read(definition: SheetDefinition, raw: unknown, locale: string): Measurements {
  const { measurements, problems } = readMeasurements(definition, raw)
  if (problems.length === 0) return measurements
  throw new DomainError('invalid_input', {
    fields: problems.slice(0, 100).map(problem => ({
      path: problem.path ? `measurements.${problem.path}` : 'measurements',
      code: problem.code,
      message: problemText((key, params) => t(locale, key, params), definition, problem),
    })),
  })
}

export function presentLine(definition: SheetDefinition, line: ScoredLine, say: Parameters<typeof lineLabel>[0]): ScoreAnswer['lines'][number] {
  const shown = (steps: number) => formatSteps(steps, definition.step)
  const reading = (value: Reading | null) => (value === null || value === 'absent' ? value : isCount(line) ? String(value) : shown(value))
  return {
    id: line.id,
    label: lineLabel(say, line),
    right: reading(line.right),
    left: reading(line.left),
    value: reading(line.single),
    points: line.points?.map(point => ({
      side: point.side, length: shown(point.length), width: point.width === undefined ? null : shown(point.width), counted: point.counted,
    })) ?? null,
    counted: shown(line.counted),
    difference: line.difference === null ? null : shown(line.difference),
    share: shown(line.share),
    note: line.notes.map(note => noteText(say, definition, note)).join('; ') || null,
  }
}

/** Every class that one set of measurements could enter, each with its own net. */
export async function standings(registry: Registry, category: Category, measurements: Measurements): Promise<ClassStanding[]> {
  const { timeZone } = await registry.settings()
  const inForce = new Map((await classesInForce(registry.db, dayIn(timeZone, registry.clock.now()))).map(row => [row.code, row]))
  return Promise.all(classesFor(category).map(async (other) => {
    const result: Score = score(currentDefinition(other), measurements)
    const known = inForce.get(other)
    return standing(registry, result, known?.id, known?.min16 ?? null)
  }))
}

async function standing(registry: Registry, { category, step, net }: Score, classId: number | undefined, min16: number | null): Promise<ClassStanding> {
  const shown = (steps: number) => formatSteps(steps, step)
  if (classId === undefined || min16 === null) return { category, net: shown(net), minimum: null, margin: null, rank: null }
  const margin = net - fromSixteenths(min16, step)
  return {
    category,
    net: shown(net),
    minimum: shown(fromSixteenths(min16, step)),
    margin: shown(margin),
    rank: margin < 0 ? null : await rankOf(registry.db, classId, toSixteenths(net, step)),
  }
}
