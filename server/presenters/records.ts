import { formatSteps, fromSixteenths, keyFigureText, currentDefinition, isCategory, type KeyFigure, type Say, type Step } from '#shared/domain/measuring/index'
import type { Method, Sex } from '#shared/domain/workflow/origins'
import type { RecordLine } from '#shared/schemas/records'
import type { ListRow } from '../read-models/records/list'
import type { Names } from '../read-models/records/names'

/** A length in sixteenths as its class writes it, never reduced. */
export function writeLength(sixteenths: number, step: Step): string {
  return formatSteps(fromSixteenths(sixteenths, step), step)
}

/** The day is never told: the year, the month with consent, or null where not even the year is known. */
export function publicDate(row: Pick<ListRow, 'taken_first_on' | 'taken_precision' | 'taken_public'>): string | null {
  if (row.taken_precision === 'unknown') return null
  return row.taken_public === 'month' ? row.taken_first_on.slice(0, 7) : row.taken_first_on.slice(0, 4)
}

function keyFiguresOf(row: Pick<ListRow, 'key_figures'>, category: string, say: Say): string[] {
  if (!isCategory(category)) return []
  const definition = currentDefinition(category)
  return (JSON.parse(row.key_figures) as KeyFigure[]).map(figure => keyFigureText(say, definition, figure))
}

/** What the public sees of a record in a list. */
export function presentRecord(row: ListRow, names: Names, rank: number, position: number | null, say: Say): RecordLine {
  const category = names.classes.get(row.class_id)!
  return {
    recordNo: row.record_no,
    rank,
    category: category.code,
    species: category.species,
    net: writeLength(row.net16, category.step),
    gross: writeLength(row.gross16, category.step),
    hunter: row.hunter_shown,
    district: names.districts.get(row.district_id)!.name,
    method: row.method as Method | null,
    origin: row.origin,
    originalOrigin: row.original_origin,
    sex: row.sex as Sex | null,
    takenOn: publicDate(row),
    acceptedOn: row.accepted_on,
    status: row.status,
    source: row.source,
    formerNo: row.former_no,
    keyFigures: keyFiguresOf(row, category.code, say),
    position,
  }
}
