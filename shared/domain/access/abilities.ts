import type { Actor } from './roles'
import { hasAnyRole, hasRole } from './roles'
import type { State } from '../workflow/states'
import { hasOpenFacts, isListed } from '../workflow/states'

/** What of an entry decides who may see and write it. */
export interface EntryAccess {
  readonly state: State
  readonly ownerUserId: number | null
  readonly begunByUserId: number | null
  readonly measurerUserId: number | null
  /** accounts of the judges whose sitting has the entry on its docket, or who measure it for the panel */
  readonly judgeUserIds: readonly number[]
}

export function isOwner(actor: Actor, entry: EntryAccess): boolean {
  return actor !== null && entry.ownerUserId === actor.userId
}

/** Whoever began an entry for somebody else keeps it until that person claims it. */
export function isKeeper(actor: Actor, entry: EntryAccess): boolean {
  return actor !== null && entry.ownerUserId === null && entry.begunByUserId === actor.userId
    && hasAnyRole(actor, ['shop', 'measurer'])
}

export function isAssignedMeasurer(actor: Actor, entry: EntryAccess): boolean {
  return hasRole(actor, 'measurer') && actor !== null && entry.measurerUserId === actor.userId
}

export function isItsJudge(actor: Actor, entry: EntryAccess): boolean {
  return hasRole(actor, 'judge') && actor !== null && entry.judgeUserIds.includes(actor.userId)
}

/** Drafts and animals on the bench are between entrant and measurer; the office meets an entry when it is submitted. */
/** A certified animal is the entrant's to submit, but its fee may be paid at the office, which then has to find it. */
const BEFORE_THE_OFFICE: readonly State[] = ['draft', 'measuring']

/** Who may read an entry's file at all; a stake bars from acting, and what of the file is shown is the presenter's. */
export function canReadEntry(actor: Actor, entry: EntryAccess): boolean {
  if (isOwner(actor, entry) || isKeeper(actor, entry) || isAssignedMeasurer(actor, entry) || isItsJudge(actor, entry)) return true
  if (hasRole(actor, 'registrar')) return true
  return hasRole(actor, 'reviewer') && !BEFORE_THE_OFFICE.includes(entry.state)
}

/** Who may change facts of the animal and its people while they are open, or where a request names them. */
export function canWriteFacts(actor: Actor, entry: EntryAccess): boolean {
  if (isOwner(actor, entry)) return hasOpenFacts(entry.state) || entry.state === 'returned'
  return isKeeper(actor, entry) && hasOpenFacts(entry.state)
}

/** Who may write the open entry sheet. */
export function canWriteSheet(actor: Actor, entry: EntryAccess): boolean {
  return entry.state === 'measuring' && isAssignedMeasurer(actor, entry)
}

/** Who may ask for papers, tick checks and write to the entrant from the office. */
export function canReview(actor: Actor, entry: EntryAccess): boolean {
  return hasRole(actor, 'reviewer') && entry.state === 'in_review'
}

/** Who may report a listed record to the office. */
export function canReport(actor: Actor, entry: EntryAccess): boolean {
  return actor !== null && isListed(entry.state) && !isOwner(actor, entry)
}

/** Who may plan a sitting, name its chair and judges, and set its docket. */
export function canPlanSittings(actor: Actor): boolean {
  return hasAnyRole(actor, ['reviewer', 'registrar'])
}
