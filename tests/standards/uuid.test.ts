import { describe, expect, it } from 'vitest'
import { uuidv7, UUID_PATTERN } from '#shared/uuid'

// Source: RFC 9562, appendix A.6 "Example of a UUIDv7 Value".
const EXAMPLE = '017f22e2-79b0-7cc3-98c4-dc0c0c07398f'
const EXAMPLE_TIME = Date.parse('2022-02-22T14:22:22.000-05:00')

const bytesOf = (uuid: string) => Uint8Array.from(uuid.replaceAll('-', '').match(/../g)!, pair => Number.parseInt(pair, 16))

describe('UUID version 7 (RFC 9562)', () => {
  it('gives the published example from its time and random bits', () => {
    expect(uuidv7(EXAMPLE_TIME, bytesOf(EXAMPLE))).toBe(EXAMPLE)
  })

  it('sets version and variant whatever the random bits are', () => {
    for (const byte of [0x00, 0xff]) {
      const made = uuidv7(EXAMPLE_TIME, new Uint8Array(16).fill(byte))
      expect(made).toMatch(UUID_PATTERN)
      expect(made[14]).toBe('7')
      expect(['8', '9', 'a', 'b']).toContain(made[19])
    }
  })

  it('sorts by time', () => {
    const random = new Uint8Array(16).fill(0x5a)
    const made = [0, 1, 255, 256, 2 ** 32, EXAMPLE_TIME, 2 ** 48 - 1].map(time => uuidv7(time, random))
    expect([...made].sort()).toEqual(made)
  })

  it('refuses fewer than sixteen random bytes', () => {
    expect(() => uuidv7(0, new Uint8Array(15))).toThrow(RangeError)
  })
})
