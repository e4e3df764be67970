import type { Knex } from 'knex'
import type { Day } from '../../../shared/domain/dates'
import { entryLines, pileOf, withoutStakeOf, type DeskPile } from './rows'

/** What an entrant's own entries want of them; `today` decides which appeals are still open. */
export function ownEntries(db: Knex, userId: number, today: Day): Promise<DeskPile>[] {
  const mine = () => entryLines(db).where('e.owner_user_id', userId)
  return [
    pileOf(db, 'finish_draft', mine().where('e.state', 'draft')),
    pileOf(db, 'submit', mine().where('e.state', 'certified')),
    pileOf(db, 'answer', mine().where('e.state', 'returned')),
    pileOf(db, 'appeal', mine().where('e.state', 'declined').whereNull('e.appealed_at').where('e.due_on', '>=', today)),
    pileOf(db, 'revive', mine().where('e.state', 'lapsed').whereNull('e.revived_at')),
    pileOf(db, 'answer_challenge', mine().where('e.state', 'challenged')
      .whereExists(q => q.from('challenges as h').whereRaw('h.entry_id = e.id').where('h.state', 'taken_up').whereNull('h.answered_at'))),
  ]
}

/** Entries that somebody began for another who has not claimed them. */
export function unclaimedEntries(db: Knex, userId: number): Promise<DeskPile> {
  return pileOf(db, 'unclaimed', entryLines(db).where('e.begun_by_user_id', userId).whereNull('e.owner_user_id').where('e.state', 'draft'))
}

/** Animals that wait at a measurer's bench. */
export function benchEntries(db: Knex, userId: number): Promise<DeskPile> {
  return pileOf(db, 'measure', entryLines(db).where('e.measurer_user_id', userId).where('e.state', 'measuring'))
}

/** Files that a reviewer may work on: those they have taken and those that nobody has. */
export function filesToReview(db: Knex, userId: number): Promise<DeskPile> {
  const open = entryLines(db).where('e.state', 'in_review').where(q => q.whereNull('e.reviewer_user_id').orWhere('e.reviewer_user_id', userId))
  return pileOf(db, 'review', withoutStakeOf(open, userId))
}
