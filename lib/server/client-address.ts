import 'server-only'
import { isIPv6 } from 'node:net'
import { networkInterfaces } from 'node:os'
import { environment } from './environment'

/** Set by db/local/serve.mjs from the connection itself, whatever the asker sent under this name. */
const ADDRESS_HEADER = 'x-turnwright-address'

/** An IPv4 address that came over an IPv6 socket is written as the former. */
function plainAddress(text: string | null | undefined): string | null {
  return text?.trim().replace(/^::ffff:(?=\d+\.)/i, '') || null
}

/**
 * The asker's network address: the last entry of x-forwarded-for if a proxy of ours is in front (TRUST_PROXY), else the
 * connection's other end. Null where neither is known, as under a server that is not ours.
 */
function clientAddress(headers: Headers): string | null {
  const { isProxyTrusted, isAddressMarked } = environment()
  if (isProxyTrusted) return plainAddress(headers.get('x-forwarded-for')?.split(',').at(-1))
  return isAddressMarked ? plainAddress(headers.get(ADDRESS_HEADER)) : null
}

function isLoopback(address: string): boolean {
  return address === '::1' || address.startsWith('127.')
}

/**
 * Whether the request comes from a program on this machine, through whichever of its addresses. One that says it was
 * handed on by a proxy that we do not trust does not: the proxy is on this machine, the asker may be anywhere.
 */
export function isFromThisMachine(headers: Headers): boolean {
  const address = clientAddress(headers)
  if (address === null) return false
  // Next.js itself fills in the connection's address where nobody else has.
  const forwarded = plainAddress(headers.get('x-forwarded-for'))
  if (!environment().isProxyTrusted && forwarded !== null && forwarded !== address) return false
  const own = Object.values(networkInterfaces()).flatMap((list) => list?.map((each) => each.address) ?? [])
  return isLoopback(address) || own.includes(address)
}

/** First four groups of eight, with `::` written out. */
function prefixOf(address: string): string {
  const [head, tail] = address.split('%')[0].split('::')
  const groups = head ? head.split(':') : []
  const after = tail ? tail.split(':') : []
  const zeros = tail === undefined ? 0 : Math.max(0, 8 - groups.length - after.length)
  const all = [...groups, ...Array<string>(zeros).fill('0'), ...after]
  return all
    .slice(0, 4)
    .map((group) => parseInt(group, 16).toString(16))
    .join(':')
}

/**
 * What counts as one asker: an IPv4 address, or an IPv6 network of 64 bits, within which a single person may take any
 * address. Null for this machine's loopback: behind a proxy that nobody told us of, everybody comes from there.
 */
export function askerOf(headers: Headers): string | null {
  const address = clientAddress(headers)
  if (address === null || isLoopback(address)) return null
  return isIPv6(address) ? `${prefixOf(address)}::/64` : address
}
