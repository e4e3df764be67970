import type { Role } from '#shared/domain/access/roles'

export type PersonState = 'active' | 'invited' | 'closed'

export interface PersonLine {
  readonly id: string
  readonly name: string
  readonly email: string
  readonly district: string | null
  readonly state: PersonState
  readonly secondFactor: boolean
  readonly createdAt: string
  readonly roles: readonly Role[]
}

export interface Proposal {
  readonly id: string
  readonly role: Role
  readonly at: string
  readonly person: { readonly id: string, readonly name: string }
  readonly by: { readonly id: string, readonly name: string }
  readonly own: boolean
  readonly aboutYou: boolean
}

export interface PeopleAnswer {
  readonly items: readonly PersonLine[]
  readonly nextCursor: string | null
  readonly proposals: readonly Proposal[]
  readonly secondNeeded: boolean
}

export interface Accreditation {
  readonly id: string
  readonly number: string
  readonly validFrom: string
  readonly validTo: string
  readonly suspendedAt: string | null
  readonly species: readonly string[]
}

export interface PersonAnswer extends PersonLine {
  readonly lastSeenAt: string | null
  readonly own: boolean
  readonly secondNeeded: boolean
  readonly species: readonly string[]
  readonly history: readonly { readonly role: Role, readonly from: string, readonly to: string | null, readonly givenBy: string | null, readonly endedBy: string | null }[]
  readonly proposals: readonly Omit<Proposal, 'own' | 'aboutYou'>[]
  readonly accreditations: readonly Accreditation[]
}
