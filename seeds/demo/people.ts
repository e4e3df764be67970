import type { Knex } from 'knex'
import { addDays, type Day } from '#shared/domain/dates'
import { sqlTime } from '../../db/time'
import { insertMany, nextId } from '../bulk'
import { DEMO_ACCOUNTS, MAIL_DOMAIN } from './accounts'
import { address, personName, phone } from './names'
import { type Random, uidAt } from './random'
import { DISTRICTS, type DistrictCode, FIRST_DAY, NEIGHBOURS } from './society'
import type { SocietyIds } from './society-data'

export interface DemoPerson {
  readonly userId: number
  readonly uid: string
  readonly name: string
  readonly address: string
  readonly email: string
  readonly district: DistrictCode
}

export interface DemoMeasurer extends DemoPerson {
  readonly from: Day
  readonly to: Day
}

export interface Staff {
  /** by the part of the address before the @ */
  readonly byMail: Readonly<Record<string, DemoPerson>>
  readonly judges: readonly DemoPerson[]
  readonly reviewers: readonly DemoPerson[]
  readonly registrar: DemoPerson
  readonly measurers: readonly DemoMeasurer[]
}

/** Names of people who measured for the paper lists and never had an account, by the decade in which they began. */
export function formerMeasurers(random: Random): { name: string, from: number, to: number }[] {
  return Array.from({ length: 48 }, () => {
    const from = random.whole(1962, 2006)
    return { name: personName(random), from, to: from + random.whole(6, 26) }
  })
}

const MEASURERS = 29

interface AccountRow {
  id: number
  person: DemoPerson
  createdAt: Date
  shop?: string
}

/** Collects accounts until they are written together. */
export class People {
  private readonly accounts: AccountRow[] = []
  private readonly taken = new Set<string>()
  private next = 1

  constructor(private readonly random: Random, private readonly ids: SocietyIds) {}

  async begin(db: Knex): Promise<void> {
    this.next = await nextId(db, 'users')
  }

  /** A new person with an account that nobody can sign in to, since it has no password. */
  add(district: DistrictCode, createdAt: Date, name = personName(this.random), mail?: string, shop?: string): DemoPerson {
    const local = mail ?? this.freeLocalPart(name)
    const person: DemoPerson = {
      userId: this.next++,
      uid: uidAt(createdAt, this.random),
      name,
      address: address(this.random, DISTRICTS.find(one => one.code === district)!.name),
      email: mail ? `${mail}@${MAIL_DOMAIN}` : `${local}@people.${MAIL_DOMAIN}`,
      district,
    }
    this.accounts.push({ id: person.userId, person, createdAt, ...(shop ? { shop } : {}) })
    return person
  }

  private freeLocalPart(name: string): string {
    const plain = name.normalize('NFKD').toLowerCase().replace(/[^a-z ]/g, '').trim().replace(/ +/g, '.') || 'person'
    for (let number = 1; ; number++) {
      const local = number === 1 ? plain : `${plain}${number}`
      if (!this.taken.has(local)) {
        this.taken.add(local)
        return local
      }
    }
  }

  /** Writes the accounts that were added since the last time, with the role that everybody has. */
  async write(db: Knex, passwordHash: string | null): Promise<void> {
    const rows = this.accounts.splice(0)
    await insertMany(db, 'users', rows.map(({ id, person, createdAt, shop }) => ({
      id,
      uid: person.uid,
      email: person.email,
      email_verified_at: sqlTime(createdAt),
      password_hash: person.email.endsWith(`@${MAIL_DOMAIN}`) ? passwordHash : null,
      name: person.name,
      district_id: this.ids.district[person.district],
      phone: phone(this.random),
      address: person.address,
      shop_name: shop ?? null,
      created_at: sqlTime(createdAt),
    })))
    await insertMany(db, 'user_roles', rows.map(({ id, createdAt }) => ({ user_id: id, role: 'entrant', from_at: sqlTime(createdAt) })))
  }
}

/** The accounts of the start and the measurers of the districts, with roles and accreditations. */
export async function seedStaff(db: Knex, people: People, ids: SocietyIds, passwordHash: string, today: Day, random: Random): Promise<Staff> {
  const opened = new Date(`${FIRST_DAY}T16:00:00Z`)
  const byMail: Record<string, DemoPerson> = {}
  for (const account of DEMO_ACCOUNTS) byMail[account.mail] = people.add(account.district, opened, account.name, account.mail, account.shop)
  const measurers: DemoMeasurer[] = [{ ...byMail.measurer!, from: FIRST_DAY, to: addDays(today, 420) }]
  for (let number = 1; number < MEASURERS; number++) {
    const { code } = DISTRICTS[number % DISTRICTS.length]!
    const from = number < 18 ? FIRST_DAY : addDays(FIRST_DAY, random.whole(200, 2400))
    // Most are good for a year or more; one ends within a month, three have ended.
    const to = number === 5 ? addDays(today, 21) : number % 11 === 0 ? addDays(today, -random.whole(40, 700)) : addDays(today, random.whole(120, 1400))
    measurers.push({ ...people.add(code, opened), from, to })
  }
  await people.write(db, passwordHash)

  const registrar = byMail.registrar!
  const grants = DEMO_ACCOUNTS.flatMap(({ mail, roles }) => roles.map(role => ({ user_id: byMail[mail]!.userId, role })))
  await insertMany(db, 'user_roles', [
    ...grants,
    ...measurers.slice(1).map(measurer => ({ user_id: measurer.userId, role: 'measurer' as const })),
  ].map(({ user_id, role }) => ({
    user_id, role, from_at: sqlTime(opened), granted_by: user_id === registrar.userId ? null : registrar.userId,
  })))
  await seedAccreditations(db, measurers, ids, opened, random)
  return {
    byMail,
    judges: [1, 2, 3, 4, 5, 6, 7, 8].map(number => byMail[`judge${number}`]!),
    reviewers: [byMail.reviewer!, byMail.reviewer2!],
    registrar,
    measurers,
  }
}

async function seedAccreditations(db: Knex, measurers: readonly DemoMeasurer[], ids: SocietyIds, at: Date, random: Random): Promise<void> {
  const first = await nextId(db, 'accreditations')
  await insertMany(db, 'accreditations', measurers.map((measurer, place) => ({
    id: first + place,
    uid: uidAt(at, random),
    user_id: measurer.userId,
    number: `M-${String(place + 101)}`,
    valid_from: measurer.from,
    valid_to: measurer.to,
    suspended_at: place === 17 ? sqlTime(new Date(Date.parse(`${measurer.to}T16:00:00Z`) - 90 * 86_400_000)) : null,
    created_at: sqlTime(at),
  })))
  const species = [...new Set([...ids.category.values()].map(category => category.speciesId))]
  await insertMany(db, 'accreditation_species', measurers.flatMap((_, place) =>
    species.map(species_id => ({ accreditation_id: first + place, species_id }))))
}

/** A measurer who may measure on the day, from the district or next to it where there is one. */
export function measurerFor(staff: Staff, district: DistrictCode, day: Day, random: Random): DemoMeasurer {
  const near = new Set<DistrictCode>([district, ...NEIGHBOURS.flatMap(([a, b]) => (a === district ? [b] : b === district ? [a] : []))])
  const fit = staff.measurers.filter((measurer, place) => measurer.from <= day && day <= measurer.to && place !== 17)
  const close = fit.filter(measurer => near.has(measurer.district))
  return random.pick(close.length > 0 ? close : fit)
}
