import { describe, expect, test } from 'vitest'
import { keyedHash, sameText, seal, unseal } from '../../../server/services/people/secrets'
import { hashPassword, passwordFits } from '../../../server/services/people/passwords'
import { delayAfter } from '../../../server/services/people/limits'
import { checkNewPassword } from '../../../server/services/people/passwordRules'
import { emailField, nameField } from '../../../shared/schemas/people'

const SECRET = 'a secret of the tests alone, long enough to be taken'

describe('a sealed text', () => {
  const sealed = seal(SECRET, 'totp', 'owner', 'JBSWY3DPEHPK3PXP')

  test('opens for its owner', () => {
    expect(unseal(SECRET, 'totp', 'owner', sealed)).toBe('JBSWY3DPEHPK3PXP')
  })

  test('does not show what is in it, nor that two are alike', () => {
    expect(sealed).not.toContain('JBSWY')
    expect(seal(SECRET, 'totp', 'owner', 'JBSWY3DPEHPK3PXP')).not.toBe(sealed)
  })

  test('stays shut for another owner, purpose or secret, and when it was changed', () => {
    const parts = sealed.split('.')
    const body = Buffer.from(parts[2]!, 'base64url')
    body[0]! ^= 1
    expect(() => unseal(SECRET, 'totp', 'other', sealed)).toThrow()
    expect(() => unseal(SECRET, 'recovery', 'owner', sealed)).toThrow()
    expect(() => unseal(`${SECRET}!`, 'totp', 'owner', sealed)).toThrow()
    expect(() => unseal(SECRET, 'totp', 'owner', [parts[0], parts[1], body.toString('base64url'), parts[3]].join('.'))).toThrow()
    expect(() => unseal(SECRET, 'totp', 'owner', 'v0.a.b.c')).toThrow()
  })

  test('keys of two purposes differ', () => {
    expect(keyedHash(SECRET, 'device', 'x')).not.toBe(keyedHash(SECRET, 'address', 'x'))
    expect(sameText('abc', 'abc')).toBe(true)
    expect(sameText('abc', 'abd')).toBe(false)
    expect(sameText('abc', 'abcd')).toBe(false)
  })
})

describe('a password', () => {
  test('is kept as argon2id with 19 MiB and two passes (OWASP password storage cheat sheet)', async () => {
    expect(await hashPassword('two geese and a lantern')).toMatch(/^\$argon2id\$v=19\$m=19456,t=2,p=1\$/)
  })

  test('fits however its letters are composed', async () => {
    const hash = await hashPassword('caf\u00e9 au lait')
    expect(await passwordFits(hash, 'cafe\u0301 au lait')).toBe(true)
    expect(await passwordFits(hash, 'cafe au lait')).toBe(false)
  })

  test('never fits where there is none', async () => {
    expect(await passwordFits(null, '')).toBe(false)
    expect(await passwordFits(null, 'hartroll-nobody')).toBe(false)
  })

  test('that is tried first is refused', () => {
    const person = { email: 'wren.tarnley@ochrebasin.example', name: 'Wren Tarnley' }
    for (const bad of ['1234567890', 'aaaaaaaaaaaa', 'Password1234', 'WREN TARNLEY', 'wren.tarnley', 'Wren.Tarnley@ochrebasin.example']) {
      expect(() => checkNewPassword(bad, person), bad).toThrow()
    }
    expect(() => checkNewPassword('two geese and a lantern', person)).not.toThrow()
  })
})

describe('the delay after tries', () => {
  const limit = { key: 'k', free: 3, window: 600, longest: 60 }

  test('is none at first, then doubles up to the longest', () => {
    expect([0, 1, 2, 3, 4, 5, 6, 8, 9, 50].map(tries => delayAfter(limit, tries))).toEqual([0, 0, 0, 1, 2, 4, 8, 32, 60, 60])
  })
})

describe('an e-mail address', () => {
  test.each(['wren@ochrebasin.example', 'vićtim@ochrebasin.example', 'a+b@x.example', 'jörg@bücher.example'])('%s is taken', (email) => {
    expect(emailField.parse(email)).toBe(email)
  })

  test('is kept trimmed, in small letters, with composed accents', () => {
    expect(emailField.parse(' Vic\u0301tim@OchreBasin.example ')).toBe('vi\u0107tim@ochrebasin.example')
  })

  test.each(['', 'wren', '@x.example', 'wren@', 'wren@x', 'a b@x.example', 'a@b@x.example', 'a\r\nBcc: c@x.example', '<a@x.example>', `${'a'.repeat(65)}@x.example`])('%j is refused', (email) => {
    expect(emailField.safeParse(email).success).toBe(false)
  })
})

test('a name has its odd blanks and control letters taken out', () => {
  expect(nameField.parse('  Wren \u202e\t Tarnley\n')).toBe('Wren Tarnley')
  expect(nameField.safeParse(' \u200b ').success).toBe(false)
})
