import type { H3Event } from 'h3'
import { getRequestHeader, setResponseHeader, setResponseStatus } from 'h3'
import type { ZodError } from 'zod'
import type { DomainError, FieldError } from '../../shared/errors'
import { hasText, t } from '../services/texts/translate'

/** A problem document (RFC 9457) with the fields that were refused. */
export interface Problem {
  readonly type: string
  readonly title: string
  readonly status: number
  readonly detail: string
  readonly code: string
  readonly errors?: readonly { readonly path: string, readonly code: string, readonly message: string }[]
  readonly [extension: string]: unknown
}

/** The language that the caller asks for first. */
export function localeOfRequest(event: H3Event): string {
  return (getRequestHeader(event, 'accept-language') ?? 'en').slice(0, 2).toLowerCase()
}

function sayField(locale: string, field: FieldError) {
  const key = [`errors.fields.${field.code}`, 'errors.fields.invalid'].find(hasText)!
  return { path: field.path, code: field.code, message: field.message ?? t(locale, key, field.params ?? {}) }
}

/** The document that an error is told by. Only what the error marks as showable is in it. */
export function problemOf(event: H3Event, error: DomainError): Problem {
  const locale = localeOfRequest(event)
  const params = Object.fromEntries(Object.entries(error.details).filter(([, value]) => typeof value === 'string' || typeof value === 'number'))
  const detailKey = typeof error.details.reason === 'string' && hasText(`errors.${error.code}_${error.details.reason}`)
    ? `errors.${error.code}_${error.details.reason}`
    : `errors.${error.code}`
  return {
    ...error.details,
    type: `urn:hartroll:problem:${error.code}`,
    title: t(locale, `errors.titles.s${error.status}`),
    status: error.status,
    detail: t(locale, detailKey, params),
    code: error.code,
    ...(error.fields.length > 0 ? { errors: error.fields.map(field => sayField(locale, field)) } : {}),
  }
}

/** Answers with a problem document and its media type. */
export function sendProblem(event: H3Event, error: DomainError): Problem {
  const problem = problemOf(event, error)
  setResponseStatus(event, problem.status)
  setResponseHeader(event, 'content-type', 'application/problem+json')
  setResponseHeader(event, 'cache-control', 'no-store')
  return problem
}

/** A schema's refusals as fields, each by its path such as `measurements.right.g2`. */
export function fieldsOf(error: ZodError, prefix = ''): FieldError[] {
  return error.issues.slice(0, 100).map((issue) => {
    const path = [...(prefix ? [prefix] : []), ...issue.path.map(String)].join('.')
    if (issue.code === 'custom') {
      const given = issue as { params?: { code?: string, params?: Record<string, string | number> } }
      return { path, code: given.params?.code ?? 'invalid', params: given.params?.params }
    }
    const more = issue as unknown as { minimum?: number, maximum?: number, expected?: string, format?: string, origin?: string, keys?: string[] }
    if (issue.code === 'unrecognized_keys') return { path: [path, more.keys?.[0]].filter(Boolean).join('.'), code: 'unknown_field' }
    if (issue.code === 'invalid_type' && 'input' in issue && issue.input === undefined) return { path, code: 'required' }
    if (issue.code === 'invalid_type' && /received undefined/.test(issue.message)) return { path, code: 'required' }
    if (issue.code === 'too_small' && more.origin === 'string' && more.minimum === 1) return { path, code: 'required' }
    if (issue.code === 'too_small') return { path, code: more.origin === 'string' ? 'too_short' : 'too_small', params: { minimum: Number(more.minimum) } }
    if (issue.code === 'too_big') return { path, code: more.origin === 'string' ? 'too_long' : 'too_big', params: { maximum: Number(more.maximum) } }
    if (issue.code === 'invalid_format' && more.format === 'email') return { path, code: 'email' }
    return { path, code: 'invalid' }
  })
}
