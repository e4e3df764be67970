import type { ZodType, output } from 'zod'
import { ApiError } from './useApi'

/**
 * A form over a zod schema: keeps what was typed, checks before sending, puts every refusal beside its field whether
 * the browser or the server found it, and never sends twice at once.
 */
export function useForm<S extends ZodType, V extends Record<string, unknown>>(options: {
  readonly initial: V
  readonly schema?: S
  readonly submit: (values: S extends ZodType ? output<S> : V) => Promise<void>
}) {
  const { t, te } = useI18n()
  const values = reactive({ ...options.initial }) as V
  const errors = ref<Record<string, string>>({})
  const message = ref<string | null>(null)
  const busy = ref(false)
  const done = ref(false)

  function sayIssue(issue: { code: string, path: PropertyKey[], params?: { code?: string, params?: Record<string, unknown> }, minimum?: unknown, maximum?: unknown, origin?: string, format?: string, input?: unknown }): string {
    const own = issue.params?.code
    if (own && te(`errors.fields.${own}`)) return t(`errors.fields.${own}`, issue.params?.params ?? {})
    if (issue.code === 'too_small') return issue.origin === 'string' && issue.minimum === 1 ? t('errors.fields.required') : t(issue.origin === 'string' ? 'errors.fields.too_short' : 'errors.fields.too_small', { minimum: String(issue.minimum) })
    if (issue.code === 'too_big') return t(issue.origin === 'string' ? 'errors.fields.too_long' : 'errors.fields.too_big', { maximum: String(issue.maximum) })
    if (issue.code === 'invalid_format' && issue.format === 'email') return t('errors.fields.email')
    if (issue.code === 'invalid_type') return t('errors.fields.required')
    return t('errors.fields.invalid')
  }

  async function submit(): Promise<boolean> {
    if (busy.value) return false
    errors.value = {}
    message.value = null
    let sent: unknown = { ...values }
    if (options.schema) {
      const checked = options.schema.safeParse(sent)
      if (!checked.success) {
        const found: Record<string, string> = {}
        for (const issue of checked.error.issues) found[issue.path.join('.')] ??= sayIssue(issue as never)
        errors.value = found
        return false
      }
      sent = checked.data
    }
    busy.value = true
    try {
      await options.submit(sent as never)
      done.value = true
      return true
    }
    catch (error) {
      if (!(error instanceof ApiError)) throw error
      message.value = error.problem.detail
      errors.value = Object.fromEntries(error.problem.errors.map(field => [field.path, field.message]))
      return false
    }
    finally {
      busy.value = false
    }
  }

  return { values, errors, message, busy, done, submit }
}
