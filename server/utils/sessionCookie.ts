import type { HartrollConfig } from '../config'

/** Cookies of signing in. Their names carry the instance, so that two copies on one host do not overwrite each other's. */
export type CookieUse = 'session' | 'csrf' | 'callback' | 'device'

export const isSecure = (config: HartrollConfig): boolean => config.publicUrl.startsWith('https://')

export function cookieName(config: HartrollConfig, use: CookieUse): string {
  return `${isSecure(config) ? '__Host-' : ''}hartroll-${config.instance}.${use}`
}

export const sessionCookieName = (config: HartrollConfig): string => cookieName(config, 'session')

/** Never read by scripts, never sent along from a foreign site's form. */
export function cookieOptions(config: HartrollConfig) {
  return { httpOnly: true, sameSite: 'lax', path: '/', secure: isSecure(config) } as const
}
