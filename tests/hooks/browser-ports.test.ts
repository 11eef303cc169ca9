import { afterEach, beforeEach, describe, expect, it, vi } from 'vitest'
import { onMediaNext } from '@/hooks/player/media-session'
import { startTicker } from '@/hooks/player/ticker'
import { browserWakeLock } from '@/hooks/player/wake-lock'

afterEach(() => {
  vi.useRealTimers()
  vi.unstubAllGlobals()
})

function stubNavigator(name: string, value: unknown): void {
  Object.defineProperty(navigator, name, { value, configurable: true })
}

describe('the ticker', () => {
  beforeEach(() => {
    URL.createObjectURL = () => 'blob:ticker'
    URL.revokeObjectURL = () => undefined
  })

  it('wakes by a worker, which hidden tabs do not slow, and ends it', () => {
    const workers: FakeWorker[] = []
    class FakeWorker {
      onmessage: (() => void) | null = null
      isEnded = false
      constructor() {
        workers.push(this)
      }
      terminate() {
        this.isEnded = true
      }
    }
    vi.stubGlobal('Worker', FakeWorker)
    const wake = vi.fn()
    const end = startTicker(wake)
    workers[0]?.onmessage?.()
    expect(wake).toHaveBeenCalledTimes(1)
    end()
    expect(workers[0]?.isEnded).toBe(true)
  })

  it.each(['throws', 'fails later', 'is not there'])(
    'wakes about every 50 ms by the page’s own timer where a worker %s',
    (how) => {
      vi.useFakeTimers()
      class Refused {
        onerror: (() => void) | null = null
        constructor() {
          if (how === 'throws') throw new DOMException('no', 'SecurityError')
          setTimeout(() => this.onerror?.(), 10)
        }
        terminate() {}
      }
      vi.stubGlobal('Worker', how === 'is not there' ? undefined : Refused)
      const wake = vi.fn()
      const end = startTicker(wake)
      vi.advanceTimersByTime(1_010)
      expect(wake.mock.calls.length).toBeGreaterThanOrEqual(19)
      end()
      const calls = wake.mock.calls.length
      vi.advanceTimersByTime(1_000)
      expect(wake).toHaveBeenCalledTimes(calls)
    },
  )
})

describe('the wake lock', () => {
  it('is asked for again at the next key once the browser has taken it, and given back', async () => {
    const locks: (EventTarget & { release: () => Promise<void> })[] = []
    const request = vi.fn(async () => {
      const lock = Object.assign(new EventTarget(), {
        release: vi.fn(async () => void lock.dispatchEvent(new Event('release'))),
      })
      locks.push(lock)
      return lock
    })
    stubNavigator('wakeLock', { request })
    const stayAwake = browserWakeLock()
    stayAwake(true)
    document.dispatchEvent(new Event('keydown'))
    await vi.waitFor(() => expect(locks).toHaveLength(1))
    expect(request).toHaveBeenCalledTimes(1)
    await new Promise((resolve) => setTimeout(resolve))
    locks[0]?.dispatchEvent(new Event('release'))
    document.dispatchEvent(new Event('keydown'))
    await vi.waitFor(() => expect(locks).toHaveLength(2))
    await new Promise((resolve) => setTimeout(resolve))
    stayAwake(false)
    await vi.waitFor(() => expect(locks[1]?.release).toHaveBeenCalled())
    document.dispatchEvent(new Event('keydown'))
    expect(request).toHaveBeenCalledTimes(2)
  })

  it('is done without on a plain-http address', () => {
    stubNavigator('wakeLock', undefined)
    const stayAwake = browserWakeLock()
    expect(() => stayAwake(true)).not.toThrow()
    stayAwake(false)
  })
})

describe('the media key ‘next’', () => {
  it('is heard while it is listened for, and no other media key', () => {
    const handlers = new Map<string, (() => void) | null>()
    stubNavigator('mediaSession', {
      setActionHandler: (name: string, handler: (() => void) | null) => handlers.set(name, handler),
    })
    const next = vi.fn()
    const end = onMediaNext(next)
    expect([...handlers.keys()]).toEqual(['nexttrack'])
    handlers.get('nexttrack')?.()
    expect(next).toHaveBeenCalledTimes(1)
    end()
    expect(handlers.get('nexttrack')).toBeNull()
  })

  it('is done without where the browser has no media session or not this key', () => {
    stubNavigator('mediaSession', undefined)
    expect(() => onMediaNext(() => undefined)()).not.toThrow()
    stubNavigator('mediaSession', {
      setActionHandler: () => {
        throw new TypeError('unknown action')
      },
    })
    expect(() => onMediaNext(() => undefined)()).not.toThrow()
  })
})
