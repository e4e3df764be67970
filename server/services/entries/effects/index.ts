import type { EffectName } from '../../../../shared/domain/workflow/effects'
import { assignMeasurer, lockSheet, makeClaimCode, newSheetVersion, openSheet } from './bench'
import type { Effect } from './context'
import { amendRecord, liftHold, markChallenged, publishRecord, putBackInLists, refundFee, takeFromLists, unmarkChallenged } from './lists'
import { changeClass, claimAnimal, clearReview, freeAnimal, markAppealed, markRevived, markSubmitted, noteWithdrawalAsked, pinTerm, refuseEntry, setHold, takeReview } from './office'
import {
  askRequests, cancelRemeasuring, carryDocketItem, comeBackToDocket, closeChallenge, endRemeasuring, fixSecondMeasuring, noteNotPresented, planRemeasuring, putAppealOnDocket,
  putChallengeOnDocket, putOnDocket, removeDocketItem, standPanelSheet, takeUpChallenge,
} from './panel'

/** The target of a move is found by the rules alone; these have nothing left to write. */
const decidedByRules: Effect = () => {}
/** Notices are written at the end of the move, once everything that they say is known. */
const toldAtTheEnd: Effect = () => {}

export const EFFECTS: Readonly<Record<EffectName, Effect>> = {
  remember_from: decidedByRules,
  go_back: decidedByRules,
  to_bench_when_named: decidedByRules,
  make_claim_code: makeClaimCode,
  assign_measurer: assignMeasurer,
  open_sheet: openSheet,
  new_sheet_version: newSheetVersion,
  lock_sheet: lockSheet,
  pin_term: pinTerm,
  mark_submitted: markSubmitted,
  take_review: takeReview,
  clear_review: clearReview,
  change_class: changeClass,
  mark_revived: markRevived,
  mark_appealed: markAppealed,
  refuse_entry: refuseEntry,
  fix_second_measuring: fixSecondMeasuring,
  put_on_docket: putOnDocket,
  put_appeal_on_docket: putAppealOnDocket,
  put_challenge_on_docket: putChallengeOnDocket,
  come_back_to_docket: comeBackToDocket,
  carry_docket_item: carryDocketItem,
  remove_docket_item: removeDocketItem,
  plan_remeasuring: planRemeasuring,
  end_remeasuring: endRemeasuring,
  cancel_remeasuring: cancelRemeasuring,
  note_not_presented: noteNotPresented,
  stand_panel_sheet: standPanelSheet,
  ask_requests: askRequests,
  publish_record: publishRecord,
  mark_challenged: markChallenged,
  unmark_challenged: unmarkChallenged,
  take_from_lists: takeFromLists,
  put_back_in_lists: putBackInLists,
  amend_record: amendRecord,
  free_animal: freeAnimal,
  claim_animal: claimAnimal,
  refund_fee: refundFee,
  take_up_challenge: takeUpChallenge,
  close_challenge: closeChallenge,
  set_hold: setHold,
  lift_hold: liftHold,
  note_withdrawal_asked: noteWithdrawalAsked,
  tell_entrant: toldAtTheEnd,
  tell_measurer: toldAtTheEnd,
  tell_former_measurer: toldAtTheEnd,
  tell_office: toldAtTheEnd,
  tell_judges: toldAtTheEnd,
  tell_reporter: toldAtTheEnd,
  tell_holder: toldAtTheEnd,
  tell_claimant: toldAtTheEnd,
}
