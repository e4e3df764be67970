import { FetchError } from 'ofetch'

/** What the server says when it refuses: a problem document (RFC 9457). */
export interface ApiProblem {
  readonly status: number
  readonly code: string
  readonly detail: string
  readonly errors: readonly { readonly path: string, readonly code: string, readonly message: string }[]
  readonly [extension: string]: unknown
}

export class ApiError extends Error {
  readonly problem: ApiProblem
  constructor(problem: ApiProblem) {
    super(problem.detail)
    this.name = 'ApiError'
    this.problem = problem
  }
}

export interface ApiOptions {
  readonly method?: 'GET' | 'POST' | 'PUT' | 'PATCH' | 'DELETE'
  readonly body?: unknown
  readonly query?: Record<string, unknown>
  /** Version that the change is based on. */
  readonly ifMatch?: number | string
  /** Makes a repetition of the same POST harmless. */
  readonly idempotencyKey?: string
  readonly signal?: AbortSignal
}

/** Calls the server for a change; throws ApiError with what it said, or with `offline` when it could not be reached. */
export async function api<T>(path: string, options: ApiOptions = {}): Promise<T> {
  const { t } = useNuxtApp().$i18n
  try {
    return await $fetch<T>(path, {
      method: (options.method ?? 'POST') as 'POST',
      body: options.body as Record<string, unknown> | undefined,
      query: options.query,
      signal: options.signal,
      headers: {
        ...(options.ifMatch === undefined ? {} : { 'if-match': `"${options.ifMatch}"` }),
        ...(options.idempotencyKey ? { 'idempotency-key': options.idempotencyKey } : {}),
      },
    }) as T
  }
  catch (error) {
    if (error instanceof FetchError && error.data && typeof error.data === 'object' && 'code' in error.data) {
      throw new ApiError({ errors: [], ...error.data } as unknown as ApiProblem)
    }
    throw new ApiError({ status: 0, code: 'offline', detail: t('common.offline'), errors: [] })
  }
}
