import { profileSchema } from '../../../shared/schemas/people'
import { defineRoute } from '../../utils/defineRoute'
import { changeProfile, readAccount } from '../../services/people/account'

export default defineRoute({
  access: 'signedIn',
  body: profileSchema,
  async handler({ registry, actor, body }) {
    await changeProfile(registry, actor, body)
    return readAccount(registry, actor)
  },
})
