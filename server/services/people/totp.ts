import { Secret, TOTP } from 'otpauth'

const PERIOD_S = 30
/** One step to either side, for clocks that run apart (RFC 6238, section 5.2). */
const WINDOW = 1
const SECRET_BYTES = 20

function totpOf(secret: string, label = '', issuer = 'Hartroll'): TOTP {
  return new TOTP({ issuer, label, algorithm: 'SHA1', digits: 6, period: PERIOD_S, secret: Secret.fromBase32(secret) })
}

/** A new secret in base 32, of the length that RFC 4226, section 4, recommends. */
export function newTotpSecret(): string {
  return new Secret({ size: SECRET_BYTES }).base32
}

/** The address that an authenticator reads from the QR code. */
export function totpUri(secret: string, label: string, issuer: string): string {
  return totpOf(secret, label, issuer || 'Hartroll').toString()
}

/** The code of a moment, for tests and for nothing else on the way in. */
export function totpCode(secret: string, at: Date): string {
  return totpOf(secret).generate({ timestamp: at.getTime() })
}

/**
 * The time step a code belongs to, or null when it fits none of those near `at`. The caller keeps the step and takes
 * no code of the same or an earlier one (RFC 6238, section 5.2: a code is good for one use).
 */
export function totpStep(secret: string, code: string, at: Date): number | null {
  const delta = totpOf(secret).validate({ token: code, timestamp: at.getTime(), window: WINDOW })
  return delta === null ? null : Math.floor(at.getTime() / 1000 / PERIOD_S) + delta
}
