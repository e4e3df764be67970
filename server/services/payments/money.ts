import { numberFormat } from '../../../shared/intl'

/**
 * An amount of money as it is written in a language.
 *
 * @param minor integer minor units, e.g. cents
 * @param currency ISO 4217; its own number of digits after the point is used
 */
export function formatMoney(locale: string, minor: number, currency: string): string {
  const format = numberFormat(locale, { style: 'currency', currency })
  return format.format(minor / 10 ** (format.resolvedOptions().maximumFractionDigits ?? 2))
}
