import { isoTime, isoTimeOrNull } from '../../db/time'
import type { EntriesRow, RequestsRow, SheetsRow } from '../../db/tables'
import type { ActiveActor } from '../../shared/domain/access/roles'
import { daysBetween, formatInexactDate } from '../../shared/domain/dates'
import { formatSteps, fromSixteenths, writeMeasurements, type Step } from '../../shared/domain/measuring/index'
import { statementSigners } from '../../shared/domain/workflow/origins'
import type { EntryFacts } from '../../shared/domain/workflow/facts'
import { WHOSE_TURN } from '../../shared/domain/workflow/states'
import type { NextAct } from '../../shared/domain/workflow/transition'
import type { DistrictRecord } from '../repositories/catalogue'
import type { EventRow, EventText } from '../repositories/events'
import type { AccountRow } from '../repositories/stakes'
import type { EntryContext } from '../services/entries/context'
import type { Moment } from '../services/moment'
import { answersOf, readSheet } from '../services/sheets/read'
import type { Workflow } from '../services/workflow/load'

interface EntryParts {
  readonly as: 'owner' | 'bench' | 'staff'
  readonly context: EntryContext
  readonly facts: EntryFacts
  readonly workflow: Workflow
  readonly moment: Moment
  readonly requests: readonly RequestsRow[]
  readonly sheets: readonly SheetsRow[]
  readonly district: DistrictRecord | null
  readonly accounts: readonly AccountRow[]
  readonly recordNo: number | null
  readonly isBlind: boolean
  readonly canWriteFacts: boolean
  readonly canWriteSheet: boolean
  readonly acts: readonly NextAct[]
}

const written = (value16: number | null, step: Step) => value16 === null ? null : formatSteps(fromSixteenths(value16, step), step)

function presentSheet(row: SheetsRow) {
  const { definition, measurements } = readSheet(row)
  const { wholeSkull, reasons } = answersOf(row)
  return {
    id: row.uid, kind: row.kind, number: row.number, state: row.state, version: row.version, definition: row.definition,
    measurements: writeMeasurements(definition, measurements), net: written(row.net16, definition.step), gross: written(row.gross16, definition.step),
    measuredOn: row.measured_on, driedSince: row.dried_since, driedFrom: row.dried_from, wholeSkull, reasons,
    signedAt: isoTimeOrNull(row.signed_at), hash: row.hash, reason: row.reason,
  }
}

/** Sheets that a viewer sees: the entrant and the bench see entry sheets, the entrant what the panel signed jointly too. */
function sheetsFor({ as, sheets, isBlind }: EntryParts) {
  if (isBlind) return []
  return sheets.filter(sheet => as === 'bench'
    ? sheet.kind === 'entry'
    : as === 'owner'
      ? sheet.kind === 'rough' || (sheet.kind === 'entry' && sheet.state !== 'open') || (sheet.kind === 'panel_joint' && sheet.state === 'signed')
      : sheet.kind !== 'rough' && sheet.state !== 'open').map(presentSheet)
}

/** What of an entry leaves the house, given who looks. Reachable only through `readEntry`, which has checked that they may. */
export function presentEntry(parts: EntryParts) {
  const { as, context, facts, workflow, moment, isBlind } = parts
  const { entry, category, people } = context
  const account = (id: number | null) => {
    const found = parts.accounts.find(one => one.id === id)
    return found ? { id: found.uid, name: found.name } : null
  }
  const reach = as !== 'staff' && !isBlind
  return {
    id: entry.uid,
    version: entry.version,
    state: entry.state,
    turn: WHOSE_TURN[entry.state],
    stateSince: isoTime(entry.state_since),
    dueOn: entry.due_on,
    daysLeft: entry.due_on === null ? null : daysBetween(moment.today, entry.due_on),
    today: moment.today,
    returnTo: entry.return_to,
    as,
    isOwn: as === 'owner',
    onHold: entry.hold_at !== null,
    category: category.code,
    species: category.species,
    definition: category.definition,
    origin: entry.origin,
    originalOrigin: entry.original_origin,
    district: parts.district?.code ?? null,
    districtName: parts.district?.name ?? null,
    districtSide: entry.district_side,
    classLine: facts.classLine,
    takenOn: formatInexactDate({ first: entry.taken_first_on, last: entry.taken_last_on, precision: entry.taken_precision }),
    method: entry.method,
    sex: entry.sex,
    guided: entry.guided === null ? null : entry.guided === 1,
    hunterPrintedAs: entry.hunter_printed_as,
    guardianChoseName: (JSON.parse(entry.facts) as { guardianChoseName?: boolean }).guardianChoseName === true,
    monthPublic: entry.month_public === 1,
    driedSince: entry.dried_since,
    driedFrom: entry.dried_from,
    dryingDays: workflow.limits.dryingDays,
    measurer: account(entry.measurer_user_id),
    reviewer: as === 'staff' ? account(entry.reviewer_user_id) : null,
    people: isBlind
      ? []
      : people.map(person => ({
          id: person.uid, part: person.part, name: person.name, isMinor: person.is_minor === 1, diedOn: person.died_on,
          isMe: person.user_id !== null && person.user_id === entry.owner_user_id,
          address: reach ? person.address : null, email: reach ? person.email : null, phone: reach ? person.phone : null, bornOn: reach ? person.born_on : null,
        })),
    net: isBlind ? null : written(entry.net16, category.step),
    gross: isBlind ? null : written(entry.gross16, category.step),
    minimum: written(facts.minimum16, category.step),
    sheets: sheetsFor(parts),
    openSheet: as === 'bench' ? parts.sheets.filter(sheet => sheet.kind === 'entry' && sheet.state === 'open').map(presentSheet)[0] ?? null : null,
    missingPapers: isBlind ? [] : facts.missingPapers,
    statement: { signedBy: facts.statementBy, signers: statementSigners(facts.animal) },
    fee: as === 'bench' ? null : { due: facts.fee.due, settled: facts.fee.settled, waived: facts.fee.waived },
    requests: as === 'bench' || isBlind
      ? []
      : parts.requests.filter(request => entry.state !== 'in_review' || as === 'staff' || request.kind === 'reclassify' || request.answered_at !== null).map(request => ({
          id: request.uid, kind: request.kind, text: request.text, wants: JSON.parse(request.wants) as string[], askedAt: isoTime(request.asked_at),
          answer: request.answer_text, answeredAt: isoTimeOrNull(request.answered_at), closedAt: isoTimeOrNull(request.closed_at),
        })),
    recordNo: parts.recordNo,
    submittedAt: isoTimeOrNull(entry.submitted_at),
    isAppeal: entry.appealed_at !== null,
    may: { writeFacts: parts.canWriteFacts, writeSheet: parts.canWriteSheet },
    next: parts.acts.map(act => ({ transition: act.transition, to: act.to, failed: act.failed, stakes: act.stakes, asks: act.asks })),
  }
}
export type EntryShown = ReturnType<typeof presentEntry>

/** Texts of an event that stay between the people who decide. */
const STAFF_TEXTS: readonly string[] = ['note']

export function presentEvent(event: EventRow, texts: readonly EventText[], viewer: { readonly staff: boolean, readonly actor: ActiveActor, readonly entry: EntriesRow }) {
  const own = event.actor_user_id === viewer.actor.userId
  const known = viewer.staff || own || event.actor_user_id === viewer.entry.owner_user_id || event.actor_user_id === viewer.entry.measurer_user_id
  const args = JSON.parse(event.args) as Record<string, unknown>
  return {
    seq: event.seq, at: isoTime(event.at), kind: event.kind, from: event.from_state, to: event.to_state,
    by: event.actor_user_id === null ? null : known ? event.actor_name : '', isMine: own,
    args: viewer.staff ? args : Object.fromEntries(Object.entries(args).filter(([name]) => ['net16', 'gross16', 'recordNo', 'rank', 'ground', 'term', 'fromClass', 'toClass', 'changed'].includes(name))),
    texts: Object.fromEntries(texts.filter(text => viewer.staff || !STAFF_TEXTS.includes(text.field)).map(text => [text.field, text.body])),
    hash: event.hash,
  }
}
export type EventShown = ReturnType<typeof presentEvent>
