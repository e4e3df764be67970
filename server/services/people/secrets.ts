import { createCipheriv, createDecipheriv, createHmac, hkdfSync, randomBytes, timingSafeEqual } from 'node:crypto'

/** What a key is for. Keys for two purposes never equal each other although they come from one secret. */
type Purpose = 'cursor' | 'totp' | 'recovery' | 'device' | 'address'

const SEAL = 'v1'
const IV_BYTES = 12

/** A key of 32 bytes for one purpose (HKDF with SHA-256, RFC 5869). */
function keyFor(secret: string, purpose: Purpose): Buffer {
  return Buffer.from(hkdfSync('sha256', secret, 'hartroll', purpose, 32))
}

/**
 * Encrypts a text with AES-256-GCM.
 *
 * @param owner whose it is, such as users.uid: the sealed text opens for the same owner only
 */
export function seal(secret: string, purpose: Purpose, owner: string, text: string): string {
  const iv = randomBytes(IV_BYTES)
  const cipher = createCipheriv('aes-256-gcm', keyFor(secret, purpose), iv)
  cipher.setAAD(Buffer.from(owner))
  const body = Buffer.concat([cipher.update(text, 'utf8'), cipher.final()])
  return [SEAL, ...[iv, body, cipher.getAuthTag()].map(part => part.toString('base64url'))].join('.')
}

/** Opens what `seal` made; throws for another owner, another secret, or a text that was changed. */
export function unseal(secret: string, purpose: Purpose, owner: string, sealed: string): string {
  const [version, iv, body, tag] = sealed.split('.')
  if (version !== SEAL || !iv || body === undefined || !tag) throw new Error('not a sealed text')
  const decipher = createDecipheriv('aes-256-gcm', keyFor(secret, purpose), Buffer.from(iv, 'base64url'), { authTagLength: 16 })
  decipher.setAAD(Buffer.from(owner))
  decipher.setAuthTag(Buffer.from(tag, 'base64url'))
  return Buffer.concat([decipher.update(Buffer.from(body, 'base64url')), decipher.final()]).toString('utf8')
}

/** HMAC-SHA256 in hex, for what is looked up but must not be read out of a copy of the database. */
export function keyedHash(secret: string, purpose: Purpose, text: string): string {
  return createHmac('sha256', keyFor(secret, purpose)).update(text).digest('hex')
}

/** Compares in a time that does not depend on where two texts differ. */
export function sameText(a: string, b: string): boolean {
  const [left, right] = [Buffer.from(a), Buffer.from(b)]
  return left.length === right.length && timingSafeEqual(left, right)
}
