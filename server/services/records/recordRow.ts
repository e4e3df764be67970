import { shownName, sortName, type PrintedAs } from '#shared/domain/lists'
import { keyFigures, type Measurements, type SheetDefinition } from '#shared/domain/measuring/index'
import type { RecordsInsert } from '../../../db/tables'
import { sqlTime } from '../../../db/time'

/** What of an accepted entry the public lists show. */
export interface AcceptedEntry extends Pick<RecordsInsert,
  'entry_id' | 'animal_id' | 'class_id' | 'species_id' | 'district_id' | 'method' | 'origin' | 'original_origin' | 'sex' | 'net16' | 'gross16'
  | 'taken_first_on' | 'taken_last_on' | 'taken_precision' | 'source'> {
  readonly recordNo: number
  readonly formerNo: string | null
  readonly monthPublic: boolean
  /** name of the hunter, or of the finder or holder where nobody hunted it */
  readonly printedName: string
  readonly printedAs: PrintedAs
  /** day of acceptance in the registry's zone */
  readonly acceptedOn: string
  readonly acceptedAt: Date
  /** the sheet whose net stands; null for a record taken over without one */
  readonly sheet: { readonly id: number, readonly definition: SheetDefinition, readonly measurements: Measurements } | null
}

/** The row of `records` for an entry that is accepted: the only place where names are shortened for the lists. */
export function recordRow(entry: AcceptedEntry): RecordsInsert {
  const { recordNo, formerNo, monthPublic, printedName, printedAs, acceptedOn, acceptedAt, sheet, ...same } = entry
  const hunterShown = shownName(printedName, printedAs)
  return {
    ...same,
    record_no: recordNo,
    former_no: formerNo,
    taken_public: monthPublic && (same.taken_precision === 'day' || same.taken_precision === 'month') ? 'month' : 'year',
    hunter_shown: hunterShown,
    hunter_sort: sortName(hunterShown),
    accepted_on: acceptedOn,
    accepted_at: sqlTime(acceptedAt),
    key_figures: JSON.stringify(sheet ? keyFigures(sheet.definition, sheet.measurements) : []),
    sheet_id: sheet?.id ?? null,
  }
}
