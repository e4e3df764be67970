// Made by scripts/db-migrations.ts; run `npm run db:index` after adding a migration.
import type { Step as Migration } from '../columns'
import * as m0001_districts from './0001_districts'
import * as m0002_district_neighbours from './0002_district_neighbours'
import * as m0003_users from './0003_users'
import * as m0004_user_sessions from './0004_user_sessions'
import * as m0005_user_tokens from './0005_user_tokens'
import * as m0006_recovery_codes from './0006_recovery_codes'
import * as m0007_user_roles from './0007_user_roles'
import * as m0008_role_proposals from './0008_role_proposals'
import * as m0009_species from './0009_species'
import * as m0010_classes from './0010_classes'
import * as m0011_accreditations from './0011_accreditations'
import * as m0012_accreditation_species from './0012_accreditation_species'
import * as m0013_rate_limits from './0013_rate_limits'
import * as m0014_class_lines from './0014_class_lines'
import * as m0015_minimums_terms from './0015_minimums_terms'
import * as m0016_minimums from './0016_minimums'
import * as m0017_fee_versions from './0017_fee_versions'
import * as m0018_fees from './0018_fees'
import * as m0019_workflow_versions from './0019_workflow_versions'
import * as m0020_workflow_states from './0020_workflow_states'
import * as m0021_workflow_transitions from './0021_workflow_transitions'
import * as m0022_animals from './0022_animals'
import * as m0023_entries from './0023_entries'
import * as m0024_animals_live_entry from './0024_animals_live_entry'
import * as m0025_entry_people from './0025_entry_people'
import * as m0026_stake_clearances from './0026_stake_clearances'
import * as m0027_stake_declarations from './0027_stake_declarations'
import * as m0028_sheets from './0028_sheets'
import * as m0029_sheets_signed_unchanged from './0029_sheets_signed_unchanged'
import * as m0030_sheets_signed_kept from './0030_sheets_signed_kept'
import * as m0031_entries_signed_sheet from './0031_entries_signed_sheet'
import * as m0032_entries_standing_sheet from './0032_entries_standing_sheet'
import * as m0033_files from './0033_files'
import * as m0034_documents from './0034_documents'
import * as m0035_uploads from './0035_uploads'
import * as m0036_statement_texts from './0036_statement_texts'
import * as m0037_statement_texts_unchanged from './0037_statement_texts_unchanged'
import * as m0038_statements from './0038_statements'
import * as m0039_checkouts from './0039_checkouts'
import * as m0040_ledger from './0040_ledger'
import * as m0041_ledger_no_update from './0041_ledger_no_update'
import * as m0042_ledger_no_delete from './0042_ledger_no_delete'
import * as m0043_payment_commands from './0043_payment_commands'
import * as m0044_payment_events from './0044_payment_events'
import * as m0045_requests from './0045_requests'
import * as m0046_messages from './0046_messages'
import * as m0047_checks from './0047_checks'
import * as m0048_sittings from './0048_sittings'
import * as m0049_sitting_judges from './0049_sitting_judges'
import * as m0050_docket_items from './0050_docket_items'
import * as m0051_ballots from './0051_ballots'
import * as m0052_file_openings from './0052_file_openings'
import * as m0053_remeasurings from './0053_remeasurings'
import * as m0054_challenges from './0054_challenges'
import * as m0055_entry_events from './0055_entry_events'
import * as m0056_entry_events_no_update from './0056_entry_events_no_update'
import * as m0057_entry_events_no_delete from './0057_entry_events_no_delete'
import * as m0058_event_texts from './0058_event_texts'
import * as m0059_event_texts_only_erased from './0059_event_texts_only_erased'
import * as m0060_event_texts_no_delete from './0060_event_texts_no_delete'
import * as m0061_notices from './0061_notices'
import * as m0062_jobs from './0062_jobs'
import * as m0063_schedules from './0063_schedules'
import * as m0064_records from './0064_records'
import * as m0065_list_counts from './0065_list_counts'
import * as m0066_facet_counts from './0066_facet_counts'
import * as m0067_record_tokens from './0067_record_tokens'
import * as m0068_counters from './0068_counters'
import * as m0069_texts from './0069_texts'
import * as m0070_idempotency_keys from './0070_idempotency_keys'
import * as m0071_settings from './0071_settings'
import * as m0072_erasures from './0072_erasures'
import * as m0073_worker_heartbeats from './0073_worker_heartbeats'
import * as m0075_workflow_versions_limits from './0075_workflow_versions_limits'
import * as m0076_sheets_measurements_hash from './0076_sheets_measurements_hash'
import * as m0080_document_pages from './0080_document_pages'
import * as m0081_records_public_orders from './0081_records_public_orders'

export type { Migration }

/** Every migration by its name, in the order in which they run. */
export const MIGRATIONS: readonly (readonly [name: string, migration: Migration])[] = [
  ['0001_districts', m0001_districts],
  ['0002_district_neighbours', m0002_district_neighbours],
  ['0003_users', m0003_users],
  ['0004_user_sessions', m0004_user_sessions],
  ['0005_user_tokens', m0005_user_tokens],
  ['0006_recovery_codes', m0006_recovery_codes],
  ['0007_user_roles', m0007_user_roles],
  ['0008_role_proposals', m0008_role_proposals],
  ['0009_species', m0009_species],
  ['0010_classes', m0010_classes],
  ['0011_accreditations', m0011_accreditations],
  ['0012_accreditation_species', m0012_accreditation_species],
  ['0013_rate_limits', m0013_rate_limits],
  ['0014_class_lines', m0014_class_lines],
  ['0015_minimums_terms', m0015_minimums_terms],
  ['0016_minimums', m0016_minimums],
  ['0017_fee_versions', m0017_fee_versions],
  ['0018_fees', m0018_fees],
  ['0019_workflow_versions', m0019_workflow_versions],
  ['0020_workflow_states', m0020_workflow_states],
  ['0021_workflow_transitions', m0021_workflow_transitions],
  ['0022_animals', m0022_animals],
  ['0023_entries', m0023_entries],
  ['0024_animals_live_entry', m0024_animals_live_entry],
  ['0025_entry_people', m0025_entry_people],
  ['0026_stake_clearances', m0026_stake_clearances],
  ['0027_stake_declarations', m0027_stake_declarations],
  ['0028_sheets', m0028_sheets],
  ['0029_sheets_signed_unchanged', m0029_sheets_signed_unchanged],
  ['0030_sheets_signed_kept', m0030_sheets_signed_kept],
  ['0031_entries_signed_sheet', m0031_entries_signed_sheet],
  ['0032_entries_standing_sheet', m0032_entries_standing_sheet],
  ['0033_files', m0033_files],
  ['0034_documents', m0034_documents],
  ['0035_uploads', m0035_uploads],
  ['0036_statement_texts', m0036_statement_texts],
  ['0037_statement_texts_unchanged', m0037_statement_texts_unchanged],
  ['0038_statements', m0038_statements],
  ['0039_checkouts', m0039_checkouts],
  ['0040_ledger', m0040_ledger],
  ['0041_ledger_no_update', m0041_ledger_no_update],
  ['0042_ledger_no_delete', m0042_ledger_no_delete],
  ['0043_payment_commands', m0043_payment_commands],
  ['0044_payment_events', m0044_payment_events],
  ['0045_requests', m0045_requests],
  ['0046_messages', m0046_messages],
  ['0047_checks', m0047_checks],
  ['0048_sittings', m0048_sittings],
  ['0049_sitting_judges', m0049_sitting_judges],
  ['0050_docket_items', m0050_docket_items],
  ['0051_ballots', m0051_ballots],
  ['0052_file_openings', m0052_file_openings],
  ['0053_remeasurings', m0053_remeasurings],
  ['0054_challenges', m0054_challenges],
  ['0055_entry_events', m0055_entry_events],
  ['0056_entry_events_no_update', m0056_entry_events_no_update],
  ['0057_entry_events_no_delete', m0057_entry_events_no_delete],
  ['0058_event_texts', m0058_event_texts],
  ['0059_event_texts_only_erased', m0059_event_texts_only_erased],
  ['0060_event_texts_no_delete', m0060_event_texts_no_delete],
  ['0061_notices', m0061_notices],
  ['0062_jobs', m0062_jobs],
  ['0063_schedules', m0063_schedules],
  ['0064_records', m0064_records],
  ['0065_list_counts', m0065_list_counts],
  ['0066_facet_counts', m0066_facet_counts],
  ['0067_record_tokens', m0067_record_tokens],
  ['0068_counters', m0068_counters],
  ['0069_texts', m0069_texts],
  ['0070_idempotency_keys', m0070_idempotency_keys],
  ['0071_settings', m0071_settings],
  ['0072_erasures', m0072_erasures],
  ['0073_worker_heartbeats', m0073_worker_heartbeats],
  ['0075_workflow_versions_limits', m0075_workflow_versions_limits],
  ['0076_sheets_measurements_hash', m0076_sheets_measurements_hash],
  ['0080_document_pages', m0080_document_pages],
  ['0081_records_public_orders', m0081_records_public_orders],
]
