import { afterEach, beforeEach, describe, expect, it, vi } from 'vitest'
import { browserMedia, mediaNow, silentTrack } from '@/hooks/player/media-session'
import { apply, newRun, positionAt } from '@/server/engine/timeline/run'
import { playerFixture } from '../support/player-fixture'
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

describe('media keys and the lock screen', () => {
  const none = { play: () => undefined, pause: () => undefined, next: () => undefined }

  it('play, pause and next are heard until the class is closed', () => {
    const handlers = new Map<string, (() => void) | null>()
    stubNavigator('mediaSession', {
      setActionHandler: (name: string, handler: (() => void) | null) => handlers.set(name, handler),
    })
    const keys = { play: vi.fn(), pause: vi.fn(), next: vi.fn() }
    const media = browserMedia(keys)
    expect([...handlers.keys()].sort()).toEqual(['nexttrack', 'pause', 'play'])
    for (const handler of handlers.values()) handler?.()
    expect([keys.play, keys.pause, keys.next].map((key) => key.mock.calls.length)).toEqual([
      1, 1, 1,
    ])
    media.close()
    expect([...handlers.values()]).toEqual([null, null, null])
  })

  it('shows what is done now, and plays silence while the class runs so that the keys come here', () => {
    const session = { setActionHandler: vi.fn(), playbackState: 'none', metadata: null as unknown }
    stubNavigator('mediaSession', session)
    vi.stubGlobal(
      'MediaMetadata',
      class {
        constructor(readonly init: object) {}
      },
    )
    const plays = vi.spyOn(HTMLMediaElement.prototype, 'play').mockResolvedValue()
    const pauses = vi.spyOn(HTMLMediaElement.prototype, 'pause').mockReturnValue()
    URL.createObjectURL = () => 'blob:silence'
    URL.revokeObjectURL = () => undefined
    const media = browserMedia(none)
    const now = { title: 'Goblet squat', artist: 'Main, round 2', album: 'Ladder' } as const
    media.show({ ...now, state: 'playing' })
    media.show({ ...now, state: 'playing' })
    expect(session.playbackState).toBe('playing')
    expect(session.metadata).toEqual({ init: now })
    expect(plays).toHaveBeenCalledTimes(1)
    media.show({ ...now, state: 'paused' })
    expect(session.playbackState).toBe('paused')
    expect(pauses).toHaveBeenCalledTimes(1)
    media.close()
    expect([session.playbackState, session.metadata]).toEqual(['none', null])
    vi.restoreAllMocks()
  })

  it('its silent track is a WAV of ten seconds of nothing', () => {
    const bytes = silentTrack()
    expect(new TextDecoder().decode(bytes.slice(0, 4))).toBe('RIFF')
    expect(bytes.length).toBe(44 + 80_000)
    expect(new Set(bytes.slice(44))).toEqual(new Set([128]))
  })

  it('is done without where the browser has no media session or not these keys', () => {
    stubNavigator('mediaSession', undefined)
    expect(() => browserMedia(none).close()).not.toThrow()
    stubNavigator('mediaSession', {
      setActionHandler: () => {
        throw new TypeError('unknown action')
      },
    })
    expect(() => browserMedia(none).close()).not.toThrow()
  })
})

describe('what stands on the lock screen', () => {
  const { version, versionId } = playerFixture()
  const started = apply(
    newRun(version, versionId, { waitAtBriefs: false, changeExtraMs: 0 }),
    { type: 'start', versionId, counting: 'press', options: [] },
    0,
  ).run

  it('names the movement, or all of a round, with its block, and says rest in a rest', () => {
    const seen = new Set<string>()
    for (let now = 0; now < 2_400_000; now += 5_000) {
      const { title, artist, state } = mediaNow(version, started, positionAt(started, now))
      seen.add(state)
      seen.add(title)
      seen.add(artist)
    }
    expect([...seen]).toEqual(expect.arrayContaining(['playing', 'Rest', 'Push-up', 'none']))
    expect([...seen].some((text) => /, round \d+$/.test(text))).toBe(true)
    expect(seen.has('')).toBe(true)
  })
})
