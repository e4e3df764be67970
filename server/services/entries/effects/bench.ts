import { checkMeasurements, classesFor, currentDefinition, NOTHING_MEASURED, type Category, type SheetDefinition } from '../../../../shared/domain/measuring/index'
import { findOpenSheet, findSheetById, insertSheet, nextSheetNumber, updateSheet } from '../../../repositories/sheets'
import { newUid } from '../../moment'
import { mintClaimCode } from '../claimCode'
import { definitionOf } from '../context'
import { sayNet } from '../say'
import { answersOf, figuresOf, hasReadings, readSheet } from '../../sheets/read'
import { sheetHash } from '../../sheets/sheetHash'
import type { SheetsRow } from '../../../../db/tables'
import type { Json } from '../../../../shared/domain/canonical'
import type { Effect, EffectContext } from './context'

export const makeClaimCode: Effect = async ({ trx, context, moment, told }) => {
  told.claimCode = await mintClaimCode(trx, context.entry.uid, moment)
}

export const assignMeasurer: Effect = ({ input, patch, args, facts, holders, move }) => {
  if (move.to !== 'measuring') return
  if (facts.measurerUserId !== null) holders.push(facts.measurerUserId)
  patch.measurer_user_id = input.measurerUserId
  if (input.measurer) args.measurer = input.measurer
}

async function beginSheet({ trx, context, moment }: EffectContext, measurerUserId: number | null, from: SheetsRow | null, reason: string | null): Promise<void> {
  const { entry, category } = context
  const definition = currentDefinition(category.code as Category)
  await insertSheet(trx, {
    uid: newUid(moment.now), entry_id: entry.id, kind: 'entry', number: await nextSheetNumber(trx, entry.id, 'entry'), definition: definition.id,
    measurements: JSON.stringify(NOTHING_MEASURED), measurer_user_id: measurerUserId,
    dried_since: from?.dried_since ?? entry.dried_since, dried_from: from?.dried_from ?? entry.dried_from,
    replaces_id: from?.id ?? null, reason, created_at: moment.at,
  })
}

/** An open sheet moved to another class: readings of the same lines stay, others begin anew. */
function inClass(open: SheetsRow, definition: SheetDefinition): Partial<SheetsRow> {
  const before = definitionOf(open.definition)
  const sameLines = (classesFor(definition.category as Category) as readonly string[]).includes(before.category)
  const measurements = sameLines ? checkMeasurements(definition, JSON.parse(open.measurements)) : NOTHING_MEASURED
  const figures = hasReadings(measurements) ? figuresOf(definition, measurements) : { gross: null, gross_all: null, net: null, net16: null, gross16: null }
  return { definition: definition.id, measurements: JSON.stringify(measurements), ...figures }
}

/** Lays an empty sheet of the class on the bench; one that waits there already only changes hands. */
export const openSheet: Effect = async (effect) => {
  const { trx, context, input, move } = effect
  if (move.to !== 'measuring') return
  const measurer = input.measurerUserId ?? context.entry.measurer_user_id
  const open = await findOpenSheet(trx, context.entry.id, 'entry')
  const definition = currentDefinition(context.category.code as Category)
  if (!open) {
    const signed = context.entry.signed_sheet_id === null ? null : (await findSheetById(trx, context.entry.signed_sheet_id)) ?? null
    await beginSheet(effect, measurer, signed, signed && (effect.input.comment ?? null))
    return
  }
  await updateSheet(trx, open.id, { measurer_user_id: measurer, ...open.definition === definition.id ? {} : inClass(open, definition) })
}

/** A correction is a new sheet that names the one it replaces; the old one stays as it was signed. */
export const newSheetVersion: Effect = async (effect) => {
  const { trx, context, input } = effect
  const signed = (await findSheetById(trx, context.entry.signed_sheet_id!))!
  await beginSheet(effect, context.entry.measurer_user_id, signed, input.comment ?? null)
}

/** Puts hash and time on a sheet, whereupon it never changes. Returns what the entry takes from it. */
export async function signSheet({ trx, context, moment }: Pick<EffectContext, 'trx' | 'context' | 'moment'>, row: SheetsRow, measurer: { userId: number, uid: string }): Promise<{ net16: number, gross16: number }> {
  const sheet = readSheet(row)
  const figures = figuresOf(sheet.definition, sheet.measurements)
  const hash = sheetHash({
    entry: context.entry.uid, kind: row.kind, number: row.number, definition: row.definition, measurements: JSON.parse(row.measurements) as Json,
    measuredOn: row.measured_on!, driedSince: row.dried_since, measurer: measurer.uid, signedAt: moment.now.toISOString(),
    slipAnswers: answersOf(row) as unknown as Json,
  })
  await updateSheet(trx, row.id, {
    ...figures, measurer_user_id: measurer.userId, slip_answers: JSON.stringify(answersOf(row)), state: 'signed', signed_at: moment.at, hash,
  })
  if (row.replaces_id !== null) await updateSheet(trx, row.replaces_id, { state: 'replaced' })
  return { net16: figures.net16, gross16: figures.gross16 }
}

export const lockSheet: Effect = async (effect) => {
  const { trx, context, actor, patch, args, says } = effect
  const open = (await findOpenSheet(trx, context.entry.id, 'entry'))!
  const figures = await signSheet(effect, open, actor!)
  Object.assign(patch, { signed_sheet_id: open.id, standing_sheet_id: open.id, dried_since: open.dried_since, dried_from: open.dried_from, ...figures })
  Object.assign(args, { sheet: open.uid, net16: figures.net16, gross16: figures.gross16 })
  says.net = sayNet(figures.net16, context.category.step)
}
