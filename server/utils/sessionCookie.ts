import type { HartrollConfig } from '../config'

/** Name of the session's cookie. It carries the instance, so that two copies on one host do not overwrite each other's. */
export function sessionCookieName(config: HartrollConfig): string {
  return `${config.publicUrl.startsWith('https://') ? '__Host-' : ''}hartroll-${config.instance}.session`
}
