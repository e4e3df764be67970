import type { Role } from '#shared/domain/access/roles'
import type { DistrictCode } from './society'

export const DEMO_PASSWORD = 'ochre-basin-demo'
export const MAIL_DOMAIN = 'ochrebasin.example'

interface DemoAccount {
  readonly mail: string
  readonly name: string
  readonly roles: readonly Role[]
  readonly district: DistrictCode
  readonly shop?: string
}

/** The accounts that the start prints. Everybody is an entrant too. */
export const DEMO_ACCOUNTS: readonly DemoAccount[] = [
  { mail: 'entrant', name: 'Corwen Larkstead', roles: [], district: 'juniper-fork' },
  { mail: 'shop', name: 'Tamsin Oakyard', roles: ['shop'], district: 'brackwater', shop: 'Oakyard Taxidermy' },
  { mail: 'measurer', name: 'Halvar Quarrybeck', roles: ['measurer'], district: 'juniper-fork' },
  { mail: 'reviewer', name: 'Linnet Sedgeworth', roles: ['reviewer'], district: 'varrowmere' },
  { mail: 'reviewer2', name: 'Osric Moorfield', roles: ['reviewer'], district: 'hollowmarch' },
  { mail: 'judge1', name: 'Una Irongate', roles: ['judge'], district: 'coldiron' },
  { mail: 'judge2', name: 'Stellan Birchwick', roles: ['judge'], district: 'elder-reach' },
  { mail: 'judge3', name: 'Fenna Rushland', roles: ['judge'], district: 'quillan-flats' },
  { mail: 'judge4', name: 'Garrick Tarnhurst', roles: ['judge'], district: 'skarncliff' },
  { mail: 'judge5', name: 'Orla Whinridge', roles: ['judge'], district: 'alderfall' },
  { mail: 'judge6', name: 'Davin Greylock', roles: ['judge'], district: 'larkmoor' },
  { mail: 'judge7', name: 'Mirel Heathmore', roles: ['judge'], district: 'thornwether' },
  { mail: 'judge8', name: 'Tavish Flintacre', roles: ['judge'], district: 'otterstone' },
  { mail: 'registrar', name: 'Hester Woldgate', roles: ['registrar'], district: 'varrowmere' },
]
