/** What a transition does besides changing the state. The server has one small function for each. */
export const EFFECTS = [
  // where it goes
  'remember_from', 'go_back', 'to_bench_when_named',
  // the bench
  'make_claim_code', 'assign_measurer', 'open_sheet', 'new_sheet_version', 'lock_sheet',
  // the office
  'pin_term', 'mark_submitted', 'take_review', 'clear_review', 'change_class', 'mark_revived', 'mark_appealed', 'refuse_entry',
  // the panel
  'fix_second_measuring', 'put_on_docket', 'put_appeal_on_docket', 'put_challenge_on_docket', 'come_back_to_docket', 'carry_docket_item', 'remove_docket_item',
  'plan_remeasuring', 'end_remeasuring', 'cancel_remeasuring', 'note_not_presented', 'stand_panel_sheet', 'ask_requests',
  // the lists
  'publish_record', 'mark_challenged', 'unmark_challenged', 'take_from_lists', 'put_back_in_lists', 'amend_record',
  // the animal and the money
  'free_animal', 'claim_animal', 'refund_fee',
  // a challenge, a hold, a withdrawal
  'take_up_challenge', 'close_challenge', 'set_hold', 'lift_hold', 'note_withdrawal_asked',
  // notices
  'tell_entrant', 'tell_measurer', 'tell_former_measurer', 'tell_office', 'tell_judges', 'tell_reporter', 'tell_holder', 'tell_claimant',
] as const
export type EffectName = (typeof EFFECTS)[number]

export function isEffect(value: unknown): value is EffectName {
  return typeof value === 'string' && (EFFECTS as readonly string[]).includes(value)
}
