import { draw, svgOf } from '../../../shared/domain/measuring/drawing/index'
import { DomainError } from '../../../shared/errors'
import type { Registry } from '../../composition'
import { listedByNo } from '../../read-models/records/list'
import { findSheetById } from '../../repositories/sheets'
import { readSheet } from '../sheets/read'
import { drawingWords } from '../sheets/drawingWords'

/**
 * The picture of a listed record from its certified sheet, as SVG.
 *
 * @throws DomainError `not_found` for a number without a record in the lists, and for a record without a sheet
 */
export async function drawRecord(registry: Registry, recordNo: number, locale: string): Promise<string> {
  const row = await listedByNo(registry.db, recordNo)
  const kept = row?.sheet_id ? await findSheetById(registry.db, row.sheet_id) : undefined
  if (!kept) throw new DomainError('not_found')
  const { definition, measurements } = readSheet(kept)
  return svgOf(draw(definition, measurements), drawingWords(definition, measurements, locale))
}
