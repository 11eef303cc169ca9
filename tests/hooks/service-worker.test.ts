import { execFileSync } from 'node:child_process'
import { readFileSync } from 'node:fs'
import { runInNewContext } from 'node:vm'
import { beforeEach, describe, expect, it, vi } from 'vitest'

const ORIGIN = 'https://gym.example'
const OFFLINE_PAGE =
  '<link href="/_next/static/chunks/page.css"><script src="/_next/static/chunks/page.js"></script>'

interface FetchEvent {
  request: Request & { mode: string }
  respondWith(answer: Promise<Response>): void
}

/** The worker as built, in a room with caches and a network of its own. */
function workerOf(source: string) {
  const stored = new Map<string, Map<string, Response>>()
  const addressOf = (request: Request | string) =>
    new URL(typeof request === 'string' ? request : request.url, ORIGIN).href
  const network = vi.fn(
    async (request: Request | string): Promise<Response> =>
      new Response(
        addressOf(request) === `${ORIGIN}/offline`
          ? OFFLINE_PAGE
          : `fresh ${new URL(addressOf(request)).pathname}`,
      ),
  )
  const cacheOf = (name: string) => {
    const kept = stored.get(name) ?? new Map<string, Response>()
    stored.set(name, kept)
    return {
      async put(request: Request | string, answer: Response) {
        kept.set(addressOf(request), answer)
      },
      match: async (request: Request | string) => kept.get(addressOf(request))?.clone(),
      async add(address: string) {
        kept.set(addressOf(address), await network(address))
      },
      async addAll(addresses: string[]) {
        for (const address of addresses) kept.set(addressOf(address), await network(address))
      },
      keys: async () => [...kept.keys()].map((address) => new Request(address)),
    }
  }
  const listeners = new Map<string, (event: unknown) => void>()
  const self = {
    location: new URL(ORIGIN),
    addEventListener: (type: string, listen: (event: unknown) => void) =>
      listeners.set(type, listen),
    skipWaiting: async () => undefined,
    clients: { claim: async () => undefined },
  }
  class HereRequest extends Request {
    constructor(input: string | Request, init?: RequestInit) {
      super(typeof input === 'string' ? new URL(input, ORIGIN) : input, init)
    }
  }
  runInNewContext(source, {
    self,
    URL,
    Request: HereRequest,
    setTimeout,
    Promise,
    fetch: network,
    caches: {
      open: async (name: string) => cacheOf(name),
      keys: async () => [...stored.keys()],
      delete: async (name: string) => stored.delete(name),
      async match(request: Request | string) {
        for (const name of stored.keys()) {
          const found = await cacheOf(name).match(request)
          if (found) return found
        }
        return undefined
      },
    },
  })
  return {
    stored,
    network,
    async raise(type: string, data?: unknown): Promise<void> {
      let work: Promise<unknown> = Promise.resolve()
      listeners.get(type)?.({ data, waitUntil: (promise: Promise<unknown>) => (work = promise) })
      await work
    },
    /** Null where the worker leaves the request to the browser. */
    async ask(path: string, more: { mode?: string; headers?: object; method?: string } = {}) {
      let answer: Promise<Response> | null = null
      const request = new Request(new URL(path, ORIGIN), {
        method: more.method ?? 'GET',
        headers: { ...more.headers },
      })
      Object.defineProperty(request, 'mode', { value: more.mode ?? 'cors' })
      listeners.get('fetch')?.({
        request,
        respondWith: (promise) => (answer = promise),
      } as FetchEvent)
      const given = await (answer as Promise<Response> | null)
      return given === null ? null : given.text()
    },
  }
}

describe('the service worker', () => {
  let worker: ReturnType<typeof workerOf>
  beforeEach(async () => {
    const source = execFileSync('node', ['scripts/service-worker.mjs', 'build-7', '-']).toString()
    worker = workerOf(source)
    await worker.raise('install')
  })

  it('keeps every sound and font from the first, in a cache named by the build', () => {
    expect([...worker.stored.keys()]).toEqual(['floorside-build-7'])
    const kept = [...(worker.stored.get('floorside-build-7')?.keys() ?? [])]
    expect(kept).toContain(`${ORIGIN}/sounds/knock.wav`)
    expect(kept.some((address) => address.endsWith('.woff2'))).toBe(true)
  })

  it('gives a class page fresh, and as it was kept where there is no network', async () => {
    const page = { mode: 'navigate' }
    expect(await worker.ask('/play/one?from=today', page)).toBe('fresh /play/one')
    worker.network.mockRejectedValue(new TypeError('offline'))
    expect(await worker.ask('/play/one', page)).toBe('fresh /play/one')
    expect(await worker.ask('/play/two', page)).toBe(OFFLINE_PAGE)
  })

  it('keeps a class page and its scripts when the player asks, and comes back with them offline', async () => {
    await worker.raise('message', {
      type: 'keep-page',
      page: '/play/three',
      assets: ['/_next/static/chunks/a.js', '/api/me'],
    })
    worker.network.mockRejectedValue(new TypeError('offline'))
    expect(await worker.ask('/play/three', { mode: 'navigate' })).toBe('fresh /play/three')
    expect(await worker.ask('/_next/static/chunks/a.js')).toBe('fresh /_next/static/chunks/a.js')
    const kept = [...(worker.stored.get('floorside-build-7')?.keys() ?? [])]
    expect(kept.some((address) => address.includes('/api/'))).toBe(false)
  })

  it('shows any other page fresh and keeps none of them', async () => {
    expect(await worker.ask('/today', { mode: 'navigate' })).toBe('fresh /today')
    const kept = [...(worker.stored.get('floorside-build-7')?.keys() ?? [])]
    expect(kept).not.toContain(`${ORIGIN}/today`)
  })

  it('says that there is no network in the place of a page that it does not have, drawn as ever', async () => {
    worker.network.mockRejectedValue(new TypeError('offline'))
    expect(await worker.ask('/today', { mode: 'navigate' })).toBe(OFFLINE_PAGE)
    expect(await worker.ask('/_next/static/chunks/page.css')).toBe(
      'fresh /_next/static/chunks/page.css',
    )
    expect(await worker.ask('/_next/static/chunks/page.js')).toBe(
      'fresh /_next/static/chunks/page.js',
    )
  })

  it('keeps no other page when asked to', async () => {
    await worker.raise('message', { type: 'keep-page', page: '/account', assets: [] })
    const kept = [...(worker.stored.get('floorside-build-7')?.keys() ?? [])]
    expect(kept).not.toContain(`${ORIGIN}/account`)
  })

  it('keeps no sign-in page in the place of a class', async () => {
    const moved = new Response('sign in')
    Object.defineProperty(moved, 'redirected', { value: true })
    worker.network.mockResolvedValueOnce(moved)
    await worker.ask('/play/four', { mode: 'navigate' })
    const kept = [...(worker.stored.get('floorside-build-7')?.keys() ?? [])]
    expect(kept).not.toContain(`${ORIGIN}/play/four`)
  })

  it.each([
    ['data of the framework', '/play/one', { headers: { rsc: '1' }, mode: 'navigate' }],
    ['data of the framework by its address', '/play/one?_rsc=abc', {}],
    ['our own routes', '/api/attempts/1/events', {}],
    ['anything that changes something', '/play/one', { method: 'POST', mode: 'navigate' }],
  ])('leaves %s alone', async (_, path, more) => {
    expect(await worker.ask(path, more)).toBeNull()
    expect(worker.network).not.toHaveBeenCalledWith(expect.objectContaining({ url: ORIGIN + path }))
  })

  it('clears away the caches of earlier builds, and those of nobody else', async () => {
    worker.stored.set('floorside-build-6', new Map())
    worker.stored.set('another', new Map())
    await worker.raise('activate')
    expect([...worker.stored.keys()].sort()).toEqual(['another', 'floorside-build-7'])
  })

  it('is not committed: every build writes its own', () => {
    expect(readFileSync('.gitignore', 'utf8')).toContain('public/sw.js')
  })
})
