import { createServer, request } from 'node:http'
import type { AddressInfo } from 'node:net'
import { afterEach, describe, expect, it, vi } from 'vitest'
import { addressFrom, noteSocketAddresses } from '@/server/auth/address'
import { checkOrigin } from '@/server/auth/origin'

vi.mock('next/headers', () => ({ headers: vi.fn() }))

describe('the network address', () => {
  it.each([
    ['nobody but the socket said one', '192.0.2.1', 0, '192.0.2.1'],
    ['a client invents some', '203.0.113.9, 198.51.100.2, 192.0.2.1', 0, '192.0.2.1'],
    ['one proxy stands before us', '203.0.113.9, 192.0.2.1, 10.0.0.2', 1, '192.0.2.1'],
    ['two proxies stand before us', '203.0.113.9, 192.0.2.1, 10.0.0.3, 10.0.0.2', 2, '192.0.2.1'],
    ['a proxy was passed by', '192.0.2.1', 1, '192.0.2.1'],
    ['IPv4 comes in IPv6 clothes', '::ffff:192.0.2.1', 0, '192.0.2.1'],
    // RFC 3849 documentation addresses. RFC 4291, 2.5.4: the last 64 bits are the device's own to choose.
    ['a device has many', '2001:db8:1:2:aaaa::1', 0, '2001:db8:1:2::/64'],
    ['the same device later', '2001:0DB8:0001:0002:bbbb:cccc:dddd:eeee', 0, '2001:db8:1:2::/64'],
    ['the groups are left out', '2001:db8::1', 0, '2001:db8:0:0::/64'],
    ['it is our own computer', '::1', 0, '0:0:0:0::/64'],
    ['it is no address', 'unknown', 0, 'unknown'],
    ['it is anything at all', '<script>', 0, 'unknown'],
    ['there is none', null, 0, 'unknown'],
  ])('is the one that cannot be invented, where %s', (_name, forwarded, proxies, expected) => {
    expect(addressFrom(forwarded, proxies)).toBe(expected)
  })

  it('ends with the socket’s own, whatever the client sends', async () => {
    noteSocketAddresses()
    const server = createServer((asked, answer) =>
      answer.end(String(asked.headers['x-forwarded-for'])),
    )
    await new Promise<void>((resolve) => server.listen(0, '127.0.0.1', resolve))
    const { port } = server.address() as AddressInfo
    const seen = (headers: Record<string, string>) =>
      new Promise<string>((resolve, reject) => {
        request({ port, host: '127.0.0.1', headers }, (answer) => {
          let text = ''
          answer.on('data', (chunk: Buffer) => (text += chunk.toString()))
          answer.on('end', () => resolve(text))
        })
          .on('error', reject)
          .end()
      })
    try {
      expect(await seen({})).toBe('127.0.0.1')
      expect(addressFrom(await seen({ 'x-forwarded-for': '203.0.113.9' }), 0)).toBe('127.0.0.1')
    } finally {
      server.close()
    }
  })
})

describe('a request that changes something', () => {
  afterEach(() => vi.unstubAllEnvs())
  const isTaken = (headers: Record<string, string>) => {
    try {
      checkOrigin(new Headers({ host: 'gym.example', ...headers }))
      return true
    } catch {
      return false
    }
  }
  it.each([
    ['the browser vouches for it', { 'sec-fetch-site': 'same-origin' }, true],
    ['it is from the asked host', { origin: 'https://gym.example' }, true],
    ['it is from APP_ORIGIN, behind a proxy', { origin: 'https://floor.example' }, true],
    ['it is from another site', { 'sec-fetch-site': 'cross-site' }, false],
    ['it is from a neighbour domain', { 'sec-fetch-site': 'same-site' }, false],
    [
      'the browser says cross-site, whatever the origin',
      { 'sec-fetch-site': 'cross-site', origin: 'https://gym.example' },
      false,
    ],
    ['its origin is another', { origin: 'https://evil.example' }, false],
    ['its origin is hidden', { origin: 'null' }, false],
    [
      'a host is forwarded by a client',
      { origin: 'https://evil.example', 'x-forwarded-host': 'evil.example' },
      false,
    ],
    ['it says nothing', {}, false],
  ])('is taken only from our own pages: %s', (_name, headers, expected) => {
    vi.stubEnv('APP_ORIGIN', 'https://floor.example')
    expect(isTaken(headers as Record<string, string>)).toBe(expected)
  })
})
