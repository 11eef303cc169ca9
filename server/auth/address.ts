import 'server-only'
/** The network address that a request came from, as throttles count it. */
import { subscribe } from 'node:diagnostics_channel'
import type { IncomingMessage } from 'node:http'
import { isIP } from 'node:net'
import { headers } from 'next/headers'

/**
 * Writes the address of the socket at the end of every request's `x-forwarded-for`, as a reverse proxy
 * would: Next hands on headers only, and a client may have sent any. Called once, before the first request.
 */
export function noteSocketAddresses(): void {
  subscribe('http.server.request.start', (message) => {
    const { request } = message as { request: IncomingMessage }
    const said = request.headers['x-forwarded-for']
    const socket = request.socket.remoteAddress ?? 'unknown'
    request.headers['x-forwarded-for'] = said === undefined ? socket : `${said}, ${socket}`
  })
}

/** How many reverse proxies of our own stand before this server: each appends the address that it saw. */
function trustedProxies(): number {
  const count = Number(process.env.TRUSTED_PROXIES ?? 0)
  return Number.isInteger(count) && count > 0 ? count : 0
}

export async function networkAddress(): Promise<string> {
  return addressFrom((await headers()).get('x-forwarded-for'), trustedProxies())
}

/**
 * The address before `proxies` trusted ones, from the end of `forwarded`, where nobody but they can
 * write. An IPv6 address counts as its /64: the rest is a device's own to choose (RFC 4291, 2.5.4).
 */
export function addressFrom(forwarded: string | null, proxies: number): string {
  const entries = (forwarded ?? '').split(',').map((entry) => entry.trim())
  const entry = entries.at(-1 - proxies) ?? entries[0] ?? ''
  const address = entry.replace(/^::ffff:(?=\d+\.)/i, '')
  if (isIP(address) === 0) return 'unknown'
  return isIP(address) === 4 ? address : networkOf(address)
}

/** The first four groups of an IPv6 address. */
function networkOf(address: string): string {
  const [head = '', tail] = address.split('%')[0]?.split('::') ?? []
  const groups = (part: string | undefined) => (part ? part.split(':') : [])
  const missing = tail === undefined ? 0 : 8 - groups(head).length - groups(tail).length
  const all = [...groups(head), ...Array.from({ length: missing }, () => '0'), ...groups(tail)]
  return `${all
    .slice(0, 4)
    .map((group) => group.replace(/^0+(?=.)/, '').toLowerCase())
    .join(':')}::/64`
}
