import { randomBytes } from 'node:crypto'
import type { Knex } from 'knex'
import { encode } from 'next-auth/jwt'
import { sqlTime } from '../../db/time'
import type { Role } from '../../shared/domain/access/roles'
import { uuidv7 } from '../../shared/uuid'

export interface Person {
  readonly userId: number
  readonly uid: string
  readonly name: string
  readonly email: string
  readonly roles: readonly Role[]
}

export interface PersonWishes {
  readonly name?: string
  readonly email?: string
  /** as kept in `users.password_hash`; without one the person can sign in by `signInAs` alone */
  readonly passwordHash?: string
}

let made = 0

/** An account with a confirmed address that holds the roles from yesterday on. */
export async function makePerson(db: Knex, now: Date, roles: readonly Role[], wishes: PersonWishes = {}): Promise<Person> {
  const number = ++made
  const name = wishes.name ?? `Person ${number} ${roles.join(' ') || 'entrant'}`
  const email = wishes.email ?? `person${number}.${randomBytes(3).toString('hex')}@ochrebasin.example`
  const uid = uuidv7(now.getTime(), randomBytes(16))
  const yesterday = sqlTime(new Date(now.getTime() - 86_400_000))
  const [userId] = await db('users').insert({
    uid, email, name, email_verified_at: yesterday, created_at: yesterday, password_hash: wishes.passwordHash ?? null,
  }) as [number]
  const given = roles.filter(role => role !== 'entrant')
  if (given.length > 0) await db('user_roles').insert(given.map(role => ({ user_id: userId, role, from_at: yesterday })))
  return { userId, uid, name, email, roles }
}

/**
 * A session that has passed the second factor, as the cookie's value. What signing in does is tested with the route;
 * everything else begins here, since hashing a password for every test would cost more than the test.
 */
export async function makeSession(db: Knex, now: Date, userId: number, secret: string): Promise<string> {
  const sid = uuidv7(now.getTime(), randomBytes(16))
  await db('user_sessions').insert({
    uid: sid,
    user_id: userId,
    created_at: sqlTime(now),
    last_seen_at: sqlTime(now),
    expires_at: sqlTime(new Date(now.getTime() + 400 * 86_400_000)),
    second_factor_at: sqlTime(now),
    reauth_at: sqlTime(now),
  })
  return encode({ token: { sid }, secret, maxAge: 400 * 86_400 })
}
