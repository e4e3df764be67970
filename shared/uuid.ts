/**
 * UUID version 7 (RFC 9562, section 5.7): 48 bits of Unix milliseconds, then random bits.
 *
 * @param now milliseconds since the Unix epoch, from the caller's clock
 * @param random sixteen random bytes; the first six are replaced by the time
 * @returns the 36 character lower-case text form
 */
export function uuidv7(now: number, random: Uint8Array): string {
  const bytes = Uint8Array.from(random.subarray(0, 16))
  if (bytes.length !== 16) throw new RangeError('uuidv7 needs sixteen random bytes')
  for (let i = 5, rest = Math.floor(now); i >= 0; i--, rest = Math.floor(rest / 256)) bytes[i] = rest % 256
  bytes[6] = 0x70 | (bytes[6]! & 0x0f)
  bytes[8] = 0x80 | (bytes[8]! & 0x3f)
  const hex = Array.from(bytes, byte => byte.toString(16).padStart(2, '0')).join('')
  return `${hex.slice(0, 8)}-${hex.slice(8, 12)}-${hex.slice(12, 16)}-${hex.slice(16, 20)}-${hex.slice(20)}`
}

export const UUID_PATTERN = /^[0-9a-f]{8}-[0-9a-f]{4}-[1-8][0-9a-f]{3}-[89ab][0-9a-f]{3}-[0-9a-f]{12}$/
