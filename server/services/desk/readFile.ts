import type { ActiveActor } from '../../../shared/domain/access/roles'
import { hasAnyRole, hasRole } from '../../../shared/domain/access/roles'
import { canReadEntry, isAssignedMeasurer, isItsJudge } from '../../../shared/domain/access/abilities'
import { stakesOf, type StakeAct } from '../../../shared/domain/access/stakes'
import { classesFor, type Category } from '../../../shared/domain/measuring/index'
import { nextActs } from '../../../shared/domain/workflow/transition'
import { DomainError } from '../../../shared/errors'
import type { DeskFile, FileViewer } from '../../../shared/schemas/file'
import { inTransaction } from '../../../db/transaction'
import type { EntriesRow } from '../../../db/tables'
import type { Registry } from '../../composition'
import { presentFile } from '../../presenters/file'
import { docketOfEntry, namesOf, papersOf, statementOf } from '../../read-models/desk/file'
import { findDistrictById } from '../../repositories/catalogue'
import { findEntry } from '../../repositories/entries'
import { listEvents, listEventTexts } from '../../repositories/events'
import { listChecks, listRequests } from '../../repositories/office'
import { noteOpening } from '../../repositories/panel'
import { listSheets } from '../../repositories/sheets'
import { accessOf } from '../entries/access'
import { findKeys, loadContext } from '../entries/context'
import { loadDoubles, loadFacts } from '../entries/facts'
import { momentOf } from '../moment'
import { loadWorkflow } from '../workflow/load'

const STAKE_ACT: Readonly<Record<FileViewer, StakeAct>> = { measurer: 'certify', office: 'review', judge: 'vote' }

/** As what somebody opens a file; they say which where they could be several. Throws `not_found` where they are none of it. */
async function viewerOf(registry: Registry, actor: ActiveActor, entry: EntriesRow, wanted: FileViewer): Promise<FileViewer> {
  const access = await accessOf(registry.db, entry)
  const may = canReadEntry(actor, access) && {
    measurer: isAssignedMeasurer(actor, access),
    office: hasAnyRole(actor, ['reviewer', 'registrar']) && !['draft', 'measuring', 'certified'].includes(entry.state),
    judge: isItsJudge(actor, access),
  }[wanted]
  if (!may) throw new DomainError('not_found')
  return wanted
}

/**
 * A file for the desk of a measurer, the office or a judge. A stake closes it: then only its head and the stake are told. A judge's
 * opening is noted, since the second measuring is made by two who have not opened it; the pair itself sees no figure.
 *
 * @throws DomainError `not_found` where the file is not theirs to see
 */
export async function readFile(registry: Registry, actor: ActiveActor, uid: string, wanted: FileViewer): Promise<DeskFile> {
  const { db } = registry
  const entry = await findEntry(db, uid)
  if (!entry) throw new DomainError('not_found')
  const as = await viewerOf(registry, actor, entry, wanted)
  const moment = await momentOf(registry)
  const [context, workflow, keys] = await Promise.all([loadContext(db, entry), loadWorkflow(db, entry.workflow_version_id), findKeys(db, actor.userId)])
  const facts = await loadFacts(db, context, workflow, moment)
  const stakes = stakesOf(context.stakes, keys, STAKE_ACT[as]).map(stake => 'part' in stake ? `${stake.kind}.${stake.part}` : stake.kind)
  const { second } = facts
  const isBlind = as === 'judge' && second.due && !second.done && !second.notPresented && second.pair !== null && second.pair.includes(actor.userId)
  if (as === 'judge' && stakes.length === 0 && !isBlind) await inTransaction(db, trx => noteOpening(trx, entry.id, actor.userId, moment.at))
  const [papers, statement, docket, district, checks, requests, sheets, events, texts, doubles] = await Promise.all([
    papersOf(db, entry.id), statementOf(db, entry.id), docketOfEntry(db, entry.id), entry.district_id === null ? undefined : findDistrictById(db, entry.district_id),
    listChecks(db, entry.id), listRequests(db, entry.id), listSheets(db, entry.id), listEvents(db, entry.id), listEventTexts(db, entry.id),
    as === 'office' ? loadDoubles(db, context) : [],
  ])
  const names = await namesOf(db, [entry.owner_user_id, entry.measurer_user_id, entry.reviewer_user_id, ...checks.map(check => check.ticked_by), ...requests.map(request => request.asked_by), ...sheets.map(sheet => sheet.measurer_user_id)])
  const next = nextActs(workflow.rows, facts, { kind: 'person', actor, keys }, { today: moment.today, limits: workflow.limits })
  return presentFile({
    as, isBlind, stakes, actor, context, facts, moment, dryingDays: workflow.limits.dryingDays, district: district?.name ?? null,
    siblings: classesFor(context.category.code as Category).filter(code => code !== context.category.code),
    mayReview: as === 'office' && hasRole(actor, 'reviewer') && entry.state === 'in_review' && stakes.length === 0,
    papers, statement, docket, checks, requests, sheets, events, texts, doubles, names, next,
  })
}
