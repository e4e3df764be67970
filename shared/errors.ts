/** Every refusal the system knows, with the HTTP status it is told by. The sentence comes later, from `errors.<code>` in the reader's language. */
export const ERRORS = {
  // the request
  invalid_input: 422,
  bad_request: 400,
  body_too_large: 413,
  unsupported_media: 415,
  cursor_invalid: 422,
  foreign_origin: 403,
  too_many_requests: 429,
  precondition_required: 428,
  precondition_failed: 412,
  idempotency_mismatch: 422,
  idempotency_in_flight: 409,
  // who asks
  sign_in_required: 401,
  forbidden: 403,
  not_found: 404,
  method_not_allowed: 405,
  second_factor_required: 403,
  second_factor_setup_required: 403,
  password_wrong: 422,
  sign_in_failed: 401,
  email_unconfirmed: 403,
  link_spent: 422,
  stake: 403,
  // the state of things
  version_conflict: 409,
  wrong_state: 409,
  on_hold: 409,
  guard_failed: 422,
  duplicate: 409,
  still_used: 409,
  frozen_fact: 422,
  sheet_signed: 409,
  sitting_closed: 409,
  nothing_due: 409,
  // files
  file_too_large: 413,
  file_kind: 415,
  file_unreadable: 422,
  file_infected: 422,
  quota_entry: 409,
  quota_person: 429,
  file_settled: 409,
  // the house itself
  internal: 500,
  database_away: 503,
  mail_away: 503,
  payments_away: 503,
  storage_away: 503,
  not_configured: 503,
} as const satisfies Record<string, number>

export type ErrorCode = keyof typeof ERRORS

/** One field that was refused: where it stands in the request, which rule it broke, and the rule's arguments. */
export interface FieldError {
  readonly path: string
  readonly code: string
  readonly params?: Readonly<Record<string, string | number>>
  /** A sentence already made, where the rule's own words travel with it. */
  readonly message?: string
}

export interface DomainErrorOptions {
  /** Arguments for the sentence; everything in here may be shown to the caller. */
  readonly details?: Readonly<Record<string, unknown>>
  readonly fields?: readonly FieldError[]
  /** For the log alone: never leaves the server. */
  readonly logLine?: string
  readonly cause?: unknown
}

/** A refusal or failure with a code. Services throw it; the route turns it into a problem document (RFC 9457). */
export class DomainError extends Error {
  readonly code: ErrorCode
  readonly status: number
  readonly details: Readonly<Record<string, unknown>>
  readonly fields: readonly FieldError[]
  readonly logLine: string | undefined

  constructor(code: ErrorCode, options: DomainErrorOptions = {}) {
    super(options.logLine ? `${code}: ${options.logLine}` : code, options.cause === undefined ? undefined : { cause: options.cause })
    this.name = 'DomainError'
    this.code = code
    this.status = ERRORS[code]
    this.details = options.details ?? {}
    this.fields = options.fields ?? []
    this.logLine = options.logLine
  }
}

export function isDomainError(value: unknown): value is DomainError {
  return value instanceof DomainError
}
