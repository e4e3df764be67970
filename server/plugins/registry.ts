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
  nitro.hooks.hook('close', () => registry.close())
})
