import { peopleQuery } from '../../../shared/schemas/people'
import { defineRoute } from '../../utils/defineRoute'
import { findPeople } from '../../services/people/list'

/** Accounts by name, and the roles that wait for a second registrar. */
export default defineRoute({
  access: { roles: ['registrar'] },
  query: peopleQuery,
  handler: ({ registry, actor, query }) => findPeople(registry, actor, query),
})
