import { defineRoute } from '../utils/defineRoute'

/** Who is signed in. Answers a visitor too, so that a public page can ask without an error. */
export default defineRoute({
  access: 'public',
  handler: async ({ actor, registry }) => {
    const { societyName, timeZone, currency } = await registry.settings()
    const society = { name: societyName, timeZone, currency }
    return actor
      ? { signedIn: true, id: actor.uid, name: actor.name, email: actor.email, roles: actor.roles, secondFactor: actor.secondFactor, withheld: actor.withheld ?? [], registry: society }
      : { signedIn: false, id: null, name: '', email: '', roles: [], secondFactor: false, withheld: [], registry: society }
  },
})
