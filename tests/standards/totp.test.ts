import { TOTP, Secret } from 'otpauth'
import { describe, expect, test } from 'vitest'
import { totpCode, totpStep } from '../../server/services/people/totp'

/*
 * RFC 6238, "TOTP: Time-Based One-Time Password Algorithm", appendix B, the rows of SHA-1. The vectors have eight
 * digits; a code of six digits is their last six, since both are the same number modulo a power of ten (RFC 4226, 5.3).
 * https://www.rfc-editor.org/rfc/rfc6238
 */
const SECRET = Secret.fromLatin1('12345678901234567890').base32
const VECTORS = [
  [59, '94287082'],
  [1_111_111_109, '07081804'],
  [1_111_111_111, '14050471'],
  [1_234_567_890, '89005924'],
  [2_000_000_000, '69279037'],
  [20_000_000_000, '65353130'],
] as const

describe('time-based codes', () => {
  test.each(VECTORS)('at %i seconds the code is that of the standard', (seconds, code) => {
    expect(new TOTP({ secret: Secret.fromBase32(SECRET), algorithm: 'SHA1', digits: 8, period: 30 }).generate({ timestamp: seconds * 1000 })).toBe(code)
    expect(totpCode(SECRET, new Date(seconds * 1000))).toBe(code.slice(-6))
  })

  test.each(VECTORS)('the code of %i seconds belongs to its step of thirty seconds', (seconds, code) => {
    expect(totpStep(SECRET, code.slice(-6), new Date(seconds * 1000))).toBe(Math.floor(seconds / 30))
  })

  test('one step to either side is taken, two are not', () => {
    const at = 1_234_567_890
    const code = '005924'
    const step = Math.floor(at / 30)
    for (const off of [-1, 0, 1]) expect(totpStep(SECRET, code, new Date((at + off * 30) * 1000))).toBe(step)
    for (const off of [-2, 2]) expect(totpStep(SECRET, code, new Date((at + off * 30) * 1000))).toBeNull()
  })
})
