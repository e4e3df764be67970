/** What an account may be. Everyone who signs up is an `entrant`; the others are given by a registrar. */
export const ROLES = ['entrant', 'shop', 'measurer', 'reviewer', 'judge', 'registrar'] as const
export type Role = (typeof ROLES)[number]

/** Roles whose holders decide about other people's animals. They need a second factor and a second registrar's word. */
export const STAFF_ROLES = ['measurer', 'reviewer', 'judge', 'registrar'] as const satisfies readonly Role[]
export type StaffRole = (typeof STAFF_ROLES)[number]

/** The signed-in person as read from session, account and roles in one query a request. */
export interface ActiveActor {
  /** users.id, inside only */
  readonly userId: number
  /** users.uid, the id that others see */
  readonly uid: string
  readonly name: string
  readonly email: string
  /** the roles held at this request */
  readonly roles: readonly Role[]
  readonly sessionId: number
  /** whether this session has passed the second factor */
  readonly secondFactor: boolean
  /** roles that are held but do not count in this session, since they ask for a second factor that it has not passed */
  readonly withheld?: readonly StaffRole[]
}

/** Who asks: a signed-in person, or `null` for a visitor. */
export type Actor = ActiveActor | null

export function isRole(value: unknown): value is Role {
  return typeof value === 'string' && (ROLES as readonly string[]).includes(value)
}

export function isStaffRole(role: Role): role is StaffRole {
  return (STAFF_ROLES as readonly Role[]).includes(role)
}

/** True when a signed-in person holds the role now. A visitor holds none. */
export function hasRole(actor: Actor, role: Role): boolean {
  return actor !== null && actor.roles.includes(role)
}

/** True when a signed-in person holds at least one of the roles now. */
export function hasAnyRole(actor: Actor, roles: readonly Role[]): boolean {
  return actor !== null && roles.some(role => actor.roles.includes(role))
}
