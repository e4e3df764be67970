import { fold } from '../../../shared/domain/fold'
import { DomainError } from '../../../shared/errors'

/** Long enough to pass the length, and among the first that are tried. From memory of common lists; no source. */
const COMMON = new Set(['1234567890', '0123456789', '12345678910', '123456789012', 'qwertyuiop', 'password12', 'password123', 'password1234', 'passwordpassword', 'letmeinletmein', 'iloveyou12', 'iloveyou123', 'abcdefghij', 'qwerty123456', 'administrator', 'changeme123', 'welcome123', 'correcthorsebatterystaple', 'correct horse battery staple'])

/**
 * Refuses a password that a guesser tries first: a common one, one letter over and over, or the person's own address
 * or name (NIST SP 800-63B, 3.1.1.2).
 *
 * @throws DomainError `invalid_input` with the field `path`
 */
export function checkNewPassword(password: string, person: { readonly email: string, readonly name: string }, path = 'password'): void {
  const plain = fold(password).trim()
  const refuse = (code: string) => new DomainError('invalid_input', { fields: [{ path, code }] })
  if (COMMON.has(plain) || /^(.)\1*$/u.test(plain)) throw refuse('password_common')
  const own = [person.email, person.email.split('@')[0]!, person.name].map(text => fold(text).trim())
  if (own.includes(plain)) throw refuse('password_like_email')
}
