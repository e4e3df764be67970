import { randomBytes } from 'node:crypto'
import type { Registry } from '../../composition'
import { keyedHash, sameText } from './secrets'

/*
 * A browser in which an account has signed in before is known by a cookie. Tries from it are counted apart from those
 * of the rest of the world, so that a stranger who guesses cannot make the account's own person wait.
 */

const sign = (registry: Registry, userUid: string, nonce: string) => keyedHash(registry.config.secret, 'device', `${userUid}:${nonce}`)

/** A new mark of a browser for one account. */
export function newDevice(registry: Registry, userUid: string): string {
  const nonce = randomBytes(16).toString('base64url')
  return `${nonce}.${sign(registry, userUid, nonce)}`
}

/** The part of the mark that tells browsers apart, or null when the mark was not made for this account. */
export function deviceOf(registry: Registry, userUid: string, mark: string | null | undefined): string | null {
  const [nonce, signature] = (mark ?? '').split('.')
  if (!nonce || !signature || nonce.length > 64) return null
  return sameText(signature, sign(registry, userUid, nonce)) ? nonce : null
}
