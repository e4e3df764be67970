import { createHash } from 'node:crypto'
import { isHeld } from '../utils/etag'

const INLINE_SCRIPT = /<script(?![^>]*\bsrc=)([^>]*)>([\s\S]*?)<\/script>/g

/** The hashes of the executable inline scripts of a page, so that its policy needs no nonce and the page can be cached. */
function scriptHashes(html: string): string[] {
  const hashes: string[] = []
  for (const [, attributes = '', body = ''] of html.matchAll(INLINE_SCRIPT)) {
    if (/type="(?:application\/(?:ld\+)?json|speculationrules)"/.test(attributes)) continue
    hashes.push(`'sha256-${createHash('sha256').update(body).digest('base64')}'`)
  }
  return [...new Set(hashes)]
}

function policy(html: string): string {
  return [
    `default-src 'self'`,
    `script-src 'self' ${scriptHashes(html).join(' ')}`.trim(),
    `style-src 'self'`,
    // Vue writes style attributes, for example for the length of a bar; a style attribute cannot run anything.
    `style-src-attr 'unsafe-inline'`,
    `img-src 'self' data: blob:`,
    `font-src 'self'`,
    `connect-src 'self'`,
    `object-src 'none'`,
    `base-uri 'none'`,
    `form-action 'self'`,
    `frame-ancestors 'none'`,
  ].join('; ')
}

/** Headers that every answer carries, and the content security policy of every page. */
export default defineNitroPlugin((nitro) => {
  nitro.hooks.hook('request', (event) => {
    setResponseHeaders(event, {
      'x-content-type-options': 'nosniff',
      'referrer-policy': 'strict-origin-when-cross-origin',
      'x-frame-options': 'DENY',
      'cross-origin-opener-policy': 'same-origin',
      'permissions-policy': 'camera=(self), geolocation=(), microphone=(), payment=()',
    })
    if (event.context.registry?.config.publicUrl.startsWith('https://')) {
      setResponseHeader(event, 'strict-transport-security', 'max-age=31536000')
    }
  })
  nitro.hooks.hook('render:response', (response, { event }) => {
    const html = typeof response.body === 'string' ? response.body : ''
    if (!html.startsWith('<!DOCTYPE')) return
    setResponseHeader(event, 'content-security-policy', policy(html))
    if ((response.statusCode ?? getResponseStatus(event)) >= 400) {
      removeResponseHeader(event, 'etag')
      setResponseHeader(event, 'cache-control', 'no-store')
    }
    else if (!getResponseHeader(event, 'cache-control')) setResponseHeader(event, 'cache-control', 'no-store')
    else if (!getResponseHeader(event, 'etag') && String(getResponseHeader(event, 'cache-control')).startsWith('public') && isHeld(event, html)) {
      response.statusCode = 304
      response.body = ''
    }
  })
})
