import type { Knex } from 'knex'
import type { BallotsRow } from '../../../db/tables'
import { stakesOf, type Part } from '../../../shared/domain/access/stakes'
import type { CheckCode } from '../../../shared/domain/workflow/checks'
import { checksFor } from '../../../shared/domain/workflow/checks'
import { askClassLine, isOnTheLine, type Ground } from '../../../shared/domain/workflow/eligibility'
import type { Accreditation, Decision, EntryFacts, MeasurerCandidate, OtherClass, SecondMeasuring, SheetFacts } from '../../../shared/domain/workflow/facts'
import { missingPapers, type DocumentKind, type SignerPart } from '../../../shared/domain/workflow/origins'
import { leadingGround, tally, type Vote } from '../../../shared/domain/workflow/panel'
import { isListed } from '../../../shared/domain/workflow/states'
import { score, toSixteenths, type Category } from '../../../shared/domain/measuring/index'
import { classesFor, currentDefinition } from '../../../shared/domain/measuring/index'
import { parseSqlTime } from '../../../db/time'
import { dayIn } from '../../clock'
import type { ClassRecord } from '../../repositories/catalogue'
import { findFee, findMinimum, findTerm, listClassLines, sumLedger } from '../../repositories/catalogue'
import { listSiblings } from '../../repositories/entries'
import { countAskers, hasEventSince } from '../../repositories/events'
import { findLikelyDoubles, listChecks, listDocumentKinds, listRequests, listStatementParts } from '../../repositories/office'
import { findSittingById, listBallots, listChairs, listChallenges, listOpeners, listRemeasurings } from '../../repositories/panel'
import { findOpenSheet, findSheetById } from '../../repositories/sheets'
import { findAccounts, holdsRole, listAccreditations } from '../../repositories/stakes'
import type { Moment } from '../moment'
import { countsSpread, hasReadings, readSheet, slipsOf } from '../sheets/read'
import type { Workflow } from '../workflow/load'
import type { EntryContext } from './context'
import { keysOf } from './context'

export const ASK_SECOND_MEASURING = 'ask_second_measuring'
export const ASK_WITHDRAWAL = 'ask_withdrawal'

export async function loadAccreditations(db: Knex, userId: number, zone: string): Promise<Accreditation[]> {
  return (await listAccreditations(db, userId)).map(row => ({
    validFrom: row.valid_from, validTo: row.valid_to, species: [row.species],
    suspendedOn: row.suspended_at === null ? null : dayIn(zone, parseSqlTime(row.suspended_at)),
  }))
}

/** A measurer somebody names: accreditations count only while the role is held. */
export async function loadCandidate(db: Knex, context: EntryContext, userId: number, moment: Moment): Promise<MeasurerCandidate> {
  const [account] = await findAccounts(db, [userId])
  const measures = account !== undefined && await holdsRole(db, userId, 'measurer', moment.at)
  return {
    userId,
    accreditations: measures ? await loadAccreditations(db, userId, moment.zone) : [],
    stakes: account ? stakesOf(context.stakes, keysOf(account), 'certify') : [],
  }
}

async function loadSheetFacts(db: Knex, { entry, definition }: EntryContext): Promise<{ sheet: SheetFacts | null, hasReadings: boolean }> {
  const row = await findOpenSheet(db, entry.id, 'entry')
  if (!row) return { sheet: null, hasReadings: false }
  const sheet = readSheet(row)
  const blocking = slipsOf(sheet).filter(slip => slip.severity === 'blocking' && slip.code !== 'incomplete' && slip.code !== 'too_fresh')
  const unsaid = countsSpread(sheet.definition) && sheet.answers.wholeSkull === null ? ['wholeSkull'] : []
  return {
    hasReadings: hasReadings(sheet.measurements),
    sheet: {
      ofClass: sheet.definition.category === definition.category,
      missing: [...sheet.score.missing, ...unsaid],
      blockingSlips: [...new Set(blocking.map(slip => slip.code))],
      driedSince: row.dried_since,
      measuredOn: row.measured_on,
    },
  }
}

/** What has to be paid for the entry; the fee's version is pinned at the first checkout. */
async function loadFee(db: Knex, { entry, category }: EntryContext, moment: Moment) {
  const fee = await findFee(db, category.id, entry.fee_version === null ? { day: moment.today } : { version: entry.fee_version })
  return { due: fee?.amount_minor ?? 0, ...await sumLedger(db, entry.id, fee?.currency ?? null) }
}

/** Least net of a class for the entry: by the term pinned at the first submission, before that by the one in force. */
export async function loadMinimum(db: Knex, termId: number | null, classId: number, moment: Moment): Promise<number | null> {
  const term = termId ?? (await findTerm(db, moment.today))?.id
  return term === undefined ? null : await findMinimum(db, term, classId) ?? null
}

async function loadLines(db: Knex, { entry, category }: EntryContext) {
  const lines = entry.district_id === null ? [] : await listClassLines(db, entry.district_id, category.species_id)
  const question = { category: category.code, offered: category.offered === 1, lines, side: entry.district_side }
  return { classLine: askClassLine(question), onTheLine: isOnTheLine(question) }
}

export async function loadDoubles(db: Knex, { entry, category, people }: EntryContext) {
  const signed = entry.signed_sheet_id === null ? undefined : await findSheetById(db, entry.signed_sheet_id)
  return findLikelyDoubles(db, {
    entryId: entry.id, animalId: entry.animal_id, speciesId: category.species_id, districtId: entry.district_id,
    takenFirstOn: entry.taken_first_on, takenLastOn: entry.taken_last_on,
    hunterKey: people.find(person => person.part === 'hunter')?.name_key ?? null,
    sheetHash: signed?.hash ?? null, measurements: signed?.measurements ?? null,
  })
}

async function loadSecond(db: Knex, context: EntryContext, zone: string): Promise<SecondMeasuring> {
  const { entry, item, remeasuring, stakes } = context
  const all = await listRemeasurings(db, entry.id)
  const named = remeasuring ?? item
  const pair = named?.judge_a && named.judge_b ? [named.judge_a, named.judge_b] as const : null
  const judges = pair ? await findAccounts(db, pair) : []
  const standing = entry.standing_sheet_id === null ? undefined : await findSheetById(db, entry.standing_sheet_id)
  const askedBy = item ? await countAskers(db, entry.id, ASK_SECOND_MEASURING, item.created_at) : 0
  return {
    due: item?.second_measuring_due === 1 || askedBy >= 2,
    done: standing?.kind === 'panel_joint',
    askedBy,
    pair,
    pairStakes: judges.flatMap(judge => stakesOf(stakes, keysOf(judge), 'remeasure')),
    pairOpened: pair ? (await listOpeners(db, entry.id, pair)).length : 0,
    day: remeasuring ? dayIn(zone, parseSqlTime(remeasuring.at)) : null,
    jointSignatures: [remeasuring?.joint_signed_a_at, remeasuring?.joint_signed_b_at].filter(Boolean).length,
    notPresented: all.at(-1)?.state === 'not_presented',
  }
}

type CastBallot = BallotsRow & { judge_uid: string, judge_name: string }

/** Ballots that count: not those of judges who have come to have a stake since they voted. */
export async function countedBallots(db: Knex, context: EntryContext, itemId: number): Promise<CastBallot[]> {
  const ballots = await listBallots(db, itemId)
  const judges = new Map((await findAccounts(db, ballots.map(ballot => ballot.judge_user_id))).map(account => [account.id, account]))
  return ballots.filter(ballot => stakesOf(context.stakes, keysOf(judges.get(ballot.judge_user_id)!), 'vote').length === 0)
}

function requestsOf(ballots: readonly CastBallot[]): string[] {
  const asked = ballots.filter(ballot => ballot.vote === 'return').flatMap(ballot => JSON.parse(ballot.requests ?? '[]') as string[])
  // a vote that reaches no majority returns the entry: then what stood against it is what is asked
  return asked.length > 0 ? asked : ballots.filter(ballot => ballot.vote !== 'accept' && ballot.vote !== 'stand_aside').map(ballot => ballot.reason ?? '').filter(text => text !== '')
}

async function loadDecision(db: Knex, context: EntryContext, quorum: number): Promise<Decision | null> {
  const { item, entry } = context
  if (!item) return null
  const ballots = await countedBallots(db, context, item.id)
  const votes = ballots.map(ballot => ballot.vote as Vote)
  const { outcome } = tally(entry.state === 'challenged' || entry.state === 'struck' ? 'record' : 'entry', votes, quorum)
  const winning = ballots.filter(ballot => ballot.vote === outcome)
  return {
    votes,
    ground: (item.ground ?? leadingGround(winning.map(ballot => ballot.ground))) as Ground | null,
    reason: item.reason ?? (winning.length > 0 ? winning : ballots).map(ballot => ballot.reason ?? '').filter(text => text !== '').join('\n'),
    requests: requestsOf(ballots),
  }
}

async function loadChairs(db: Knex, { item }: EntryContext): Promise<number[]> {
  const sitting = item?.sitting_id ? await findSittingById(db, item.sitting_id) : undefined
  return sitting && sitting.state !== 'closed' ? [sitting.chair_user_id] : listChairs(db)
}

function peopleFacts({ people }: EntryContext) {
  return people.map(person => ({ part: person.part as Part, minor: person.is_minor === 1, died: person.died_on !== null }))
}

/** Everything that guards of the workflow look at, for an entry that exists. */
export async function loadFacts(db: Knex, context: EntryContext, workflow: Workflow, moment: Moment): Promise<EntryFacts> {
  const { entry, category, definition, stakes } = context
  const { classLine, onTheLine } = await loadLines(db, context)
  const requests = await listRequests(db, entry.id)
  const checks = new Set((await listChecks(db, entry.id)).map(check => check.code as CheckCode))
  const challenges = await listChallenges(db, entry.id)
  const siblings = await listSiblings(db, entry.animal_id, entry.id)
  const documents = await listDocumentKinds(db, entry.id) as DocumentKind[]
  const running = challenges.find(challenge => challenge.state === 'taken_up')
  return {
    state: entry.state,
    returnTo: entry.return_to,
    dueOn: entry.due_on,
    ownerUserId: entry.owner_user_id,
    measurerUserId: entry.measurer_user_id,
    chairUserIds: await loadChairs(db, context),
    onHold: entry.hold_at !== null,
    species: category.species,
    animal: {
      origin: entry.origin, districtKnown: entry.district_id !== null, takenPrecision: entry.taken_precision, method: entry.method,
      sex: entry.sex, guided: entry.guided === null ? null : entry.guided === 1, people: peopleFacts(context),
    },
    classLine,
    stakes,
    ...await loadSheetFacts(db, context),
    accreditations: entry.measurer_user_id === null ? [] : await loadAccreditations(db, entry.measurer_user_id, moment.zone),
    missingPapers: missingPapers(entry.origin, documents, onTheLine),
    statementBy: await listStatementParts(db, entry.id) as SignerPart[],
    fee: await loadFee(db, context, moment),
    spreadCounts: countsSpread(definition),
    net16: entry.net16,
    minimum16: await loadMinimum(db, entry.term_id, category.id, moment),
    openRequests: requests.filter(request => request.closed_at === null).length,
    unansweredRequests: requests.filter(request => request.closed_at === null && request.answered_at === null).length,
    uncheckedCodes: checksFor(entry.origin, onTheLine).filter(code => !checks.has(code)),
    likelyDoubles: checks.has('doubles') || entry.state !== 'in_review' ? 0 : (await loadDoubles(db, context)).length,
    revived: entry.revived_at !== null,
    appealed: entry.appealed_at !== null && (entry.state !== 'struck' || entry.appealed_at >= entry.state_since),
    second: await loadSecond(db, context, moment.zone),
    decision: await loadDecision(db, context, workflow.limits.quorum),
    reportChecked: challenges.some(challenge => challenge.state === 'checked'),
    challengeAnswered: running !== undefined && running.answered_at !== null,
    otherOpenEntry: siblings.some(other => !['accepted', 'challenged', 'declined', 'lapsed', 'withdrawn', 'struck'].includes(other.state)),
    otherRecord: siblings.some(other => isListed(other.state) && (other.state === 'challenged' || other.class_id === entry.class_id)),
    actedOnSince: entry.source === 'taken_over' && entry.version > 1,
    withdrawalAsked: await hasEventSince(db, entry.id, ASK_WITHDRAWAL, entry.state_since),
  }
}

/** What a move to another class of the same lines would come to; null for a class of another species. */
export async function loadOtherClass(db: Knex, context: EntryContext, other: ClassRecord, moment: Moment): Promise<OtherClass | null> {
  const { entry, category } = context
  const signed = entry.standing_sheet_id === null ? undefined : await findSheetById(db, entry.standing_sheet_id)
  if (!signed || other.id === category.id) return null
  const sameLines = other.offered === 1 && (classesFor(category.code as Category) as readonly string[]).includes(other.code)
  const definition = currentDefinition(other.code as Category)
  const net = sameLines ? score(definition, readSheet(signed).measurements).net : 0
  const fee = await findFee(db, other.id, entry.fee_version === null ? { day: moment.today } : { version: entry.fee_version })
  const requests = await listRequests(db, entry.id)
  return {
    sameLines,
    consented: requests.some(request => request.kind === 'reclassify' && request.answered_at !== null
      && (JSON.parse(request.wants) as string[]).includes(other.code) && request.answer_text === 'yes'),
    net16: toSixteenths(net, definition.step),
    minimum16: await loadMinimum(db, entry.term_id, other.id, moment),
    feeDue: fee?.amount_minor ?? 0,
  }
}
