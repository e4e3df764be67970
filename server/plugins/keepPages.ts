import { pagesOf } from '../utils/pageCache'

const KEPT_HEADERS = ['content-type', 'content-security-policy', 'cache-control', 'etag', 'vary'] as const

/** Keeps the public pages that the middleware gave a key, once they were made and nothing was wrong with them. */
export default defineNitroPlugin((nitro) => {
  nitro.hooks.hook('render:response', (response, { event }) => {
    const { pageKey, registry } = event.context
    if (!pageKey || !registry || (response.statusCode ?? getResponseStatus(event)) !== 200 || typeof response.body !== 'string') return
    const headers: Record<string, string> = {}
    for (const name of KEPT_HEADERS) {
      const value = response.headers?.[name] ?? getResponseHeader(event, name)
      if (value !== undefined) headers[name] = String(value)
    }
    pagesOf(registry).set(pageKey, { body: response.body, headers })
  })
})
