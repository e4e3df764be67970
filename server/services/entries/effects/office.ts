import { currentDefinition, type Category } from '../../../../shared/domain/measuring/index'
import type { Json } from '../../../../shared/domain/canonical'
import { DomainError } from '../../../../shared/errors'
import { findTerm } from '../../../repositories/catalogue'
import { setLiveEntry, clearLiveEntry } from '../../../repositories/entries'
import { untickAllChecks } from '../../../repositories/office'
import { findSheetById, insertSheet, nextSheetNumber, updateSheet } from '../../../repositories/sheets'
import { findAccounts } from '../../../repositories/stakes'
import { newUid } from '../../moment'
import { answersOf, figuresOf, readSheet } from '../../sheets/read'
import { sheetHash } from '../../sheets/sheetHash'
import { sayNet } from '../say'
import type { Effect } from './context'

/** The minimums term of the first submission holds for the entry from then on. */
export const pinTerm: Effect = async ({ trx, context, patch, args, moment }) => {
  if (context.entry.term_id !== null) return
  const term = await findTerm(trx, moment.today)
  if (!term) throw new DomainError('guard_failed', { fields: [{ path: 'term', code: 'no_term' }] })
  patch.term_id = term.id
  args.term = term.label
}

export const markSubmitted: Effect = ({ context, patch, moment }) => {
  patch.submitted_at = context.entry.submitted_at ?? moment.at
}

export const takeReview: Effect = ({ actor, patch }) => {
  patch.reviewer_user_id = actor!.userId
}

/** After an appeal another reviewer takes the file, from the beginning. */
export const clearReview: Effect = async ({ trx, context, patch }) => {
  patch.reviewer_user_id = null
  await untickAllChecks(trx, context.entry.id)
}

/** Moves the entry to the other class of its lines: a new sheet with the same readings, scored by the other definition. */
export const changeClass: Effect = async ({ trx, context, otherClass, input, moment, patch, args, says }) => {
  const before = (await findSheetById(trx, context.entry.standing_sheet_id!))!
  const definition = currentDefinition(otherClass!.code as Category)
  const { measurements } = readSheet(before)
  const figures = figuresOf(definition, measurements)
  const [measurer] = before.measurer_user_id === null ? [] : await findAccounts(trx, [before.measurer_user_id])
  const number = await nextSheetNumber(trx, context.entry.id, before.kind)
  const id = await insertSheet(trx, {
    uid: newUid(moment.now), entry_id: context.entry.id, kind: before.kind, number, definition: definition.id,
    measurements: before.measurements, ...figures, measured_on: before.measured_on, measurer_user_id: before.measurer_user_id,
    measurer_name: before.measurer_name, dried_since: before.dried_since, dried_from: before.dried_from, state: 'signed', signed_at: moment.at,
    replaces_id: before.id, reason: input.comment ?? null, slip_answers: before.slip_answers, created_at: moment.at,
    hash: sheetHash({
      entry: context.entry.uid, kind: before.kind, number, definition: definition.id, measurements: JSON.parse(before.measurements) as Json,
      measuredOn: before.measured_on!, driedSince: before.dried_since, measurer: measurer?.uid ?? before.measurer_name ?? '',
      signedAt: moment.now.toISOString(), slipAnswers: answersOf(before) as unknown as Json,
    }),
  })
  await updateSheet(trx, before.id, { state: 'replaced' })
  Object.assign(patch, { class_id: otherClass!.id, standing_sheet_id: id, net16: figures.net16, gross16: figures.gross16 })
  if (context.entry.signed_sheet_id === before.id) patch.signed_sheet_id = id
  Object.assign(args, { fromClass: context.category.code, toClass: otherClass!.code, net16: figures.net16 })
  says.net = sayNet(figures.net16, definition.step)
}

export const markRevived: Effect = ({ patch, moment }) => {
  patch.revived_at = moment.at
}

export const markAppealed: Effect = ({ patch, moment }) => {
  patch.appealed_at = moment.at
}

export const refuseEntry: Effect = ({ input, args, says }) => {
  args.ground = input.ground ?? null
  says.ground = { text: `names.grounds.${input.ground}` }
  says.reason = input.reason ?? null
}

/** Makes the entry the live one of its animal. */
export const claimAnimal: Effect = async ({ trx, context }) => {
  await setLiveEntry(trx, context.entry.animal_id, context.entry.id)
}

export const freeAnimal: Effect = async ({ trx, context }) => {
  await clearLiveEntry(trx, context.entry.animal_id, context.entry.id)
}

export const noteWithdrawalAsked: Effect = ({ input, says }) => {
  says.text = input.text ?? null
}

/** Stops every clock and the panel. What is left of a running term is kept, and runs on from the day the hold is lifted. */
export const setHold: Effect = ({ actor, input, patch, moment }) => {
  Object.assign(patch, { hold_at: moment.at, hold_by: actor!.userId, hold_reason: input.comment!.trim() })
}
