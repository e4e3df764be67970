import { isIPv6 } from 'node:net'
import { getRequestHeader, type H3Event } from 'h3'

/** A household has a whole /64 of IPv6 addresses; they count as one. */
function counted(address: string): string {
  const plain = address.replace(/^::ffff:(?=\d+\.)/i, '').replace(/%.*$/, '')
  if (!isIPv6(plain)) return plain
  const [head = '', tail] = plain.toLowerCase().split('::')
  const left = head ? head.split(':') : []
  const right = tail ? tail.split(':') : []
  const groups = tail === undefined ? left : [...left, ...Array<string>(Math.max(0, 8 - left.length - right.length)).fill('0'), ...right]
  return `${groups.slice(0, 4).map(group => group.replace(/^0+(?=.)/, '')).join(':')}::/64`
}

/**
 * The address that a request comes from. Of `X-Forwarded-For` only as many entries are believed, from the right, as
 * there are proxies of ours; anybody can write the others.
 */
export function clientAddress(event: H3Event): string {
  const remote = event.node.req.socket.remoteAddress ?? ''
  const { trustedProxies } = event.context.registry.config
  if (trustedProxies === 0) return counted(remote)
  const hops = [...(getRequestHeader(event, 'x-forwarded-for') ?? '').split(',').map(hop => hop.trim()).filter(hop => hop !== ''), remote]
  return counted(hops[Math.max(0, hops.length - 1 - trustedProxies)] ?? remote)
}
