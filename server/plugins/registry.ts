import { registryFromEnvironment } from '../composition'
import { testClock } from '../utils/testClock'

/**
 * Gives every request the registry of its host: one installation serves one registry today, and nothing but this
 * plugin would have to change for several.
 */
export default defineNitroPlugin((nitro) => {
  if (import.meta.prerender) return
  const registry = registryFromEnvironment({ clock: process.env.HARTROLL_TESTING === '1' ? testClock() : undefined })
  nitro.hooks.hook('request', (event) => {
    event.context.registry = registry
  })
  // Routes tell and log their own failures; what remains are pages that could not be rendered.
  nitro.hooks.hook('error', (error, { event }) => {
    const status = (error as { statusCode?: number }).statusCode ?? 500
    if (status >= 500) registry.log.error({ err: error.cause ?? error, path: event?.path, requestId: event?.context.requestId }, 'a page failed')
  })
  nitro.hooks.hook('close', () => registry.close())
})
