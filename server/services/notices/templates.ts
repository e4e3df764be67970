import type { TokenKind } from './mint'

/**
 * Which page a notice leads to. `entry` needs an entry, `minted` is a secret link made at the moment of sending.
 */
type Target = 'entry' | 'bench' | 'office' | 'panel' | 'account' | 'desk' | 'people' | 'minted' | 'record' | 'none'

export interface Template {
  /** The only variables its texts may name. A paragraph that names one without a value is left out. */
  readonly variables: readonly string[]
  readonly target: Target
  /** The secret link that is made when the notice is sent; it is never stored and never shown to staff. */
  readonly mint?: TokenKind
}

/** What every notice about an entry can say. */
const ENTRY = ['name', 'animal'] as const
const entry = (target: Target, ...more: readonly string[]): Template => ({ variables: [...ENTRY, ...more], target })

/**
 * Every notice the registry sends, by template name; the texts stand under `notices.<name>` with `subject`, `body`
 * (paragraphs parted by an empty line) and `action` (the words of its link). Notices of a transition are called
 * `<transition>_<whom it tells>`.
 */
export const TEMPLATES = {
  // people
  confirm_email: { variables: ['name'], target: 'minted', mint: 'confirm_email' },
  account_exists: { variables: ['name'], target: 'account' },
  reset_password: { variables: ['name'], target: 'minted', mint: 'reset_password' },
  password_changed: { variables: ['name'], target: 'account' },
  change_email: { variables: ['name'], target: 'minted', mint: 'change_email' },
  email_changed: { variables: ['name', 'email'], target: 'none' },
  invite: { variables: ['name', 'role', 'inviter'], target: 'minted', mint: 'invite' },
  second_factor_changed: { variables: ['name'], target: 'account' },
  role_given: { variables: ['name', 'role'], target: 'desk' },
  role_taken: { variables: ['name', 'role'], target: 'desk' },
  role_changed_registrars: { variables: ['name', 'person', 'role', 'change', 'by'], target: 'people' },
  role_proposed: { variables: ['name', 'person', 'role', 'by'], target: 'people' },
  accreditation_ends: { variables: ['name', 'deadline'], target: 'bench' },
  // an entry begun for somebody
  begin_for_claimant: { variables: ['name', 'animal', 'by'], target: 'minted', mint: 'claim' },
  // the bench
  ask_measurer_measurer: entry('bench', 'entrant', 'district'),
  reassign_measurer: entry('bench', 'entrant', 'district'),
  reassign_former_measurer: entry('bench'),
  hand_back_entrant: entry('entry', 'comment'),
  certify_entrant: entry('entry', 'net', 'minimum'),
  recertify_entrant: entry('entry', 'comment'),
  recertify_measurer: entry('bench', 'comment'),
  // the office
  submit_entrant: entry('entry'),
  submit_office: entry('office'),
  return_entrant: entry('entry', 'requests', 'deadline'),
  resubmit_office: entry('office'),
  lapse_entrant: entry('entry'),
  reclassify_entrant: entry('entry', 'comment', 'net'),
  decline_ineligible_entrant: entry('entry', 'ground', 'reason', 'deadline'),
  appeal_office: entry('office'),
  message_entrant: entry('entry', 'text'),
  message_office: entry('office', 'text'),
  // the panel
  put_before_panel_entrant: entry('entry', 'sitting'),
  put_before_panel_judges: entry('panel', 'sitting'),
  order_remeasure_entrant: entry('entry', 'place', 'at', 'comment'),
  order_remeasure_judges: entry('panel', 'place', 'at'),
  record_remeasure_entrant: entry('entry', 'net'),
  not_presented_entrant: entry('entry', 'comment'),
  panel_return_entrant: entry('entry', 'requests', 'deadline'),
  panel_return_office: entry('office'),
  accept_entrant: entry('record', 'recordNo', 'net', 'rank'),
  accept_measurer: entry('record', 'recordNo', 'net', 'rank'),
  accept_office: entry('record', 'recordNo', 'net', 'rank'),
  decline_entrant: entry('entry', 'ground', 'reason', 'deadline'),
  sitting_in_days: { variables: ['name', 'sitting', 'place'], target: 'panel' },
  // after the lists
  challenge_entrant: entry('entry', 'comment', 'deadline'),
  challenge_judges: entry('panel'),
  uphold_entrant: entry('entry', 'reason'),
  uphold_reporter: entry('none', 'reason'),
  strike_entrant: entry('entry', 'ground', 'reason', 'deadline'),
  strike_reporter: entry('none', 'reason'),
  appeal_strike_office: entry('office'),
  appeal_strike_judges: entry('panel'),
  reinstate_entrant: entry('entry', 'reason'),
  reinstate_office: entry('office', 'reason'),
  amend_entrant: entry('entry', 'comment'),
  replace_entrant: entry('entry'),
  hold_entrant: entry('entry', 'comment'),
  lift_hold_entrant: entry('entry', 'comment'),
  ask_withdrawal_office: entry('office', 'text'),
  ask_withdrawal_judges: entry('panel'),
  withdraw_entrant: entry('entry', 'refund'),
  withdraw_holder: entry('desk'),
  // money
  fee_paid: entry('entry', 'amount'),
  fee_refunded: entry('entry', 'amount'),
  // by the clock
  untouched_returned: entry('entry', 'deadline'),
  untouched_certified: entry('entry', 'deadline'),
  appeal_ends: entry('entry', 'deadline'),
  // whatever a registrar's own workflow adds
  change_of_entry: entry('entry', 'state', 'comment'),
} as const satisfies Readonly<Record<string, Template>>

export type TemplateName = keyof typeof TEMPLATES

export function isTemplate(name: string): name is TemplateName {
  return Object.hasOwn(TEMPLATES, name)
}

/** The template of a transition's notice, or the general one where there is none of its own. */
export function templateFor(transition: string, audience: string): TemplateName {
  const name = `${transition}_${audience}`
  return isTemplate(name) ? name : 'change_of_entry'
}
