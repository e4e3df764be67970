import type { StateRow, TransitionRow } from '#shared/domain/workflow/rows'
import { STATES, WHOSE_TURN } from '#shared/domain/workflow/states'

/** Number of the workflow version that these rows are. A change to what a row does is a new version. */
export const WORKFLOW_VERSION = 2

export const WORKFLOW_STATES: readonly StateRow[] = STATES.map((code, place) => ({ code, turn: WHOSE_TURN[code], sort: place + 1 }))

const row = (code: string, rest: Partial<Omit<TransitionRow, 'code' | 'sort'>>): Omit<TransitionRow, 'sort'> =>
  ({ code, from: [], to: null, parties: [], guards: [], effects: [], commentRequired: false, ...rest })

const ROWS: readonly Omit<TransitionRow, 'sort'>[] = [
  row('begin', { to: 'draft', parties: ['entrant'], effects: ['claim_animal'] }),
  row('begin_for', {
    to: 'draft', parties: ['measurer', 'shop'], guards: ['walk_in_measurable'],
    effects: ['to_bench_when_named', 'claim_animal', 'make_claim_code', 'assign_measurer', 'open_sheet', 'tell_claimant'],
  }),
  row('ask_measurer', {
    from: ['draft'], to: 'measuring', parties: ['entrant'],
    guards: ['animal_facts_complete', 'class_allowed', 'measurer_fit', 'measurer_without_stake'],
    effects: ['assign_measurer', 'open_sheet', 'tell_measurer'],
  }),
  row('reassign', {
    from: ['measuring'], to: 'measuring', parties: ['entrant', 'registrar'],
    guards: ['no_readings_yet', 'animal_facts_complete', 'class_allowed', 'measurer_fit', 'measurer_without_stake'],
    effects: ['assign_measurer', 'open_sheet', 'tell_measurer', 'tell_former_measurer'],
  }),
  row('hand_back', {
    from: ['measuring'], to: 'draft', parties: ['assigned_measurer'], effects: ['tell_entrant'], commentRequired: true,
  }),
  row('certify', {
    from: ['measuring'], to: 'certified', parties: ['assigned_measurer'],
    guards: ['sheet_complete', 'sheet_of_class', 'no_blocking_slip', 'dried_long_enough', 'accredited_when_measured', 'no_stake', 'signed_by_password'],
    effects: ['go_back', 'lock_sheet', 'come_back_to_docket', 'tell_entrant'],
  }),
  row('reopen', { from: ['certified'], to: 'draft', parties: ['entrant'] }),
  row('submit', {
    from: ['certified'], to: 'in_review', parties: ['entrant'],
    guards: ['animal_facts_complete', 'class_allowed', 'papers_complete', 'statement_signed', 'fee_settled', 'net_at_minimum'],
    effects: ['pin_term', 'mark_submitted', 'tell_entrant', 'tell_office'],
  }),
  row('return', {
    from: ['in_review'], to: 'returned', parties: ['reviewer'], guards: ['open_request', 'no_stake'], effects: ['take_review', 'tell_entrant'],
  }),
  row('resubmit', {
    from: ['returned'], to: 'in_review', parties: ['entrant'], guards: ['every_request_answered', 'statement_signed'], effects: ['tell_office'],
  }),
  row('lapse', {
    from: ['returned', 'certified'], to: 'lapsed', parties: ['clock'], guards: ['untouched_long_enough', 'not_on_hold'],
    effects: ['remember_from', 'free_animal', 'tell_entrant'],
  }),
  row('revive', {
    from: ['lapsed'], to: 'certified', parties: ['entrant'], guards: ['not_revived_before', 'no_other_open_entry'],
    effects: ['go_back', 'claim_animal', 'mark_revived'],
  }),
  row('recertify', {
    from: ['in_review', 'at_panel'], to: 'measuring', parties: ['reviewer', 'chair'], guards: ['own_turn', 'no_stake', 'not_on_hold'],
    effects: ['remember_from', 'carry_docket_item', 'new_sheet_version', 'tell_entrant', 'tell_measurer'], commentRequired: true,
  }),
  row('reclassify', {
    from: ['in_review'], to: 'in_review', parties: ['reviewer'],
    guards: ['same_lines', 'entrant_consents', 'other_minimum', 'other_fee', 'no_stake'],
    effects: ['take_review', 'change_class', 'tell_entrant'], commentRequired: true,
  }),
  row('put_before_panel', {
    from: ['in_review'], to: 'at_panel', parties: ['reviewer'],
    guards: ['every_check_ticked', 'no_open_request', 'no_likely_double', 'no_stake', 'not_on_hold'],
    effects: ['take_review', 'put_on_docket', 'fix_second_measuring', 'tell_entrant', 'tell_judges'],
  }),
  row('order_remeasure', {
    from: ['at_panel', 'challenged'], to: 'remeasuring', parties: ['chair'],
    guards: ['place_and_day', 'second_measuring_called_for', 'pair_named', 'no_stake', 'not_on_hold'],
    effects: ['remember_from', 'plan_remeasuring', 'tell_entrant', 'tell_judges'], commentRequired: true,
  }),
  row('record_remeasure', {
    from: ['remeasuring'], to: 'at_panel', parties: ['judge_pair'], guards: ['joint_sheet_signed_by_both', 'no_stake', 'not_on_hold'],
    effects: ['go_back', 'end_remeasuring', 'stand_panel_sheet', 'tell_entrant'],
  }),
  row('not_presented', {
    from: ['remeasuring'], to: 'at_panel', parties: ['chair'], guards: ['day_has_passed', 'no_stake', 'not_on_hold'],
    effects: ['go_back', 'note_not_presented', 'tell_entrant'], commentRequired: true,
  }),
  row('panel_return', {
    from: ['at_panel'], to: 'returned', parties: ['panel'], guards: ['quorum', 'panel_says_return', 'requests_named', 'not_on_hold'],
    effects: ['ask_requests', 'tell_entrant', 'tell_office'],
  }),
  row('accept', {
    from: ['at_panel'], to: 'accepted', parties: ['panel'],
    guards: ['quorum', 'panel_says_accept', 'second_measuring_done', 'standing_net_at_minimum', 'one_live_record', 'not_on_hold'],
    effects: ['publish_record', 'tell_entrant', 'tell_measurer', 'tell_office'],
  }),
  row('decline', {
    from: ['at_panel'], to: 'declined', parties: ['panel'],
    guards: ['quorum', 'panel_says_decline', 'ground_and_reason', 'ground_fits', 'not_on_hold'], effects: ['free_animal', 'tell_entrant'],
  }),
  row('decline_ineligible', {
    from: ['in_review'], to: 'declined', parties: ['reviewer'], guards: ['ground_and_reason', 'ground_fits', 'no_stake', 'not_on_hold'],
    effects: ['take_review', 'refuse_entry', 'free_animal', 'tell_entrant'],
  }),
  row('appeal', {
    from: ['declined'], to: 'in_review', parties: ['entrant'],
    guards: ['within_appeal_days', 'not_appealed_before', 'text_given', 'no_other_open_entry'],
    effects: ['mark_appealed', 'clear_review', 'claim_animal', 'tell_office'],
  }),
  row('appeal_strike', {
    from: ['struck'], parties: ['entrant'], guards: ['within_appeal_days', 'not_appealed_before', 'text_given'],
    effects: ['mark_appealed', 'put_appeal_on_docket', 'tell_office', 'tell_judges'],
  }),
  row('ask_withdrawal', {
    from: ['draft', 'measuring', 'certified', 'in_review', 'returned', 'at_panel', 'remeasuring', 'challenged'],
    parties: ['entrant'], guards: ['text_given'], effects: ['note_withdrawal_asked', 'tell_office', 'tell_judges'],
  }),
  row('withdraw', {
    from: ['draft', 'measuring', 'certified', 'in_review', 'returned', 'at_panel', 'remeasuring', 'challenged'], to: 'withdrawn',
    parties: ['entrant', 'chair'], guards: ['confirmed', 'withdrawal_agreed', 'no_stake'],
    effects: ['remove_docket_item', 'cancel_remeasuring', 'close_challenge', 'take_from_lists', 'free_animal', 'refund_fee', 'tell_entrant', 'tell_holder'],
  }),
  row('challenge', {
    from: ['accepted'], to: 'challenged', parties: ['chair'], guards: ['report_checked', 'no_stake', 'not_on_hold'],
    effects: ['take_up_challenge', 'mark_challenged', 'put_challenge_on_docket', 'tell_entrant', 'tell_judges'], commentRequired: true,
  }),
  row('uphold', {
    from: ['challenged'], to: 'accepted', parties: ['panel'],
    guards: ['quorum', 'panel_says_uphold', 'reason_given', 'standing_net_at_minimum', 'not_on_hold'],
    effects: ['close_challenge', 'unmark_challenged', 'tell_entrant', 'tell_reporter'],
  }),
  row('strike', {
    from: ['challenged'], to: 'struck', parties: ['panel'],
    guards: ['quorum', 'panel_says_strike', 'answered_or_time_over', 'ground_and_reason', 'ground_fits', 'not_on_hold'],
    effects: ['close_challenge', 'take_from_lists', 'free_animal', 'tell_entrant', 'tell_reporter'],
  }),
  row('reinstate', {
    from: ['struck'], to: 'accepted', parties: ['panel'],
    guards: ['quorum', 'panel_says_uphold', 'reason_given', 'standing_net_at_minimum', 'one_live_record', 'not_on_hold'],
    effects: ['claim_animal', 'put_back_in_lists', 'tell_entrant', 'tell_office'],
  }),
  row('amend', {
    from: ['accepted'], to: 'accepted', parties: ['registrar'], guards: ['facts_only', 'no_stake'],
    effects: ['amend_record', 'tell_entrant'], commentRequired: true,
  }),
  row('hold', {
    from: STATES.filter(state => state !== 'withdrawn'), parties: ['chair', 'registrar'], guards: ['not_on_hold', 'no_stake'],
    effects: ['set_hold', 'tell_entrant'], commentRequired: true,
  }),
  row('lift_hold', {
    from: STATES.filter(state => state !== 'withdrawn'), parties: ['chair', 'registrar'], guards: ['on_hold', 'no_stake'],
    effects: ['lift_hold', 'tell_entrant'], commentRequired: true,
  }),
  row('replace', { from: ['accepted'], to: 'withdrawn', parties: ['system'], effects: ['take_from_lists', 'tell_entrant'] }),
  row('take_over', { to: 'accepted', parties: ['system'], guards: ['one_live_record'], effects: ['claim_animal', 'publish_record'] }),
  row('take_back', { from: ['accepted'], to: 'withdrawn', parties: ['system'], guards: ['not_acted_on_since'], effects: ['take_from_lists', 'free_animal'] }),
]

export const WORKFLOW_TRANSITIONS: readonly TransitionRow[] = ROWS.map((one, place) => ({ ...one, sort: place + 1 }))
