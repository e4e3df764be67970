import { describe, expect, test } from 'vitest'
import type { H3Event } from 'h3'
import { clientAddress } from '../../../server/utils/clientAddress'

function from(remoteAddress: string, forwarded: string | undefined, trustedProxies: number): string {
  const headers = forwarded === undefined ? {} : { 'x-forwarded-for': forwarded }
  return clientAddress({ node: { req: { headers, socket: { remoteAddress } } }, headers, context: { registry: { config: { trustedProxies } } } } as unknown as H3Event)
}

describe('where a request comes from', () => {
  test('without a proxy of ours what the request says of itself counts for nothing', () => {
    expect(from('203.0.113.9', '198.51.100.1', 0)).toBe('203.0.113.9')
  })

  test('behind proxies only the entries that they wrote are believed', () => {
    expect(from('10.0.0.1', '1.2.3.4, 198.51.100.1', 1)).toBe('198.51.100.1')
    expect(from('10.0.0.1', '1.2.3.4, 198.51.100.1, 10.0.0.2', 2)).toBe('198.51.100.1')
    expect(from('10.0.0.1', undefined, 1)).toBe('10.0.0.1')
  })

  test('a household of IPv6 counts as one; IPv4 in IPv6 is IPv4', () => {
    expect(from('2001:db8:1:2:3:4:5:6', undefined, 0)).toBe('2001:db8:1:2::/64')
    expect(from('2001:db8:1:2::9', undefined, 0)).toBe('2001:db8:1:2::/64')
    expect(from('2001:db8::1', undefined, 0)).toBe('2001:db8:0:0::/64')
    expect(from('::1', undefined, 0)).toBe('0:0:0:0::/64')
    expect(from('::ffff:203.0.113.9', undefined, 0)).toBe('203.0.113.9')
  })
})
