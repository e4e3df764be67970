import { resetSchema } from '../../../shared/schemas/people'
import { defineRoute } from '../../utils/defineRoute'
import { resetPassword } from '../../services/people/reset'
import { cookieName, cookieOptions } from '../../utils/sessionCookie'

/** Sets a new password by the link that was sent. */
export default defineRoute({
  access: 'public',
  body: resetSchema,
  async handler({ event, registry, body }) {
    const { email, device } = await resetPassword(registry, body.token, body.password)
    setCookie(event, cookieName(registry.config, 'device'), device, { ...cookieOptions(registry.config), maxAge: 180 * 86_400 })
    return { email }
  },
})
