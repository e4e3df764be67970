import { formatSteps, writeMeasurements, type Say } from '../../../shared/domain/measuring/index'
import { DomainError } from '../../../shared/errors'
import type { RecordAnswer } from '../../../shared/schemas/records'
import { dayIn } from '../../clock'
import type { Registry } from '../../composition'
import { parseSqlTime } from '../../../db/time'
import { presentRecord, publicDate, writeLength } from '../../presenters/records'
import { besideInClass, listedByNo, type ListRow } from '../../read-models/records/list'
import { readNames } from '../../read-models/records/names'
import { publicHistory } from '../../read-models/records/history'
import { findSheetById } from '../../repositories/sheets'
import { presentLine } from '../scores/scoreSheet'
import { readSheet } from '../sheets/read'
import { t } from '../texts/translate'
import { ranksOf, standingIn } from './ranks'

/** How many records of the same list are shown above and below. */
const NEIGHBOURS = 2

/**
 * One record as the public sees it: its line, its sheet explained, its ranks, its neighbours and what has happened to it.
 *
 * @param version of the lists (`listsVersion`), as the caller read it for this answer
 * @throws DomainError `not_found` for a number that no record in the lists has
 */
export async function readRecord(registry: Registry, recordNo: number, locale: string, version: number): Promise<RecordAnswer> {
  const { db } = registry
  const [row, names] = await Promise.all([listedByNo(db, recordNo), readNames(db)])
  if (!row) throw new DomainError('not_found')
  const say: Say = (key, params) => t(locale, key, params)
  const [{ timeZone, societyName }, region, inDistrict, above, below, events, sheet] = await Promise.all([
    registry.settings(),
    standingIn(db, version, row, { districtId: null, method: undefined }),
    standingIn(db, version, row, { districtId: row.district_id, method: undefined }),
    besideInClass(db, row, 'above', NEIGHBOURS),
    besideInClass(db, row, 'below', NEIGHBOURS),
    publicHistory(db, row.entry_id),
    row.sheet_id === null ? null : presentSheet(registry, row.sheet_id, say),
  ])
  const { step, scientificName } = names.classes.get(row.class_id)!
  const beside: ListRow[] = [...above, row, ...below]
  const rank = await ranksOf(db, version, beside, { districtId: null, method: undefined })
  const { position: _, ...line } = presentRecord(row, names, region.rank, null, say)
  return {
    ...line,
    region: { rank: region.rank, total: region.total, sharedBy: region.sharedBy },
    inDistrict: { rank: inDistrict.rank, total: inDistrict.total, sharedBy: inDistrict.sharedBy },
    society: societyName,
    url: `${registry.config.publicUrl}/records/${row.record_no}`,
    districtCode: names.districts.get(row.district_id)!.code,
    scientificName,
    sheet,
    neighbours: beside.map(one => ({
      recordNo: one.record_no, rank: rank(one), net: writeLength(one.net16, step), hunter: one.hunter_shown, district: names.districts.get(one.district_id)!.name, takenOn: publicDate(one),
    })),
    history: events.map(event => ({ on: dayIn(timeZone, parseSqlTime(event.at)), what: event.kind })),
  }
}

async function presentSheet(registry: Registry, sheetId: number, say: Say): Promise<RecordAnswer['sheet']> {
  const row = await findSheetById(registry.db, sheetId)
  if (!row) return null
  const { definition, measurements, score } = readSheet(row)
  const shown = (steps: number) => formatSteps(steps, definition.step)
  return {
    definition: definition.id,
    step: `${definition.step} in`,
    measurements: writeMeasurements(definition, measurements),
    measuredOn: row.measured_on?.slice(0, 4) ?? null,
    totals: {
      gross: shown(score.gross), grossAll: shown(score.grossAll), differences: shown(score.differences),
      abnormal: shown(score.abnormal), added: shown(score.added), net: shown(score.net),
    },
    lines: score.lines.map(line => presentLine(definition, line, say)),
  }
}
