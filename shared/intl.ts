/**
 * Formatters of ECMA-402, each made once: making one costs a hundred times what using it does, and a list of fifty
 * lines uses a few hundred. They hold no state, so that sharing them mixes nobody's.
 */
const made = new Map<string, Intl.NumberFormat | Intl.DateTimeFormat | Intl.ListFormat>()

function once<F extends Intl.NumberFormat | Intl.DateTimeFormat | Intl.ListFormat>(kind: string, locale: string, options: object, make: () => F): F {
  const key = `${kind} ${locale} ${JSON.stringify(options)}`
  let found = made.get(key) as F | undefined
  if (!found) made.set(key, found = make())
  return found
}

export const numberFormat = (locale: string, options: Intl.NumberFormatOptions = {}) => once('number', locale, options, () => new Intl.NumberFormat(locale, options))
export const dateFormat = (locale: string, options: Intl.DateTimeFormatOptions) => once('date', locale, options, () => new Intl.DateTimeFormat(locale, options))
/** Words joined as in "a, b and c". */
export const listFormat = (locale: string) => once('list', locale, {}, () => new Intl.ListFormat(locale, { type: 'conjunction' }))
