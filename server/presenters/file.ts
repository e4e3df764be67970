import type { EntriesRow, RequestsRow, SheetsRow } from '../../db/tables'
import type { ActiveActor } from '../../shared/domain/access/roles'
import { daysBetween, formatInexactDate } from '../../shared/domain/dates'
import { formatSteps, fromSixteenths, writeMeasurements, type Step } from '../../shared/domain/measuring/index'
import { checksFor } from '../../shared/domain/workflow/checks'
import type { EntryFacts } from '../../shared/domain/workflow/facts'
import { WHOSE_TURN, type State } from '../../shared/domain/workflow/states'
import type { NextAct } from '../../shared/domain/workflow/transition'
import type { DeskFile, FileEvent, FilePaper, FileSheet, FileViewer } from '../../shared/schemas/file'
import { dayIn } from '../clock'
import type { EventRow, EventText } from '../repositories/events'
import type { CheckRow, LikelyDouble } from '../repositories/office'
import type { EntryContext } from '../services/entries/context'
import type { Moment } from '../services/moment'
import { readSheet } from '../services/sheets/read'
import { isoTime as iso } from '../../db/time'

export interface FileParts {
  readonly as: FileViewer
  readonly isBlind: boolean
  readonly stakes: readonly string[]
  readonly actor: ActiveActor
  readonly context: EntryContext
  readonly facts: EntryFacts
  readonly moment: Moment
  readonly dryingDays: number
  readonly district: string | null
  readonly siblings: readonly string[]
  readonly mayReview: boolean
  readonly papers: readonly FilePaper[]
  readonly statement: DeskFile['statement']
  readonly docket: DeskFile['docket']
  readonly checks: readonly CheckRow[]
  readonly requests: readonly RequestsRow[]
  readonly sheets: readonly SheetsRow[]
  readonly events: readonly EventRow[]
  readonly texts: readonly EventText[]
  readonly doubles: readonly LikelyDouble[]
  readonly names: ReadonlyMap<number, string>
  readonly next: readonly NextAct[]
}

const written = (value16: number | null, step: Step) => value16 === null ? null : formatSteps(fromSixteenths(value16, step), step)

function presentSheet(row: SheetsRow, entry: EntriesRow, names: ReadonlyMap<number, string>): FileSheet {
  const { definition, measurements, answers } = readSheet(row)
  return {
    id: row.uid, kind: row.kind, number: row.number, definition: row.definition, state: row.state, version: row.version,
    measurements: writeMeasurements(definition, measurements),
    net: written(row.net16, definition.step), gross: written(row.gross16, definition.step),
    measuredOn: row.measured_on, measurer: row.measurer_user_id === null ? row.measurer_name : names.get(row.measurer_user_id) ?? row.measurer_name,
    driedSince: row.dried_since, driedFrom: row.dried_from, wholeSkull: answers.wholeSkull, reasons: answers.reasons,
    signedAt: row.signed_at === null ? null : iso(row.signed_at), hash: row.hash, reason: row.reason, isStanding: row.id === entry.standing_sheet_id,
  }
}

/** Acts on the bench; a measurer is told nothing of what the office and the panel do with the file. */
const BENCH_EVENTS: readonly string[] = ['begin', 'begin_for', 'claim', 'ask_measurer', 'reassign', 'hand_back', 'certify', 'recertify', 'reopen']

function presentEvents({ as, events, texts, actor }: FileParts): FileEvent[] {
  return events.filter(event => as !== 'measurer' || BENCH_EVENTS.includes(event.kind)).map(event => ({
    seq: event.seq, at: iso(event.at), kind: event.kind, to: event.to_state, by: event.actor_user_id === null ? null : event.actor_name,
    isMine: event.actor_user_id === actor.userId, args: JSON.parse(event.args) as Record<string, unknown>,
    texts: Object.fromEntries(texts.filter(text => text.event_id === event.id).map(text => [text.field, text.body])),
  }))
}

/** Sheets that a viewer sees: rough ones are the entrant's own, the pair's are shown when the joint one is signed. */
function sheetsFor({ as, isBlind, sheets, facts }: FileParts): readonly SheetsRow[] {
  if (isBlind) return []
  if (as === 'measurer') return sheets.filter(sheet => sheet.kind === 'entry')
  return sheets.filter(sheet => sheet.state !== 'open' && (sheet.kind === 'entry' || sheet.kind === 'panel_joint' || (sheet.kind !== 'rough' && facts.second.done)))
}

/** A file for the desk: what its viewer may see. With a stake, or blind before a second measuring, that is little. */
export function presentFile(parts: FileParts): DeskFile {
  const { as, isBlind, stakes, actor, context, facts, moment, names } = parts
  const { entry, category } = context
  const open = stakes.length === 0
  const office = as === 'office' && open
  const panelOrOffice = as !== 'measurer' && open && !isBlind
  const step = category.step
  const ticked = new Map(parts.checks.map(check => [check.code, check]))
  return {
    id: entry.uid, version: entry.version, state: entry.state, turn: WHOSE_TURN[entry.state], step, since: iso(entry.state_since),
    days: Math.max(0, daysBetween(dayIn(moment.zone, new Date(iso(entry.state_since))), moment.today)),
    dueOn: entry.due_on, daysLeft: entry.due_on === null ? null : daysBetween(moment.today, entry.due_on), returnTo: entry.return_to,
    category: category.code, definition: category.definition, species: category.species, siblings: parts.siblings,
    viewer: { as, isBlind, stakes, mayReview: parts.mayReview, mayWriteSheet: as === 'measurer' && entry.state === 'measuring' && open },
    origin: entry.origin, originalOrigin: entry.original_origin, district: parts.district, districtSide: entry.district_side,
    takenOn: formatInexactDate({ first: entry.taken_first_on, last: entry.taken_last_on, precision: entry.taken_precision }),
    method: entry.method, sex: entry.sex, guided: entry.guided === null ? null : entry.guided === 1,
    printedAs: entry.hunter_printed_as, monthPublic: entry.month_public === 1,
    net: open && !isBlind ? written(entry.net16, step) : null, gross: open && !isBlind ? written(entry.gross16, step) : null, minimum: written(facts.minimum16, step),
    hold: entry.hold_at === null ? null : { since: iso(entry.hold_at), reason: open ? entry.hold_reason ?? '' : '' },
    isAppeal: entry.appealed_at !== null,
    entrant: entry.owner_user_id === null ? null : names.get(entry.owner_user_id) ?? null,
    measurer: entry.measurer_user_id === null ? null : names.get(entry.measurer_user_id) ?? null,
    reviewer: entry.reviewer_user_id === null ? null : { name: names.get(entry.reviewer_user_id) ?? '', isMe: entry.reviewer_user_id === actor.userId },
    dryingDays: parts.dryingDays,
    people: !open ? [] : context.people.map(person => ({
      id: person.uid, part: person.part, name: person.name, isMinor: person.is_minor === 1, hasDied: person.died_on !== null, hasAccount: person.user_id !== null,
      address: office ? person.address : null, email: office ? person.email : null,
    })),
    papers: panelOrOffice ? parts.papers : [],
    missingPapers: panelOrOffice ? facts.missingPapers : [],
    statement: panelOrOffice ? parts.statement : null,
    checks: !panelOrOffice ? [] : checksFor(entry.origin, facts.uncheckedCodes.includes('class_line') || ticked.has('class_line')).map((code) => {
      const check = ticked.get(code)
      return { code, tickedBy: check ? names.get(check.ticked_by) ?? '' : null, tickedAt: check ? iso(check.ticked_at) : null }
    }),
    requests: !panelOrOffice ? [] : parts.requests.map(request => ({
      id: request.uid, kind: request.kind, text: request.text, wants: JSON.parse(request.wants) as string[],
      askedBy: request.asked_by === null ? null : names.get(request.asked_by) ?? null, askedAt: iso(request.asked_at),
      answer: request.answer_text, answeredAt: request.answered_at === null ? null : iso(request.answered_at), closedAt: request.closed_at === null ? null : iso(request.closed_at),
    })),
    sheets: open ? sheetsFor(parts).map(row => presentSheet(row, entry, names)) : [],
    doubles: office ? parts.doubles.map(one => ({ id: one.uid, state: one.state as State, same: one.same })) : [],
    secondMeasuring: as === 'measurer' || entry.net16 === null ? null : { due: facts.second.due, done: facts.second.done, askedBy: facts.second.askedBy },
    docket: as === 'measurer' ? null : parts.docket,
    events: open && !isBlind ? presentEvents(parts) : [],
    next: parts.next,
    today: moment.today,
  }
}
