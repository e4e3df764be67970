// Made by scripts/db-types.ts from the migrated schema; run `npm run db:types` after adding a migration.
import type { Knex } from 'knex'

type Given<T> = { [K in keyof T]: T[K] | Knex.Raw }

export interface AccreditationsRow {
  id: number
  uid: string
  user_id: number
  number: string
  valid_from: string
  valid_to: string
  suspended_at: string | null
  created_at: string
}

export interface AccreditationsInsert {
  id?: number
  uid: string
  user_id: number
  number: string
  valid_from: string
  valid_to: string
  suspended_at?: string | null
  created_at: string
}

export interface AccreditationSpeciesRow {
  accreditation_id: number
  species_id: number
}

export interface AccreditationSpeciesInsert {
  accreditation_id: number
  species_id: number
}

export interface AnimalsRow {
  id: number
  uid: string
  species_id: number
  live_entry_id: number | null
  created_at: string
}

export interface AnimalsInsert {
  id?: number
  uid: string
  species_id: number
  live_entry_id?: number | null
  created_at: string
}

export interface BallotsRow {
  id: number
  docket_item_id: number
  judge_user_id: number
  vote: 'accept' | 'return' | 'decline' | 'uphold' | 'strike' | 'reinstate' | 'stand_aside'
  ground: string | null
  reason: string | null
  requests: string | null
  cast_at: string
}

export interface BallotsInsert {
  id?: number
  docket_item_id: number
  judge_user_id: number
  vote: 'accept' | 'return' | 'decline' | 'uphold' | 'strike' | 'reinstate' | 'stand_aside'
  ground?: string | null
  reason?: string | null
  requests?: string | null
  cast_at: string
}

export interface ChallengesRow {
  id: number
  uid: string
  entry_id: number
  reporter_user_id: number | null
  reporter_name: string | null
  text: string
  state: 'reported' | 'checked' | 'dismissed' | 'taken_up' | 'closed'
  reported_at: string
  checked_by: number | null
  checked_at: string | null
  taken_up_by: number | null
  taken_up_at: string | null
  answer_due_on: string | null
  answer_text: string | null
  answered_at: string | null
  closed_at: string | null
  outcome: 'uphold' | 'strike' | null
  running_entry_id: number | null
}

export interface ChallengesInsert {
  id?: number
  uid: string
  entry_id: number
  reporter_user_id?: number | null
  reporter_name?: string | null
  text: string
  state?: 'reported' | 'checked' | 'dismissed' | 'taken_up' | 'closed'
  reported_at: string
  checked_by?: number | null
  checked_at?: string | null
  taken_up_by?: number | null
  taken_up_at?: string | null
  answer_due_on?: string | null
  answer_text?: string | null
  answered_at?: string | null
  closed_at?: string | null
  outcome?: 'uphold' | 'strike' | null
}

export interface CheckoutsRow {
  id: number
  uid: string
  entry_id: number
  user_id: number
  provider_id: string | null
  amount_minor: number
  currency: string
  fee_version: number
  state: 'open' | 'paid' | 'failed' | 'expired' | 'cancelled'
  url: string | null
  created_at: string
  expires_at: string | null
  finished_at: string | null
  running_entry_id: number | null
}

export interface CheckoutsInsert {
  id?: number
  uid: string
  entry_id: number
  user_id: number
  provider_id?: string | null
  amount_minor: number
  currency: string
  fee_version: number
  state?: 'open' | 'paid' | 'failed' | 'expired' | 'cancelled'
  url?: string | null
  created_at: string
  expires_at?: string | null
  finished_at?: string | null
}

export interface ChecksRow {
  entry_id: number
  code: string
  ticked_by: number
  ticked_at: string
}

export interface ChecksInsert {
  entry_id: number
  code: string
  ticked_by: number
  ticked_at: string
}

export interface ClassesRow {
  id: number
  code: string
  species_id: number
  definition: string
  step: '1/8' | '1/16'
  typicality: 'typical' | 'nontypical' | 'single'
  offered: 0 | 1
  sort: number
  seeded: string | null
}

export interface ClassesInsert {
  id?: number
  code: string
  species_id: number
  definition: string
  step: '1/8' | '1/16'
  typicality: 'typical' | 'nontypical' | 'single'
  offered?: boolean | 0 | 1
  sort?: number
  seeded?: string | null
}

export interface ClassLinesRow {
  district_id: number
  species_id: number
  class_id: number
  on_line: 0 | 1
  side: string
}

export interface ClassLinesInsert {
  district_id: number
  species_id: number
  class_id: number
  on_line?: boolean | 0 | 1
  side?: string
}

export interface CountersRow {
  name: string
  value: number
}

export interface CountersInsert {
  name: string
  value?: number
}

export interface DistrictsRow {
  id: number
  code: string
  name: string
  sort: number
}

export interface DistrictsInsert {
  id?: number
  code: string
  name: string
  sort?: number
}

export interface DistrictNeighboursRow {
  district_id: number
  neighbour_id: number
}

export interface DistrictNeighboursInsert {
  district_id: number
  neighbour_id: number
}

export interface DocketItemsRow {
  id: number
  uid: string
  sitting_id: number | null
  entry_id: number
  kind: 'entry' | 'appeal' | 'challenge'
  position: number
  second_measuring_due: 0 | 1
  judge_a: number | null
  judge_b: number | null
  state: 'open' | 'decided' | 'carried' | 'applied' | 'removed'
  outcome: 'accept' | 'return' | 'decline' | 'uphold' | 'strike' | 'reinstate' | null
  ground: string | null
  reason: string | null
  created_at: string
  decided_at: string | null
  applied_at: string | null
  open_entry_id: number | null
}

export interface DocketItemsInsert {
  id?: number
  uid: string
  sitting_id?: number | null
  entry_id: number
  kind: 'entry' | 'appeal' | 'challenge'
  position?: number
  second_measuring_due?: boolean | 0 | 1
  judge_a?: number | null
  judge_b?: number | null
  state?: 'open' | 'decided' | 'carried' | 'applied' | 'removed'
  outcome?: 'accept' | 'return' | 'decline' | 'uphold' | 'strike' | 'reinstate' | null
  ground?: string | null
  reason?: string | null
  created_at: string
  decided_at?: string | null
  applied_at?: string | null
}

export interface DocumentsRow {
  id: number
  uid: string
  entry_id: number
  file_id: number
  thumb_file_id: number | null
  kind: 'photo_front' | 'photo_left' | 'photo_right' | 'photo_field' | 'tag_or_licence' | 'proof_of_possession' | 'account' | 'genetic_proof' | 'condition' | 'letter' | 'other'
  name: string
  width: number | null
  height: number | null
  pages: number | null
  sort: number
  released: 0 | 1
  scan_state: 'not_scanned' | 'clean' | 'infected'
  uploaded_by: number | null
  created_at: string
  removed_at: string | null
}

export interface DocumentsInsert {
  id?: number
  uid: string
  entry_id: number
  file_id: number
  thumb_file_id?: number | null
  kind: 'photo_front' | 'photo_left' | 'photo_right' | 'photo_field' | 'tag_or_licence' | 'proof_of_possession' | 'account' | 'genetic_proof' | 'condition' | 'letter' | 'other'
  name: string
  width?: number | null
  height?: number | null
  pages?: number | null
  sort?: number
  released?: boolean | 0 | 1
  scan_state?: 'not_scanned' | 'clean' | 'infected'
  uploaded_by?: number | null
  created_at: string
  removed_at?: string | null
}

export interface DocumentPagesRow {
  id: number
  document_id: number
  page: number
  file_id: number
  width: number
  height: number
}

export interface DocumentPagesInsert {
  id?: number
  document_id: number
  page: number
  file_id: number
  width: number
  height: number
}

export interface EntriesRow {
  id: number
  uid: string
  animal_id: number
  class_id: number
  origin: 'hunted' | 'found' | 'road_killed' | 'agency' | 'inherited'
  original_origin: 'hunted' | 'found' | 'road_killed' | 'agency' | null
  source: 'certified' | 'taken_over'
  workflow_version_id: number
  state: 'draft' | 'measuring' | 'certified' | 'in_review' | 'returned' | 'at_panel' | 'remeasuring' | 'accepted' | 'declined' | 'lapsed' | 'withdrawn' | 'challenged' | 'struck'
  state_since: string
  version: number
  owner_user_id: number | null
  begun_by_user_id: number | null
  measurer_user_id: number | null
  reviewer_user_id: number | null
  district_id: number | null
  district_side: string | null
  taken_first_on: string
  taken_last_on: string
  taken_precision: 'day' | 'month' | 'year' | 'unknown'
  method: 'rifle' | 'muzzleloader' | 'shotgun' | 'handgun' | 'compound_bow' | 'recurve_longbow' | 'crossbow' | null
  sex: 'male' | 'female' | 'unknown' | null
  guided: 0 | 1 | null
  hunter_printed_as: 'full' | 'initials' | 'withheld'
  month_public: 0 | 1
  dried_since: string | null
  dried_from: string | null
  facts: string
  term_id: number | null
  fee_version: number | null
  signed_sheet_id: number | null
  standing_sheet_id: number | null
  net16: number | null
  gross16: number | null
  due_on: string | null
  begun_at: string
  submitted_at: string | null
  revived_at: string | null
  appealed_at: string | null
  return_to: 'certified' | 'in_review' | 'returned' | 'at_panel' | 'challenged' | 'remeasuring' | null
  hold_at: string | null
  hold_by: number | null
  hold_reason: string | null
  client_content_hash: string | null
  created_at: string
  open_animal_id: number | null
  listed_animal_id: number | null
}

export interface EntriesInsert {
  id?: number
  uid: string
  animal_id: number
  class_id: number
  origin: 'hunted' | 'found' | 'road_killed' | 'agency' | 'inherited'
  original_origin?: 'hunted' | 'found' | 'road_killed' | 'agency' | null
  source?: 'certified' | 'taken_over'
  workflow_version_id: number
  state: 'draft' | 'measuring' | 'certified' | 'in_review' | 'returned' | 'at_panel' | 'remeasuring' | 'accepted' | 'declined' | 'lapsed' | 'withdrawn' | 'challenged' | 'struck'
  state_since: string
  version?: number
  owner_user_id?: number | null
  begun_by_user_id?: number | null
  measurer_user_id?: number | null
  reviewer_user_id?: number | null
  district_id?: number | null
  district_side?: string | null
  taken_first_on?: string
  taken_last_on?: string
  taken_precision?: 'day' | 'month' | 'year' | 'unknown'
  method?: 'rifle' | 'muzzleloader' | 'shotgun' | 'handgun' | 'compound_bow' | 'recurve_longbow' | 'crossbow' | null
  sex?: 'male' | 'female' | 'unknown' | null
  guided?: boolean | 0 | 1 | null
  hunter_printed_as?: 'full' | 'initials' | 'withheld'
  month_public?: boolean | 0 | 1
  dried_since?: string | null
  dried_from?: string | null
  facts?: string
  term_id?: number | null
  fee_version?: number | null
  signed_sheet_id?: number | null
  standing_sheet_id?: number | null
  net16?: number | null
  gross16?: number | null
  due_on?: string | null
  begun_at: string
  submitted_at?: string | null
  revived_at?: string | null
  appealed_at?: string | null
  return_to?: 'certified' | 'in_review' | 'returned' | 'at_panel' | 'challenged' | 'remeasuring' | null
  hold_at?: string | null
  hold_by?: number | null
  hold_reason?: string | null
  client_content_hash?: string | null
  created_at: string
}

export interface EntryEventsRow {
  id: number
  entry_id: number
  seq: number
  at: string
  kind: string
  from_state: string | null
  to_state: string | null
  actor_user_id: number | null
  args: string
  commitments: string
  prev_hash: string | null
  hash: string
}

export interface EntryEventsInsert {
  id?: number
  entry_id: number
  seq: number
  at: string
  kind: string
  from_state?: string | null
  to_state?: string | null
  actor_user_id?: number | null
  args: string
  commitments: string
  prev_hash?: string | null
  hash: string
}

export interface EntryPeopleRow {
  id: number
  uid: string
  entry_id: number
  part: 'hunter' | 'finder' | 'owner' | 'club' | 'guide' | 'guardian' | 'heir' | 'witness'
  user_id: number | null
  name: string
  name_key: string
  address: string | null
  address_key: string | null
  email: string | null
  phone: string | null
  born_on: string | null
  died_on: string | null
  is_minor: 0 | 1
  created_at: string
  erased_at: string | null
  single_part: string | null
}

export interface EntryPeopleInsert {
  id?: number
  uid: string
  entry_id: number
  part: 'hunter' | 'finder' | 'owner' | 'club' | 'guide' | 'guardian' | 'heir' | 'witness'
  user_id?: number | null
  name: string
  name_key: string
  address?: string | null
  address_key?: string | null
  email?: string | null
  phone?: string | null
  born_on?: string | null
  died_on?: string | null
  is_minor?: boolean | 0 | 1
  created_at: string
  erased_at?: string | null
}

export interface ErasuresRow {
  id: number
  user_id: number | null
  entry_person_id: number | null
  reason: string
  by_user_id: number | null
  at: string
  applied_at: string | null
}

export interface ErasuresInsert {
  id?: number
  user_id?: number | null
  entry_person_id?: number | null
  reason: string
  by_user_id?: number | null
  at: string
  applied_at?: string | null
}

export interface EventTextsRow {
  event_id: number
  field: string
  salt: string
  body: string | null
}

export interface EventTextsInsert {
  event_id: number
  field: string
  salt: string
  body?: string | null
}

export interface FacetCountsRow {
  class_id: number
  district_id: number
  method: string
  year: number
  n: number
}

export interface FacetCountsInsert {
  class_id: number
  district_id: number
  method?: string
  year?: number
  n: number
}

export interface FeesRow {
  id: number
  version: number
  class_id: number | null
  amount_minor: number
  currency: string
  class_key: number | null
}

export interface FeesInsert {
  id?: number
  version: number
  class_id?: number | null
  amount_minor: number
  currency: string
}

export interface FeeVersionsRow {
  version: number
  from_on: string
  currency: string
  created_by: number | null
  created_at: string
}

export interface FeeVersionsInsert {
  version: number
  from_on: string
  currency: string
  created_by?: number | null
  created_at: string
}

export interface FilesRow {
  id: number
  sha256: string
  size: number
  mime: string
  storage_key: string
  created_at: string
}

export interface FilesInsert {
  id?: number
  sha256: string
  size: number
  mime: string
  storage_key: string
  created_at: string
}

export interface FileOpeningsRow {
  entry_id: number
  user_id: number
  first_at: string
  last_at: string
}

export interface FileOpeningsInsert {
  entry_id: number
  user_id: number
  first_at: string
  last_at: string
}

export interface IdempotencyKeysRow {
  user_id: number
  route: string
  key: string
  body_hash: string
  state: 'running' | 'done'
  status: number | null
  response: string | null
  created_at: string
}

export interface IdempotencyKeysInsert {
  user_id: number
  route: string
  key: string
  body_hash: string
  state?: 'running' | 'done'
  status?: number | null
  response?: string | null
  created_at: string
}

export interface JobsRow {
  id: number
  uid: string
  kind: string
  payload: string
  state: 'waiting' | 'done' | 'failed' | 'cancelled'
  progress: number
  attempts: number
  run_at: string
  claimed_until: string | null
  heartbeat_at: string | null
  cancel_at: string | null
  done_at: string | null
  last_error: string | null
  result: string | null
  created_by: number | null
  created_at: string
}

export interface JobsInsert {
  id?: number
  uid: string
  kind: string
  payload: string
  state?: 'waiting' | 'done' | 'failed' | 'cancelled'
  progress?: number
  attempts?: number
  run_at: string
  claimed_until?: string | null
  heartbeat_at?: string | null
  cancel_at?: string | null
  done_at?: string | null
  last_error?: string | null
  result?: string | null
  created_by?: number | null
  created_at: string
}

export interface LedgerRow {
  id: number
  uid: string
  entry_id: number
  kind: 'charge' | 'refund' | 'dispute' | 'waiver' | 'office_payment'
  amount_minor: number
  currency: string
  provider_id: string | null
  checkout_id: number | null
  by_user_id: number | null
  reason: string | null
  at: string
}

export interface LedgerInsert {
  id?: number
  uid: string
  entry_id: number
  kind: 'charge' | 'refund' | 'dispute' | 'waiver' | 'office_payment'
  amount_minor: number
  currency: string
  provider_id?: string | null
  checkout_id?: number | null
  by_user_id?: number | null
  reason?: string | null
  at: string
}

export interface ListCountsRow {
  class_id: number
  district_id: number
  method: string
  net16: number
  n: number
}

export interface ListCountsInsert {
  class_id: number
  district_id?: number
  method?: string
  net16: number
  n: number
}

export interface MessagesRow {
  id: number
  uid: string
  entry_id: number
  author_user_id: number
  audience: 'entrant' | 'measurer' | 'office' | 'panel'
  body: string
  created_at: string
  read_at: string | null
}

export interface MessagesInsert {
  id?: number
  uid: string
  entry_id: number
  author_user_id: number
  audience: 'entrant' | 'measurer' | 'office' | 'panel'
  body: string
  created_at: string
  read_at?: string | null
}

export interface MinimumsRow {
  term_id: number
  class_id: number
  min16: number
}

export interface MinimumsInsert {
  term_id: number
  class_id: number
  min16: number
}

export interface MinimumsTermsRow {
  id: number
  label: string
  from_on: string
  to_on: string | null
}

export interface MinimumsTermsInsert {
  id?: number
  label: string
  from_on: string
  to_on?: string | null
}

export interface NoticesRow {
  id: number
  uid: string
  template: string
  user_id: number | null
  to_email: string
  entry_id: number | null
  args: string
  locale: string
  state: 'waiting' | 'sent' | 'failed'
  attempts: number
  run_at: string
  claimed_until: string | null
  sent_at: string | null
  message_id: string | null
  last_error: string | null
  created_at: string
}

export interface NoticesInsert {
  id?: number
  uid: string
  template: string
  user_id?: number | null
  to_email: string
  entry_id?: number | null
  args: string
  locale?: string
  state?: 'waiting' | 'sent' | 'failed'
  attempts?: number
  run_at: string
  claimed_until?: string | null
  sent_at?: string | null
  message_id?: string | null
  last_error?: string | null
  created_at: string
}

export interface PaymentCommandsRow {
  id: number
  kind: string
  idempotency_key: string
  entry_id: number
  checkout_id: number | null
  payload: string
  state: 'waiting' | 'done' | 'failed'
  attempts: number
  run_at: string
  claimed_until: string | null
  created_at: string
  done_at: string | null
  last_error: string | null
}

export interface PaymentCommandsInsert {
  id?: number
  kind: string
  idempotency_key: string
  entry_id: number
  checkout_id?: number | null
  payload: string
  state?: 'waiting' | 'done' | 'failed'
  attempts?: number
  run_at: string
  claimed_until?: string | null
  created_at: string
  done_at?: string | null
  last_error?: string | null
}

export interface PaymentEventsRow {
  id: number
  provider_event_id: string
  kind: string
  payload: string
  received_at: string
  handled_at: string | null
  last_error: string | null
}

export interface PaymentEventsInsert {
  id?: number
  provider_event_id: string
  kind: string
  payload: string
  received_at: string
  handled_at?: string | null
  last_error?: string | null
}

export interface RateLimitsRow {
  key: string
  points: number
  expire: number | null
}

export interface RateLimitsInsert {
  key: string
  points?: number
  expire?: number | null
}

export interface RecordsRow {
  id: number
  entry_id: number
  animal_id: number
  record_no: number
  former_no: string | null
  class_id: number
  species_id: number
  district_id: number
  method: 'rifle' | 'muzzleloader' | 'shotgun' | 'handgun' | 'compound_bow' | 'recurve_longbow' | 'crossbow' | null
  origin: 'hunted' | 'found' | 'road_killed' | 'agency' | 'inherited'
  original_origin: 'hunted' | 'found' | 'road_killed' | 'agency' | null
  sex: 'male' | 'female' | 'unknown' | null
  net16: number
  gross16: number
  taken_first_on: string
  taken_last_on: string
  taken_precision: 'day' | 'month' | 'year' | 'unknown'
  taken_year: number | null
  taken_public: 'year' | 'month'
  hunter_shown: string
  hunter_sort: string
  accepted_on: string
  accepted_at: string
  status: 'accepted' | 'challenged' | 'struck' | 'withdrawn'
  source: 'certified' | 'taken_over'
  key_figures: string
  drawing: string | null
  sheet_id: number | null
  listed_animal_id: number | null
}

export interface RecordsInsert {
  id?: number
  entry_id: number
  animal_id: number
  record_no: number
  former_no?: string | null
  class_id: number
  species_id: number
  district_id: number
  method?: 'rifle' | 'muzzleloader' | 'shotgun' | 'handgun' | 'compound_bow' | 'recurve_longbow' | 'crossbow' | null
  origin: 'hunted' | 'found' | 'road_killed' | 'agency' | 'inherited'
  original_origin?: 'hunted' | 'found' | 'road_killed' | 'agency' | null
  sex?: 'male' | 'female' | 'unknown' | null
  net16: number
  gross16: number
  taken_first_on: string
  taken_last_on: string
  taken_precision: 'day' | 'month' | 'year' | 'unknown'
  taken_public?: 'year' | 'month'
  hunter_shown?: string
  hunter_sort?: string
  accepted_on: string
  accepted_at: string
  status?: 'accepted' | 'challenged' | 'struck' | 'withdrawn'
  source?: 'certified' | 'taken_over'
  key_figures?: string
  drawing?: string | null
  sheet_id?: number | null
}

export interface RecordTokensRow {
  token: string
  class_id: number
  net16: number
  record_id: number
}

export interface RecordTokensInsert {
  token: string
  class_id: number
  net16: number
  record_id: number
}

export interface RecoveryCodesRow {
  id: number
  user_id: number
  code_hash: string
  created_at: string
  used_at: string | null
}

export interface RecoveryCodesInsert {
  id?: number
  user_id: number
  code_hash: string
  created_at: string
  used_at?: string | null
}

export interface RemeasuringsRow {
  id: number
  uid: string
  entry_id: number
  docket_item_id: number | null
  ordered_by: number | null
  ordered_at: string
  reason: string | null
  place: string
  at: string
  judge_a: number | null
  judge_b: number | null
  state: 'ordered' | 'measuring' | 'recorded' | 'not_presented' | 'cancelled'
  joint_sheet_id: number | null
  joint_signed_a_at: string | null
  joint_signed_b_at: string | null
  received_at: string | null
  lies_at: string | null
  given_back_at: string | null
  carriage_paid_by: string | null
  condition_note: string | null
  closed_at: string | null
  open_entry_id: number | null
}

export interface RemeasuringsInsert {
  id?: number
  uid: string
  entry_id: number
  docket_item_id?: number | null
  ordered_by?: number | null
  ordered_at: string
  reason?: string | null
  place: string
  at: string
  judge_a?: number | null
  judge_b?: number | null
  state?: 'ordered' | 'measuring' | 'recorded' | 'not_presented' | 'cancelled'
  joint_sheet_id?: number | null
  joint_signed_a_at?: string | null
  joint_signed_b_at?: string | null
  received_at?: string | null
  lies_at?: string | null
  given_back_at?: string | null
  carriage_paid_by?: string | null
  condition_note?: string | null
  closed_at?: string | null
}

export interface RequestsRow {
  id: number
  uid: string
  entry_id: number
  kind: string
  text: string
  wants: string
  asked_by: number | null
  asked_at: string
  answered_at: string | null
  answer_text: string | null
  answered_by: number | null
  closed_at: string | null
}

export interface RequestsInsert {
  id?: number
  uid: string
  entry_id: number
  kind: string
  text: string
  wants?: string
  asked_by?: number | null
  asked_at: string
  answered_at?: string | null
  answer_text?: string | null
  answered_by?: number | null
  closed_at?: string | null
}

export interface RoleProposalsRow {
  id: number
  uid: string
  user_id: number
  role: 'measurer' | 'reviewer' | 'judge' | 'registrar'
  proposed_by: number
  proposed_at: string
  decision: 'granted' | 'refused' | 'withdrawn' | null
  decided_by: number | null
  decided_at: string | null
  open_role: string | null
}

export interface RoleProposalsInsert {
  id?: number
  uid: string
  user_id: number
  role: 'measurer' | 'reviewer' | 'judge' | 'registrar'
  proposed_by: number
  proposed_at: string
  decision?: 'granted' | 'refused' | 'withdrawn' | null
  decided_by?: number | null
  decided_at?: string | null
}

export interface SchedulesRow {
  task: string
  period: string
  run_at: string
}

export interface SchedulesInsert {
  task: string
  period: string
  run_at: string
}

export interface SettingsRow {
  name: string
  value: string
  seeded_value: string | null
  edited_by: number | null
  edited_at: string | null
}

export interface SettingsInsert {
  name: string
  value: string
  seeded_value?: string | null
  edited_by?: number | null
  edited_at?: string | null
}

export interface SheetsRow {
  id: number
  uid: string
  entry_id: number | null
  kind: 'entry' | 'panel_a' | 'panel_b' | 'panel_joint' | 'rough'
  number: number
  definition: string
  measurements: string
  gross: number | null
  gross_all: number | null
  net: number | null
  net16: number | null
  gross16: number | null
  measured_on: string | null
  measurer_user_id: number | null
  measurer_name: string | null
  owner_user_id: number | null
  dried_since: string | null
  dried_from: string | null
  state: 'open' | 'signed' | 'replaced'
  version: number
  signed_at: string | null
  hash: string | null
  replaces_id: number | null
  reason: string | null
  slip_answers: string
  created_at: string
  open_entry_id: number | null
  measurements_hash: string | null
}

export interface SheetsInsert {
  id?: number
  uid: string
  entry_id?: number | null
  kind: 'entry' | 'panel_a' | 'panel_b' | 'panel_joint' | 'rough'
  number?: number
  definition: string
  measurements: string
  gross?: number | null
  gross_all?: number | null
  net?: number | null
  net16?: number | null
  gross16?: number | null
  measured_on?: string | null
  measurer_user_id?: number | null
  measurer_name?: string | null
  owner_user_id?: number | null
  dried_since?: string | null
  dried_from?: string | null
  state?: 'open' | 'signed' | 'replaced'
  version?: number
  signed_at?: string | null
  hash?: string | null
  replaces_id?: number | null
  reason?: string | null
  slip_answers?: string
  created_at: string
}

export interface SittingsRow {
  id: number
  uid: string
  held_on: string
  place: string
  chair_user_id: number
  state: 'planned' | 'open' | 'closed'
  created_at: string
  opened_at: string | null
  closed_at: string | null
  closed_by: number | null
  minutes_file_id: number | null
}

export interface SittingsInsert {
  id?: number
  uid: string
  held_on: string
  place: string
  chair_user_id: number
  state?: 'planned' | 'open' | 'closed'
  created_at: string
  opened_at?: string | null
  closed_at?: string | null
  closed_by?: number | null
  minutes_file_id?: number | null
}

export interface SittingJudgesRow {
  sitting_id: number
  user_id: number
  invited_at: string
  present: 0 | 1
}

export interface SittingJudgesInsert {
  sitting_id: number
  user_id: number
  invited_at: string
  present?: boolean | 0 | 1
}

export interface SpeciesRow {
  id: number
  code: string
  scientific_name: string
  family: string
  sort: number
  seeded: string | null
}

export interface SpeciesInsert {
  id?: number
  code: string
  scientific_name: string
  family: string
  sort?: number
  seeded?: string | null
}

export interface StakeClearancesRow {
  id: number
  entry_id: number
  user_id: number
  entry_person_id: number
  kind: 'name' | 'address'
  reason: string
  cleared_by: number
  cleared_at: string
}

export interface StakeClearancesInsert {
  id?: number
  entry_id: number
  user_id: number
  entry_person_id: number
  kind: 'name' | 'address'
  reason: string
  cleared_by: number
  cleared_at: string
}

export interface StakeDeclarationsRow {
  id: number
  entry_id: number
  user_id: number
  kind: 'shop' | 'other'
  reason: string | null
  declared_at: string
}

export interface StakeDeclarationsInsert {
  id?: number
  entry_id: number
  user_id: number
  kind: 'shop' | 'other'
  reason?: string | null
  declared_at: string
}

export interface StatementsRow {
  id: number
  uid: string
  entry_id: number
  text_version: number
  locale: string
  part: 'hunter' | 'finder' | 'owner' | 'club' | 'guardian' | 'heir'
  signer_name: string
  user_id: number | null
  body_hash: string
  signed_at: string
  voided_at: string | null
  standing_part: string | null
}

export interface StatementsInsert {
  id?: number
  uid: string
  entry_id: number
  text_version: number
  locale?: string
  part: 'hunter' | 'finder' | 'owner' | 'club' | 'guardian' | 'heir'
  signer_name: string
  user_id?: number | null
  body_hash: string
  signed_at: string
  voided_at?: string | null
}

export interface StatementTextsRow {
  version: number
  locale: string
  body: string
  created_at: string
}

export interface StatementTextsInsert {
  version: number
  locale: string
  body: string
  created_at: string
}

export interface TextsRow {
  key: string
  locale: string
  version: number
  body: string
  seeded_body: string | null
  edited_by: number | null
  edited_at: string | null
}

export interface TextsInsert {
  key: string
  locale: string
  version?: number
  body: string
  seeded_body?: string | null
  edited_by?: number | null
  edited_at?: string | null
}

export interface UploadsRow {
  id: number
  uid: string
  user_id: number
  entry_id: number | null
  kind: string
  name: string
  size: number
  received: number
  state: 'open' | 'stored' | 'failed'
  storage_key: string
  document_id: number | null
  created_at: string
  expires_at: string
}

export interface UploadsInsert {
  id?: number
  uid: string
  user_id: number
  entry_id?: number | null
  kind: string
  name: string
  size: number
  received?: number
  state?: 'open' | 'stored' | 'failed'
  storage_key: string
  document_id?: number | null
  created_at: string
  expires_at: string
}

export interface UsersRow {
  id: number
  uid: string
  email: string
  email_verified_at: string | null
  password_hash: string | null
  name: string
  locale: string
  district_id: number | null
  phone: string | null
  address: string | null
  shop_name: string | null
  print_name: 'full' | 'initials' | 'withheld'
  totp_secret_enc: string | null
  totp_last_step: number | null
  totp_enabled_at: string | null
  created_at: string
  disabled_at: string | null
  erased_at: string | null
}

export interface UsersInsert {
  id?: number
  uid: string
  email: string
  email_verified_at?: string | null
  password_hash?: string | null
  name: string
  locale?: string
  district_id?: number | null
  phone?: string | null
  address?: string | null
  shop_name?: string | null
  print_name?: 'full' | 'initials' | 'withheld'
  totp_secret_enc?: string | null
  totp_last_step?: number | null
  totp_enabled_at?: string | null
  created_at: string
  disabled_at?: string | null
  erased_at?: string | null
}

export interface UserRolesRow {
  id: number
  user_id: number
  role: 'entrant' | 'shop' | 'measurer' | 'reviewer' | 'judge' | 'registrar'
  from_at: string
  to_at: string | null
  granted_by: number | null
  ended_by: number | null
  held_role: string | null
}

export interface UserRolesInsert {
  id?: number
  user_id: number
  role: 'entrant' | 'shop' | 'measurer' | 'reviewer' | 'judge' | 'registrar'
  from_at: string
  to_at?: string | null
  granted_by?: number | null
  ended_by?: number | null
}

export interface UserSessionsRow {
  id: number
  uid: string
  user_id: number
  created_at: string
  last_seen_at: string
  expires_at: string
  ended_at: string | null
  user_agent: string | null
  address_hash: string | null
  second_factor_at: string | null
  reauth_at: string | null
}

export interface UserSessionsInsert {
  id?: number
  uid: string
  user_id: number
  created_at: string
  last_seen_at: string
  expires_at: string
  ended_at?: string | null
  user_agent?: string | null
  address_hash?: string | null
  second_factor_at?: string | null
  reauth_at?: string | null
}

export interface UserTokensRow {
  id: number
  kind: 'confirm_email' | 'reset_password' | 'change_email' | 'invite' | 'first_registrar' | 'claim'
  token_hash: string
  user_id: number | null
  email: string | null
  payload: string | null
  created_at: string
  expires_at: string
  used_at: string | null
}

export interface UserTokensInsert {
  id?: number
  kind: 'confirm_email' | 'reset_password' | 'change_email' | 'invite' | 'first_registrar' | 'claim'
  token_hash: string
  user_id?: number | null
  email?: string | null
  payload?: string | null
  created_at: string
  expires_at: string
  used_at?: string | null
}

export interface WorkerHeartbeatsRow {
  name: string
  started_at: string
  seen_at: string
}

export interface WorkerHeartbeatsInsert {
  name: string
  started_at: string
  seen_at: string
}

export interface WorkflowStatesRow {
  version_id: number
  code: string
  turn: 'entrant' | 'measurer' | 'reviewer' | 'panel' | 'nobody'
  sort: number
  seeded: string | null
}

export interface WorkflowStatesInsert {
  version_id: number
  code: string
  turn: 'entrant' | 'measurer' | 'reviewer' | 'panel' | 'nobody'
  sort?: number
  seeded?: string | null
}

export interface WorkflowTransitionsRow {
  version_id: number
  code: string
  from_states: string
  to_state: string | null
  parties: string
  guards: string
  effects: string
  comment_required: 0 | 1
  sort: number
  seeded: string | null
}

export interface WorkflowTransitionsInsert {
  version_id: number
  code: string
  from_states: string
  to_state?: string | null
  parties: string
  guards: string
  effects: string
  comment_required?: boolean | 0 | 1
  sort?: number
  seeded?: string | null
}

export interface WorkflowVersionsRow {
  id: number
  number: number
  created_at: string
  created_by: number | null
  note: string | null
  limits: string
}

export interface WorkflowVersionsInsert {
  id?: number
  number: number
  created_at: string
  created_by?: number | null
  note?: string | null
  limits?: string
}

declare module 'knex/types/tables' {
  interface Tables {
    accreditations: Knex.CompositeTableType<AccreditationsRow, Given<AccreditationsInsert>, Partial<Given<AccreditationsInsert>>>
    accreditation_species: Knex.CompositeTableType<AccreditationSpeciesRow, Given<AccreditationSpeciesInsert>, Partial<Given<AccreditationSpeciesInsert>>>
    animals: Knex.CompositeTableType<AnimalsRow, Given<AnimalsInsert>, Partial<Given<AnimalsInsert>>>
    ballots: Knex.CompositeTableType<BallotsRow, Given<BallotsInsert>, Partial<Given<BallotsInsert>>>
    challenges: Knex.CompositeTableType<ChallengesRow, Given<ChallengesInsert>, Partial<Given<ChallengesInsert>>>
    checkouts: Knex.CompositeTableType<CheckoutsRow, Given<CheckoutsInsert>, Partial<Given<CheckoutsInsert>>>
    checks: Knex.CompositeTableType<ChecksRow, Given<ChecksInsert>, Partial<Given<ChecksInsert>>>
    classes: Knex.CompositeTableType<ClassesRow, Given<ClassesInsert>, Partial<Given<ClassesInsert>>>
    class_lines: Knex.CompositeTableType<ClassLinesRow, Given<ClassLinesInsert>, Partial<Given<ClassLinesInsert>>>
    counters: Knex.CompositeTableType<CountersRow, Given<CountersInsert>, Partial<Given<CountersInsert>>>
    districts: Knex.CompositeTableType<DistrictsRow, Given<DistrictsInsert>, Partial<Given<DistrictsInsert>>>
    district_neighbours: Knex.CompositeTableType<DistrictNeighboursRow, Given<DistrictNeighboursInsert>, Partial<Given<DistrictNeighboursInsert>>>
    docket_items: Knex.CompositeTableType<DocketItemsRow, Given<DocketItemsInsert>, Partial<Given<DocketItemsInsert>>>
    documents: Knex.CompositeTableType<DocumentsRow, Given<DocumentsInsert>, Partial<Given<DocumentsInsert>>>
    document_pages: Knex.CompositeTableType<DocumentPagesRow, Given<DocumentPagesInsert>, Partial<Given<DocumentPagesInsert>>>
    entries: Knex.CompositeTableType<EntriesRow, Given<EntriesInsert>, Partial<Given<EntriesInsert>>>
    entry_events: Knex.CompositeTableType<EntryEventsRow, Given<EntryEventsInsert>, Partial<Given<EntryEventsInsert>>>
    entry_people: Knex.CompositeTableType<EntryPeopleRow, Given<EntryPeopleInsert>, Partial<Given<EntryPeopleInsert>>>
    erasures: Knex.CompositeTableType<ErasuresRow, Given<ErasuresInsert>, Partial<Given<ErasuresInsert>>>
    event_texts: Knex.CompositeTableType<EventTextsRow, Given<EventTextsInsert>, Partial<Given<EventTextsInsert>>>
    facet_counts: Knex.CompositeTableType<FacetCountsRow, Given<FacetCountsInsert>, Partial<Given<FacetCountsInsert>>>
    fees: Knex.CompositeTableType<FeesRow, Given<FeesInsert>, Partial<Given<FeesInsert>>>
    fee_versions: Knex.CompositeTableType<FeeVersionsRow, Given<FeeVersionsInsert>, Partial<Given<FeeVersionsInsert>>>
    files: Knex.CompositeTableType<FilesRow, Given<FilesInsert>, Partial<Given<FilesInsert>>>
    file_openings: Knex.CompositeTableType<FileOpeningsRow, Given<FileOpeningsInsert>, Partial<Given<FileOpeningsInsert>>>
    idempotency_keys: Knex.CompositeTableType<IdempotencyKeysRow, Given<IdempotencyKeysInsert>, Partial<Given<IdempotencyKeysInsert>>>
    jobs: Knex.CompositeTableType<JobsRow, Given<JobsInsert>, Partial<Given<JobsInsert>>>
    ledger: Knex.CompositeTableType<LedgerRow, Given<LedgerInsert>, Partial<Given<LedgerInsert>>>
    list_counts: Knex.CompositeTableType<ListCountsRow, Given<ListCountsInsert>, Partial<Given<ListCountsInsert>>>
    messages: Knex.CompositeTableType<MessagesRow, Given<MessagesInsert>, Partial<Given<MessagesInsert>>>
    minimums: Knex.CompositeTableType<MinimumsRow, Given<MinimumsInsert>, Partial<Given<MinimumsInsert>>>
    minimums_terms: Knex.CompositeTableType<MinimumsTermsRow, Given<MinimumsTermsInsert>, Partial<Given<MinimumsTermsInsert>>>
    notices: Knex.CompositeTableType<NoticesRow, Given<NoticesInsert>, Partial<Given<NoticesInsert>>>
    payment_commands: Knex.CompositeTableType<PaymentCommandsRow, Given<PaymentCommandsInsert>, Partial<Given<PaymentCommandsInsert>>>
    payment_events: Knex.CompositeTableType<PaymentEventsRow, Given<PaymentEventsInsert>, Partial<Given<PaymentEventsInsert>>>
    rate_limits: Knex.CompositeTableType<RateLimitsRow, Given<RateLimitsInsert>, Partial<Given<RateLimitsInsert>>>
    records: Knex.CompositeTableType<RecordsRow, Given<RecordsInsert>, Partial<Given<RecordsInsert>>>
    record_tokens: Knex.CompositeTableType<RecordTokensRow, Given<RecordTokensInsert>, Partial<Given<RecordTokensInsert>>>
    recovery_codes: Knex.CompositeTableType<RecoveryCodesRow, Given<RecoveryCodesInsert>, Partial<Given<RecoveryCodesInsert>>>
    remeasurings: Knex.CompositeTableType<RemeasuringsRow, Given<RemeasuringsInsert>, Partial<Given<RemeasuringsInsert>>>
    requests: Knex.CompositeTableType<RequestsRow, Given<RequestsInsert>, Partial<Given<RequestsInsert>>>
    role_proposals: Knex.CompositeTableType<RoleProposalsRow, Given<RoleProposalsInsert>, Partial<Given<RoleProposalsInsert>>>
    schedules: Knex.CompositeTableType<SchedulesRow, Given<SchedulesInsert>, Partial<Given<SchedulesInsert>>>
    settings: Knex.CompositeTableType<SettingsRow, Given<SettingsInsert>, Partial<Given<SettingsInsert>>>
    sheets: Knex.CompositeTableType<SheetsRow, Given<SheetsInsert>, Partial<Given<SheetsInsert>>>
    sittings: Knex.CompositeTableType<SittingsRow, Given<SittingsInsert>, Partial<Given<SittingsInsert>>>
    sitting_judges: Knex.CompositeTableType<SittingJudgesRow, Given<SittingJudgesInsert>, Partial<Given<SittingJudgesInsert>>>
    species: Knex.CompositeTableType<SpeciesRow, Given<SpeciesInsert>, Partial<Given<SpeciesInsert>>>
    stake_clearances: Knex.CompositeTableType<StakeClearancesRow, Given<StakeClearancesInsert>, Partial<Given<StakeClearancesInsert>>>
    stake_declarations: Knex.CompositeTableType<StakeDeclarationsRow, Given<StakeDeclarationsInsert>, Partial<Given<StakeDeclarationsInsert>>>
    statements: Knex.CompositeTableType<StatementsRow, Given<StatementsInsert>, Partial<Given<StatementsInsert>>>
    statement_texts: Knex.CompositeTableType<StatementTextsRow, Given<StatementTextsInsert>, Partial<Given<StatementTextsInsert>>>
    texts: Knex.CompositeTableType<TextsRow, Given<TextsInsert>, Partial<Given<TextsInsert>>>
    uploads: Knex.CompositeTableType<UploadsRow, Given<UploadsInsert>, Partial<Given<UploadsInsert>>>
    users: Knex.CompositeTableType<UsersRow, Given<UsersInsert>, Partial<Given<UsersInsert>>>
    user_roles: Knex.CompositeTableType<UserRolesRow, Given<UserRolesInsert>, Partial<Given<UserRolesInsert>>>
    user_sessions: Knex.CompositeTableType<UserSessionsRow, Given<UserSessionsInsert>, Partial<Given<UserSessionsInsert>>>
    user_tokens: Knex.CompositeTableType<UserTokensRow, Given<UserTokensInsert>, Partial<Given<UserTokensInsert>>>
    worker_heartbeats: Knex.CompositeTableType<WorkerHeartbeatsRow, Given<WorkerHeartbeatsInsert>, Partial<Given<WorkerHeartbeatsInsert>>>
    workflow_states: Knex.CompositeTableType<WorkflowStatesRow, Given<WorkflowStatesInsert>, Partial<Given<WorkflowStatesInsert>>>
    workflow_transitions: Knex.CompositeTableType<WorkflowTransitionsRow, Given<WorkflowTransitionsInsert>, Partial<Given<WorkflowTransitionsInsert>>>
    workflow_versions: Knex.CompositeTableType<WorkflowVersionsRow, Given<WorkflowVersionsInsert>, Partial<Given<WorkflowVersionsInsert>>>
  }
}
