import { inTransaction } from '../../../db/transaction'
import type { ActiveActor } from '../../../shared/domain/access/roles'
import { canReadEntry, canWriteSheet } from '../../../shared/domain/access/abilities'
import { problemText, readMeasurements } from '../../../shared/domain/measuring/index'
import { DomainError, type FieldError } from '../../../shared/errors'
import type { SheetInput } from '../../../shared/schemas/entries'
import type { Registry } from '../../composition'
import { lockEntry, updateEntry } from '../../repositories/entries'
import { lockOpenSheet, updateSheet } from '../../repositories/sheets'
import { accessOf } from '../entries/access'
import { definitionOf } from '../entries/context'
import { momentOf } from '../moment'
import { t } from '../texts/translate'
import { answersOf, figuresOf, hasReadings } from './read'

const NO_FIGURES = { gross: null, gross_all: null, net: null, net16: null, gross16: null } as const

/**
 * Saves the open sheet of an entry on its measurer's bench. Returns the sheet's new version.
 *
 * @param version the sheet's version that the measurer saw
 * @throws DomainError `not_found`, `forbidden`, `sheet_signed` (409), `precondition_failed` (412), `invalid_input` with
 *   paths such as `measurements.right.g2`
 */
export async function saveSheet(registry: Registry, actor: ActiveActor, uid: string, version: number, input: SheetInput, locale: string): Promise<{ version: number, entryVersion: number }> {
  const moment = await momentOf(registry)
  return inTransaction(registry.db, async (trx) => {
    const entry = await lockEntry(trx, uid)
    const access = entry && await accessOf(trx, entry)
    if (!entry || !access || !canReadEntry(actor, access)) throw new DomainError('not_found')
    if (entry.measurer_user_id !== actor.userId) throw new DomainError('forbidden')
    const open = await lockOpenSheet(trx, entry.id, 'entry')
    if (!open) throw new DomainError('sheet_signed')
    if (!canWriteSheet(actor, access)) throw new DomainError('wrong_state', { details: { state: entry.state } })
    if (open.version !== version) throw new DomainError('precondition_failed', { details: { version: open.version } })
    const definition = definitionOf(open.definition)
    const { measurements, problems } = readMeasurements(definition, input.measurements)
    const fields: FieldError[] = problems.slice(0, 100).map(problem => ({
      path: problem.path ? `measurements.${problem.path}` : 'measurements', code: problem.code,
      message: problemText((key, params) => t(locale, key, params), definition, problem),
    }))
    for (const path of ['measuredOn', 'driedSince'] as const) {
      const day = input[path]
      if (day && day > moment.today) fields.push({ path, code: 'in_future' })
    }
    if (fields.length > 0) throw new DomainError('invalid_input', { fields })
    const before = answersOf(open)
    await updateSheet(trx, open.id, {
      measurements: JSON.stringify(measurements),
      ...hasReadings(measurements) ? figuresOf(definition, measurements) : NO_FIGURES,
      ...input.measuredOn === undefined ? {} : { measured_on: input.measuredOn },
      ...input.driedSince === undefined ? {} : { dried_since: input.driedSince },
      ...input.driedFrom === undefined ? {} : { dried_from: input.driedFrom },
      slip_answers: JSON.stringify({ wholeSkull: input.wholeSkull === undefined ? before.wholeSkull : input.wholeSkull, reasons: input.reasons ?? before.reasons }),
      version: open.version + 1,
    })
    // Whoever signs names the version they read, so that nothing is signed unseen.
    await updateEntry(trx, entry.id, {})
    return { version: open.version + 1, entryVersion: entry.version + 1 }
  })
}
