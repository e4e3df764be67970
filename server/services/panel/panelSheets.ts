import type { RemeasuringsRow, SheetsRow } from '../../../db/tables'
import { hasRole, type ActiveActor } from '../../../shared/domain/access/roles'
import { compareSheets, linesBeyond, type LineComparison } from '../../../shared/domain/workflow/remeasuring'
import { currentDefinition, problemText, readMeasurements, writeMeasurements, type Category, type Measurements } from '../../../shared/domain/measuring/index'
import { DomainError, type FieldError } from '../../../shared/errors'
import type { Registry } from '../../composition'
import { updateEntry } from '../../repositories/entries'
import { updateRemeasuring } from '../../repositories/panel'
import { findOpenSheet, insertSheet, listSheets, nextSheetNumber, updateSheet } from '../../repositories/sheets'
import { loadContext, definitionOf, findKeys, type EntryContext } from '../entries/context'
import { signSheet } from '../entries/effects/bench'
import { assertNoStake, withEntry, type LockedEntry } from '../entries/locked'
import { ANY_VERSION, performMove } from '../entries/move'
import { appendEvent } from '../events/append'
import { newUid } from '../moment'
import { verifyPassword } from '../people/verifyPassword'
import { figuresOf, hasReadings, readSheet, type ReadSheet } from '../sheets/read'
import { loadWorkflow } from '../workflow/load'
import { t } from '../texts/translate'

export interface PanelSheetInput {
  readonly measurements: unknown
  readonly measuredOn: string
  readonly wholeSkull?: boolean
}

type OwnKind = 'panel_a' | 'panel_b'

interface Measuring extends LockedEntry {
  readonly context: EntryContext
  readonly remeasuring: RemeasuringsRow
  readonly own: OwnKind
}

/** Runs an act of one of the two judges of the second measuring that is going on. */
function withMeasuring<T>(registry: Registry, actor: ActiveActor, uid: string, act: (on: Measuring) => Promise<T>): Promise<T> {
  return withEntry(registry, actor, uid, async (locked) => {
    const context = await loadContext(locked.trx, locked.entry)
    const { remeasuring } = context
    if (locked.entry.state !== 'remeasuring' || !remeasuring) throw new DomainError('wrong_state', { details: { state: locked.entry.state } })
    const own = remeasuring.judge_a === actor.userId ? 'panel_a' : remeasuring.judge_b === actor.userId ? 'panel_b' : null
    if (own === null || !hasRole(actor, 'judge')) throw new DomainError('forbidden')
    if (locked.entry.hold_at !== null) throw new DomainError('on_hold')
    await assertNoStake(locked.trx, context, actor, 'remeasure')
    return act({ ...locked, context, remeasuring, own })
  })
}

/** Sheets of the two judges that belong to this second measuring. */
async function pairSheets({ trx, entry, remeasuring }: Measuring): Promise<{ a: SheetsRow | undefined, b: SheetsRow | undefined, joint: SheetsRow | undefined }> {
  const sheets = (await listSheets(trx, entry.id)).filter(sheet => sheet.created_at >= remeasuring.ordered_at)
  const of = (kind: SheetsRow['kind']) => sheets.filter(sheet => sheet.kind === kind).at(-1)
  return { a: of('panel_a'), b: of('panel_b'), joint: of('panel_joint') }
}

function readInput(context: EntryContext, input: PanelSheetInput, today: string, locale: string): Measurements {
  const definition = currentDefinition(context.category.code as Category)
  const { measurements, problems } = readMeasurements(definition, input.measurements)
  const fields: FieldError[] = problems.slice(0, 100).map(problem => ({
    path: problem.path ? `measurements.${problem.path}` : 'measurements', code: problem.code,
    message: problemText((key, params) => t(locale, key, params), definition, problem),
  }))
  if (input.measuredOn > today) fields.push({ path: 'measuredOn', code: 'in_future' })
  if (fields.length > 0) throw new DomainError('invalid_input', { fields })
  return measurements
}

async function putSheet(on: Measuring, kind: SheetsRow['kind'], actor: ActiveActor, input: PanelSheetInput, measurements: Measurements): Promise<number> {
  const { trx, entry, context, moment } = on
  const definition = currentDefinition(context.category.code as Category)
  const open = await findOpenSheet(trx, entry.id, kind)
  const columns = {
    measurements: JSON.stringify(measurements), measured_on: input.measuredOn, measurer_user_id: actor.userId, dried_since: entry.dried_since, dried_from: entry.dried_from,
    slip_answers: JSON.stringify({ wholeSkull: input.wholeSkull ?? null, reasons: {} }),
    ...(hasReadings(measurements) ? figuresOf(definition, measurements) : { gross: null, gross_all: null, net: null, net16: null, gross16: null }),
  }
  if (open) {
    await updateSheet(trx, open.id, { ...columns, version: open.version + 1 })
    return open.version + 1
  }
  await insertSheet(trx, { uid: newUid(moment.now), entry_id: entry.id, kind, number: await nextSheetNumber(trx, entry.id, kind), definition: definition.id, created_at: moment.at, ...columns })
  return 1
}

/** Saves a judge's own sheet of the second measuring, blind to the entry sheet and to the other judge. Returns its version. */
export function savePanelSheet(registry: Registry, actor: ActiveActor, uid: string, input: PanelSheetInput, locale: string): Promise<number> {
  return withMeasuring(registry, actor, uid, async (on) => {
    const { [on.own === 'panel_a' ? 'a' : 'b']: standing } = await pairSheets(on)
    if (standing && standing.state !== 'open') throw new DomainError('sheet_signed')
    return putSheet(on, on.own, actor, input, readInput(on.context, input, on.moment.today, locale))
  })
}

function assertComplete(sheet: ReadSheet): void {
  if (sheet.score.missing.length > 0) throw new DomainError('guard_failed', { fields: sheet.score.missing.map(path => ({ path: `measurements.${path}`, code: 'required' })) })
}

/** Signs a judge's own sheet, with the password. Once both are signed, both judges see both. */
export async function signPanelSheet(registry: Registry, actor: ActiveActor, uid: string, proof: { password: string, code?: string }): Promise<void> {
  await verifyPassword(registry, actor, proof.password, { code: proof.code })
  await withMeasuring(registry, actor, uid, async (on) => {
    const open = await findOpenSheet(on.trx, on.entry.id, on.own)
    if (!open) throw new DomainError('sheet_signed')
    assertComplete(readSheet(open))
    await signSheet(on, open, actor)
    await updateRemeasuring(on.trx, on.remeasuring.id, { state: 'measuring' })
    await appendEvent(on.trx, on.entry, { kind: 'sign_panel_sheet', actor, args: { sheet: open.uid } }, on.moment)
    await updateEntry(on.trx, on.entry.id, {})
  })
}

export interface SecondMeasuringView {
  readonly definition: string
  /** what this judge wrote so far */
  readonly own: { readonly measurements: unknown, readonly measuredOn: string | null, readonly wholeSkull: boolean | null, readonly version: number, readonly signed: boolean } | null
  /** null until both have signed */
  readonly comparison: { readonly lines: readonly LineComparison[], readonly beyond: readonly LineComparison[] } | null
  readonly joint: { readonly measurements: unknown, readonly version: number, readonly signatures: number } | null
}

/** What a judge of the pair sees of the second measuring: no figure but their own until both have signed. */
export function readSecondMeasuring(registry: Registry, actor: ActiveActor, uid: string): Promise<SecondMeasuringView> {
  return withMeasuring(registry, actor, uid, async (on) => {
    const { a, b, joint } = await pairSheets(on)
    const mine = on.own === 'panel_a' ? a : b
    const both = a?.state === 'signed' && b?.state === 'signed'
    const lines = both ? compare(a, b) : null
    const read = mine && readSheet(mine)
    const readJoint = both && joint ? readSheet(joint) : null
    return {
      definition: currentDefinition(on.context.category.code as Category).id,
      own: read ? { measurements: writeMeasurements(read.definition, read.measurements), measuredOn: mine.measured_on, wholeSkull: read.answers.wholeSkull, version: mine.version, signed: mine.state !== 'open' } : null,
      comparison: lines && { lines, beyond: linesBeyond(lines) },
      joint: readJoint && {
        measurements: writeMeasurements(readJoint.definition, readJoint.measurements), version: readJoint.row.version,
        signatures: [on.remeasuring.joint_signed_a_at, on.remeasuring.joint_signed_b_at].filter(Boolean).length,
      },
    }
  })
}

function compare(a: SheetsRow, b: SheetsRow): LineComparison[] {
  const definition = definitionOf(a.definition)
  return compareSheets(definition.lines, readSheet(a).measurements, readSheet(b).measurements)
}

/** Lines within the limit are settled by the two sheets: the joint one lies between them. Lines beyond it were taped again. */
function jointFaults(lines: readonly LineComparison[], joint: Measurements): FieldError[] {
  return lines.filter(line => !line.beyond && line.place === null).flatMap((line) => {
    const value = joint[line.side][line.line] ?? null
    const [low, high] = [line.a, line.b].map(Number).sort((x, y) => x - y)
    const fits = line.a === 'absent' ? value === 'absent' : typeof value === 'number' && value >= low! && value <= high!
    const path = line.side === 'single' ? line.line : `${line.side}.${line.line}`
    return fits ? [] : [{ path: `measurements.${path}`, code: 'not_between' }]
  })
}

/** Saves the joint sheet, once both judges have signed their own. A change takes back a signature that was on it. */
export function saveJointSheet(registry: Registry, actor: ActiveActor, uid: string, input: PanelSheetInput, locale: string): Promise<number> {
  return withMeasuring(registry, actor, uid, async (on) => {
    const { a, b } = await pairSheets(on)
    if (a?.state !== 'signed' || b?.state !== 'signed') throw new DomainError('wrong_state', { details: { state: 'unsigned' } })
    const measurements = readInput(on.context, input, on.moment.today, locale)
    const faults = jointFaults(compare(a, b), measurements)
    if (faults.length > 0) throw new DomainError('invalid_input', { fields: faults })
    const version = await putSheet(on, 'panel_joint', actor, input, measurements)
    await updateRemeasuring(on.trx, on.remeasuring.id, { joint_signed_a_at: null, joint_signed_b_at: null })
    return version
  })
}

/**
 * Signs the joint sheet as it stands in a version. With the second signature it is locked, its net stands, and the entry goes back
 * to whoever ordered the second measuring.
 *
 * @returns whether both have signed now
 */
export async function signJointSheet(registry: Registry, actor: ActiveActor, uid: string, version: number, proof: { password: string, code?: string }): Promise<boolean> {
  await verifyPassword(registry, actor, proof.password, { code: proof.code })
  return withMeasuring(registry, actor, uid, async (on) => {
    const { trx, entry, remeasuring, moment } = on
    const open = await findOpenSheet(trx, entry.id, 'panel_joint')
    if (!open) throw new DomainError('not_found')
    if (open.version !== version) throw new DomainError('version_conflict', { details: { version: open.version } })
    assertComplete(readSheet(open))
    const mine = on.own === 'panel_a' ? 'joint_signed_a_at' : 'joint_signed_b_at'
    const theirs = on.own === 'panel_a' ? remeasuring.joint_signed_b_at : remeasuring.joint_signed_a_at
    await updateRemeasuring(trx, remeasuring.id, { [mine]: moment.at })
    await appendEvent(trx, entry, { kind: 'sign_joint_sheet', actor, args: { sheet: open.uid } }, moment)
    if (theirs === null) return false
    await signSheet(on, open, actor)
    await updateRemeasuring(trx, remeasuring.id, { joint_sheet_id: open.id })
    const workflow = await loadWorkflow(trx, entry.workflow_version_id)
    const row = workflow.rows.find(one => one.effects.includes('stand_panel_sheet'))
    await performMove({
      trx, entry, performer: { kind: 'person', actor, keys: await findKeys(trx, actor.userId) }, moment, passwordVerified: true,
      input: { transition: row!.code, version: ANY_VERSION },
    }, workflow)
    return true
  })
}
