import type { Role } from '#shared/domain/access/roles'

/** Who is signed in, as `/api/me` says. Asked by pages of the desk; a public page asks only afterwards, in the browser. */
export interface Me {
  readonly signedIn: boolean
  readonly id: string | null
  readonly name: string
  readonly email: string
  readonly roles: readonly Role[]
  readonly secondFactor: boolean
  /** Roles that hold once this session has passed a second factor. */
  readonly withheld: readonly Role[]
  /** The society whose registry this is. */
  readonly registry: { readonly name: string, readonly timeZone: string, readonly currency: string }
}

const NOBODY: Me = { signedIn: false, id: null, name: '', email: '', roles: [], secondFactor: false, withheld: [], registry: { name: '', timeZone: 'UTC', currency: 'USD' } }

export function useMe() {
  const me = useState<Me | null>('me', () => null)
  const request = useRequestFetch()
  async function load(again = false): Promise<Me> {
    if (!me.value || again) me.value = await request<Me>('/api/me').catch(() => NOBODY)
    return me.value
  }
  return { me, load, forget: () => { me.value = null } }
}
