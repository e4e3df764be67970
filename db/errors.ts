import { DomainError, isDomainError, type ErrorCode, type FieldError } from '#shared/errors'

/** What the driver and the pool throw, as far as it is read here. */
interface DriverError {
  code?: string
  errno?: number
  sqlMessage?: string
  message: string
}

interface Meaning {
  code: ErrorCode
  field?: FieldError
}

/** What it means to the caller when a constraint refuses; constraints that only a fault of ours can break are absent. */
const MEANINGS: Readonly<Record<string, Meaning>> = {
  uq_users_email: { code: 'duplicate', field: { path: 'email', code: 'taken' } },
  ck_users_email: { code: 'invalid_input', field: { path: 'email', code: 'email' } },
  ck_users_name: { code: 'invalid_input', field: { path: 'name', code: 'required' } },
  uq_user_roles_held: { code: 'duplicate', field: { path: 'role', code: 'held_already' } },
  ck_user_roles_other: { code: 'stake' },
  uq_role_proposals_open: { code: 'duplicate', field: { path: 'role', code: 'proposed_already' } },
  ck_role_proposals_other: { code: 'stake' },
  ck_role_proposals_second: { code: 'stake' },
  uq_accreditations_number: { code: 'duplicate', field: { path: 'number', code: 'taken' } },
  ck_accreditations_span: { code: 'invalid_input', field: { path: 'validTo', code: 'before_start' } },
  uq_districts_code: { code: 'duplicate', field: { path: 'code', code: 'taken' } },
  uq_districts_name: { code: 'duplicate', field: { path: 'name', code: 'taken' } },
  uq_minimums_terms_from: { code: 'duplicate', field: { path: 'fromOn', code: 'taken' } },
  uq_entries_uid: { code: 'duplicate', field: { path: 'id', code: 'taken' } },
  uq_entries_open_animal: { code: 'duplicate', field: { path: 'animal', code: 'live_already' } },
  uq_entries_listed_animal: { code: 'duplicate', field: { path: 'animal', code: 'live_already' } },
  uq_records_listed_animal: { code: 'duplicate', field: { path: 'animal', code: 'live_already' } },
  ck_entries_taken: { code: 'invalid_input', field: { path: 'takenOn', code: 'date' } },
  uq_entry_people_single: { code: 'duplicate', field: { path: 'people', code: 'one_only' } },
  ck_entry_people_name: { code: 'invalid_input', field: { path: 'name', code: 'required' } },
  ck_stake_clearances_other: { code: 'stake' },
  uq_sheets_open: { code: 'duplicate', field: { path: 'sheet', code: 'open_already' } },
  signed_sheet_unchanged: { code: 'sheet_signed' },
  uq_statements_standing: { code: 'duplicate', field: { path: 'statement', code: 'signed_already' } },
  uq_checkouts_running: { code: 'duplicate', field: { path: 'checkout', code: 'running_already' } },
  ck_requests_text: { code: 'invalid_input', field: { path: 'text', code: 'required' } },
  uq_docket_items_open: { code: 'duplicate', field: { path: 'entry', code: 'on_docket_already' } },
  uq_ballots_judge: { code: 'duplicate', field: { path: 'vote', code: 'cast_already' } },
  ck_ballots_reason: { code: 'invalid_input', field: { path: 'reason', code: 'required' } },
  uq_remeasurings_open: { code: 'duplicate', field: { path: 'entry', code: 'remeasuring_already' } },
  uq_challenges_running: { code: 'duplicate', field: { path: 'entry', code: 'challenged_already' } },
  uq_idempotency_keys: { code: 'idempotency_in_flight' },
}

const AWAY = new Set([
  'ECONNREFUSED', 'ECONNRESET', 'EPIPE', 'ENOENT', 'ETIMEDOUT', 'EHOSTUNREACH', 'ENOTFOUND', 'EAI_AGAIN',
  'PROTOCOL_CONNECTION_LOST', 'PROTOCOL_SEQUENCE_TIMEOUT', 'PROTOCOL_ENQUEUE_AFTER_FATAL_ERROR',
  'ER_CON_COUNT_ERROR', 'ER_SERVER_SHUTDOWN', 'ER_CONNECTION_KILLED', 'ER_NORMAL_SHUTDOWN', 'ER_STATEMENT_TIMEOUT',
  'ER_ACCESS_DENIED_ERROR', 'ER_DBACCESS_DENIED_ERROR', 'ER_BAD_DB_ERROR', 'ER_OPTION_PREVENTS_STATEMENT',
])
const AWAY_ERRNO = new Set([1040, 1053, 1927, 1969, 1205, 1213, 1290, 4031])
const AWAY_MESSAGE = /^(Connection lost|Can't add new command when connection is in closed state|aborted$|Unable to acquire a connection)/

const DUPLICATE = 1062
const MISSING_PARENT = 1452
const STILL_REFERRED_TO = 1451
const CHECK_FAILED = 4025
const SIGNALLED = 1644
const TOO_LONG = 1406
/** A letter outside ASCII beside a column that holds codes only. */
const NOT_ASCII = 1267
const OUT_OF_RANGE = new Set([1264, 1265, 1292, 1366, 1690])

/** True for a deadlock or a lock that did not come: nothing was done, the whole may be tried again. */
export function isLockConflict(error: unknown): boolean {
  const { errno } = error as DriverError
  return errno === 1213 || errno === 1205
}

/** True when the database could not be reached, was too busy, or went away under the statement. */
export function isDatabaseAway(error: unknown): boolean {
  if (!(error instanceof Error)) return false
  const { code, errno, message } = error as DriverError
  return error.name === 'KnexTimeoutError'
    || error.name === 'TimeoutError'
    || (code !== undefined && AWAY.has(code))
    || (errno !== undefined && AWAY_ERRNO.has(errno))
    || AWAY_MESSAGE.test(message)
}

/** The name of the constraint, or of a trigger's rule, that refused; undefined where none did. */
export function refusedBy(error: unknown): string | undefined {
  const { errno, sqlMessage } = error as DriverError
  const text = sqlMessage ?? ''
  if (errno === DUPLICATE) {
    const key = /for key '([^']+)'$/.exec(text)?.[1]?.replace(/^.*\./, '')
    // The primary key is called PRIMARY on every table; this one alone has a meaning of its own.
    return key === 'PRIMARY' && /idempotency_keys/.test((error as Error).message) ? 'uq_idempotency_keys' : key
  }
  if (errno === CHECK_FAILED) return /CONSTRAINT `([^`]+)` failed/.exec(text)?.[1]
  if (errno === MISSING_PARENT || errno === STILL_REFERRED_TO) return /CONSTRAINT `([^`]+)`/.exec(text)?.[1]
  if (errno === SIGNALLED) return /^rule:(\w+)/.exec(text)?.[1]
  return undefined
}

function camel(column: string): string {
  return column.replace(/_(\w)/g, (_, letter: string) => letter.toUpperCase())
}

/**
 * Turns what the driver or the pool threw into the refusal that the caller can act on; anything else comes back as
 * it was. The driver's own words go to the log alone.
 */
export function translateDatabaseError(error: unknown): unknown {
  if (isDomainError(error) || !(error instanceof Error)) return error
  const { errno, sqlMessage, message } = error as DriverError
  const say = (code: ErrorCode, field?: FieldError) =>
    new DomainError(code, { ...(field ? { fields: [field] } : {}), logLine: sqlMessage ?? message, cause: error })

  if (isDatabaseAway(error)) return say('database_away')
  if (errno === undefined) return error

  const constraint = refusedBy(error)
  const meaning = constraint === undefined ? undefined : MEANINGS[constraint]
  if (meaning) return say(meaning.code, meaning.field)
  if (errno === DUPLICATE) return say('duplicate')
  if (errno === STILL_REFERRED_TO) return say('still_used')
  if (errno === NOT_ASCII) return say('invalid_input')
  if (errno === TOO_LONG || OUT_OF_RANGE.has(errno)) {
    const column = /column (?:`[^`]*`\.`[^`]*`\.)?[`']([^`']+)[`']/.exec(sqlMessage ?? '')?.[1]
    return say('invalid_input', { path: column ? camel(column) : '', code: errno === TOO_LONG ? 'too_long' : 'out_of_range' })
  }
  return error
}
