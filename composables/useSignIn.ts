/** How a try to sign in ended; `retryAfter` in seconds comes with `wait`. */
export type SignInOutcome
  = | { readonly kind: 'in' | 'failed' | 'unconfirmed' | 'code' | 'codeWrong' | 'expired' | 'offline' }
    | { readonly kind: 'wait', readonly retryAfter: number }

const REFUSALS: Readonly<Record<string, 'failed' | 'unconfirmed' | 'code' | 'codeWrong'>> = {
  sign_in_failed: 'failed', CredentialsSignin: 'failed', email_unconfirmed: 'unconfirmed', second_factor_required: 'code', second_factor_wrong: 'codeWrong',
}

/** Signs in by the usual routes of the sign-in package. */
export async function signInWith(fields: { email: string, password: string, code?: string }): Promise<SignInOutcome> {
  try {
    const { csrfToken } = await $fetch<{ csrfToken: string }>('/api/auth/csrf')
    const answer = await fetch('/api/auth/callback/credentials', {
      method: 'POST',
      body: new URLSearchParams({ csrfToken, email: fields.email, password: fields.password, code: fields.code ?? '', json: 'true' }),
    })
    if (answer.status === 429) return { kind: 'wait', retryAfter: Number(answer.headers.get('retry-after') ?? 1) }
    const { url } = await answer.json() as { url?: string }
    const query = new URL(url ?? '/', window.location.origin).searchParams
    if (query.has('csrf')) return { kind: 'expired' }
    const error = query.get('error')
    if (answer.ok && !error) return { kind: 'in' }
    return { kind: REFUSALS[error ?? ''] ?? 'offline' }
  }
  catch {
    return { kind: 'offline' }
  }
}

/** A page of ours to go to after signing in; anything else leads to the desk. */
export function ownPath(value: unknown): string {
  return typeof value === 'string' && /^\/(?![/\\])/.test(value) && !value.includes('\\') ? value : '/desk'
}
