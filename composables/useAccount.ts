import { dateFormat } from '#shared/intl'
import type { Role } from '#shared/domain/access/roles'

/** The own account, as `/api/account` says it. */
export interface AccountAnswer {
  readonly email: string
  readonly name: string
  readonly phone: string | null
  readonly address: string | null
  readonly shopName: string | null
  readonly district: string | null
  readonly printName: 'full' | 'initials' | 'withheld'
  readonly createdAt: string
  readonly roles: readonly Role[]
  readonly withheld: readonly Role[]
  readonly secondFactor: boolean
  readonly recoveryCodes: number
  readonly districts: readonly { readonly code: string, readonly name: string }[]
}

/** Dates written out in the reader's language; days are days everywhere, instants stand in the registry's zone. */
export function useWrittenDates() {
  const { locale } = useI18n()
  const { me } = useMe()
  return {
    day: (iso: string) => dateFormat(locale.value, { dateStyle: 'long', timeZone: 'UTC' }).format(new Date(`${iso}T00:00:00Z`)),
    instant: (iso: string) => dateFormat(locale.value, { dateStyle: 'long', timeStyle: 'short', timeZone: me.value?.registry.timeZone || 'UTC' }).format(new Date(iso)),
  }
}
