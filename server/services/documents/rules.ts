import type { ActiveActor } from '../../../shared/domain/access/roles'
import { canReview, isAssignedMeasurer, isItsJudge, isKeeper, isOwner, type EntryAccess } from '../../../shared/domain/access/abilities'
import type { DocumentKind } from '../../../shared/domain/workflow/origins'
import { hasOpenFacts, type State } from '../../../shared/domain/workflow/states'

/** States in which the entrant can add papers: before submitting, when asked, and to answer a challenge or a refusal. */
const ENTRANT_ADDS: readonly State[] = ['draft', 'measuring', 'certified', 'returned', 'challenged', 'declined']
const BENCH_KINDS: readonly DocumentKind[] = ['photo_front', 'photo_left', 'photo_right', 'condition', 'other']
const OFFICE_KINDS: readonly DocumentKind[] = ['tag_or_licence', 'proof_of_possession', 'account', 'genetic_proof', 'letter', 'other']
const PHOTOGRAPHS: readonly DocumentKind[] = ['photo_front', 'photo_left', 'photo_right', 'photo_field', 'condition']
const ENTRANT_KINDS: readonly DocumentKind[] = [
  'photo_front', 'photo_left', 'photo_right', 'photo_field', 'tag_or_licence', 'proof_of_possession', 'account', 'genetic_proof', 'letter', 'other',
]

export const isPhotograph = (kind: DocumentKind): boolean => PHOTOGRAPHS.includes(kind)

/** Kinds of paper that somebody can add to an entry as it stands; empty when none. */
export function addableKinds(actor: ActiveActor, entry: EntryAccess): readonly DocumentKind[] {
  if (isOwner(actor, entry)) return ENTRANT_ADDS.includes(entry.state) ? ENTRANT_KINDS : []
  if (isKeeper(actor, entry)) return hasOpenFacts(entry.state) ? ENTRANT_KINDS : []
  if (isAssignedMeasurer(actor, entry) && entry.state === 'measuring') return BENCH_KINDS
  if (isItsJudge(actor, entry) && entry.state === 'remeasuring') return ['condition']
  if (canReview(actor, entry)) return OFFICE_KINDS
  return []
}

export interface StandingDocument {
  readonly kind: DocumentKind
  readonly uploadedBy: number | null
  /** as the database writes it */
  readonly createdAt: string
}

export interface RemovalContext {
  readonly entry: EntryAccess
  readonly stateSince: string
  /** null until the office met the entry */
  readonly submittedAt: string | null
  /** what open requests ask to be changed: names of facts and kinds of papers */
  readonly wanted: readonly string[]
}

/**
 * Whether somebody can take a paper away, exchange it or call it another kind. What was there when the office or the
 * panel looked stays: only what came since the entry was returned, or what a request asks for, can still change.
 */
export function canChangeDocument(actor: ActiveActor, document: StandingDocument, { entry, stateSince, submittedAt, wanted }: RemovalContext): boolean {
  const sinceHere = document.createdAt >= stateSince
  if (isOwner(actor, entry) || isKeeper(actor, entry)) {
    if (hasOpenFacts(entry.state) && submittedAt === null) return document.kind !== 'condition'
    const asked = wanted.includes(document.kind) && entry.state === 'returned'
    return asked || (sinceHere && document.uploadedBy === actor.userId && ENTRANT_ADDS.includes(entry.state))
  }
  return sinceHere && document.uploadedBy === actor.userId && addableKinds(actor, entry).includes(document.kind)
}
