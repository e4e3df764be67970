import { compile, createCoreContext, registerMessageCompiler, registerMessageResolver, resolveValue, translate } from '@intlify/core-base'
import en from '../../../i18n/locales/en/index'

registerMessageCompiler(compile)
registerMessageResolver(resolveValue)

const messages = { en } as const
export type Locale = keyof typeof messages
export const DEFAULT_LOCALE: Locale = 'en'

/** The library types its overloads by the messages themselves, deeper than the compiler follows. */
const say = translate as unknown as (context: unknown, key: string, named: object, options: { plural?: number }) => unknown

const contexts = new Map<Locale, unknown>()

function contextFor(locale: Locale) {
  let context = contexts.get(locale)
  if (!context) {
    context = createCoreContext({ locale, fallbackLocale: DEFAULT_LOCALE, messages: messages as never, missingWarn: false, fallbackWarn: false })
    contexts.set(locale, context)
  }
  return context
}

/** Which of the languages a text can be said in; an unknown one falls back to English. */
export function localeOf(value: string | null | undefined): Locale {
  return value && value in messages ? value as Locale : DEFAULT_LOCALE
}

/**
 * Says a text of `i18n/locales` on the server: notices, problem documents, PDFs.
 *
 * @param key such as `errors.stake`
 * @param params arguments of the text; `count` also chooses a plural form
 * @returns the sentence, or the key itself when there is no such text
 */
export function t(locale: string | null | undefined, key: string, params: Readonly<Record<string, unknown>> = {}): string {
  const said = say(contextFor(localeOf(locale)), key, params, typeof params.count === 'number' ? { plural: params.count } : {})
  return typeof said === 'string' ? said : key
}

/** Whether a text exists, for callers that have a more general one to fall back to. */
export function hasText(key: string): boolean {
  let node: unknown = messages[DEFAULT_LOCALE]
  for (const part of key.split('.')) {
    if (node === null || typeof node !== 'object') return false
    node = (node as Record<string, unknown>)[part]
  }
  return typeof node === 'string'
}
