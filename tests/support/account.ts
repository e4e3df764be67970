import supertest from 'supertest'
import { hashPassword } from '../../server/services/people/passwords'
import type { Role } from '../../shared/domain/access/roles'
import { mintLink, type TokenKind } from '../../server/services/notices/mint'
import type { App, Client } from './app'
import { makePerson, type Person, type PersonWishes } from './people'

/** A password that the tests' people have; hashed once, since hashing is meant to be slow. */
export const PASSWORD = 'two geese and a lantern'
let hashed: Promise<string> | undefined
export const passwordHash = () => hashed ??= hashPassword(PASSWORD)

export async function personWithPassword(app: App, roles: readonly Role[] = [], wishes: PersonWishes = {}): Promise<Person> {
  return makePerson(app.db, app.clock.now(), roles, { passwordHash: await passwordHash(), ...wishes })
}

/** A person with a password, and a session. */
export async function memberAs(app: App, roles: readonly Role[] = [], wishes: PersonWishes = {}): Promise<Client & { readonly person: Person }> {
  return app.signIn(await personWithPassword(app, roles, wishes))
}

/** A browser's jar of cookies, for signing in by the routes themselves. */
export function browserOf(app: App) {
  const agent = supertest.agent(app.url)
  return {
    agent,
    async signIn(email: string, password: string, code = '') {
      const { csrfToken } = (await agent.get('/api/auth/csrf')).body as { csrfToken: string }
      return agent.post('/api/auth/callback/credentials').type('form').ok(() => true).send({ csrfToken, email, password, code, json: 'true' })
    },
    async signOut() {
      const { csrfToken } = (await agent.get('/api/auth/csrf')).body as { csrfToken: string }
      return agent.post('/api/auth/signout').type('form').ok(() => true).send({ csrfToken, json: 'true' })
    },
    me: async () => (await agent.get('/api/me')).body as { signedIn: boolean, email: string, roles: Role[] },
  }
}

/** The reason in the address that the sign-in package answers with. */
export const refusalOf = (answer: { body: { url?: string } }) => new URL(answer.body.url ?? 'http://x/').searchParams.get('error')

/** Notices in the outbox to an address, oldest first. */
export async function noticesTo(app: App, email: string): Promise<string[]> {
  return (await app.db('notices').where({ to_email: email }).orderBy('id').select('template')).map(row => row.template)
}

/** The token of a link as the worker would mint it while it sends. */
export async function linkFor(app: App, kind: TokenKind, person: { userId: number, email: string }): Promise<string> {
  const path = await mintLink(app.db, app.clock.now(), kind, { userId: person.userId, email: person.email })
  return new URL(path, app.url).searchParams.get('token')!
}
