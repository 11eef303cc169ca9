import { afterEach, beforeEach, describe, expect, it, vi } from 'vitest'
import { browserSound, contextTimeAt } from '@/hooks/player/audio'
import type { SoundPort } from '@/hooks/player/ports'

class FakeSource extends EventTarget {
  buffer: unknown = null
  startedAt: number | null = null
  isStopped = false
  connect() {}
  disconnect() {}
  start(at: number) {
    this.startedAt = at
  }
  stop() {
    this.isStopped = true
  }
}
class FakeContext extends EventTarget {
  state: 'suspended' | 'running' | 'closed' = 'suspended'
  currentTime = 0
  sources: FakeSource[] = []
  isGesture = false
  async resume() {
    if (!this.isGesture) throw new DOMException('no gesture', 'NotAllowedError')
    this.become('running')
  }
  async suspend() {
    this.become('suspended')
  }
  become(state: FakeContext['state']) {
    this.state = state
    this.dispatchEvent(new Event('statechange'))
  }
  async decodeAudioData() {
    return {}
  }
  createBufferSource() {
    const source = new FakeSource()
    this.sources.push(source)
    return source
  }
}

const { howler } = vi.hoisted(() => ({
  howler: {
    autoSuspend: true,
    usingWebAudio: true,
    ctx: null as unknown,
    masterGain: {},
    volume: vi.fn(() => 1),
    mute: vi.fn(),
  },
}))
vi.mock('howler/dist/howler.core.min.js', () => ({ Howler: howler, Howl: class {} }))

describe('what is heard when', () => {
  const now = 10_000
  it('an instant of the page’s clock is put on the audio clock by what is heard now', () => {
    const context = {
      currentTime: 5,
      getOutputTimestamp: () => ({ contextTime: 4.96, performanceTime: now }),
    }
    // 40 ms lie between what is made and what is heard: the sound is begun that much earlier.
    expect(contextTimeAt(context, now + 200, now)).toBeCloseTo(5.16, 9)
  })

  it.each([
    ['none', {}],
    ['one from before the sound ran', { contextTime: 0, performanceTime: 0 }],
    [
      'one from before the context slept for a minute',
      { contextTime: 5, performanceTime: now - 60_000 },
    ],
    ['one of another clock', { contextTime: 900, performanceTime: now }],
  ])('with %s as output timestamp by the context’s own time', (_, stamp) => {
    const context = { currentTime: 5, getOutputTimestamp: () => stamp }
    expect(contextTimeAt(context, now + 200, now)).toBeCloseTo(5.2, 9)
  })
})

describe('the browser’s sound', () => {
  let context: FakeContext
  let sound: SoundPort
  const states: string[] = []

  beforeEach(async () => {
    context = new FakeContext()
    howler.ctx = context
    states.length = 0
    vi.stubGlobal('fetch', async () => new Response(new ArrayBuffer(8)))
    sound = browserSound()
    sound.watch((state) => states.push(state))
    await new Promise((resolve) => setTimeout(resolve, 20))
  })
  afterEach(() => {
    sound.close()
    vi.unstubAllGlobals()
  })

  it('never lets howler put the context to sleep (it does after 30 s, and the next beep comes late)', () => {
    expect(howler.autoSuspend).toBe(false)
  })

  it('says that it is blocked, plays nothing, and runs from the next tap on', async () => {
    expect(states.at(-1)).toBe('blocked')
    expect(sound.schedule('knock', performance.now() + 100)).toBeNull()
    document.dispatchEvent(new Event('pointerdown'))
    await Promise.resolve()
    expect(states.at(-1)).toBe('blocked')
    context.isGesture = true
    document.dispatchEvent(new Event('click'))
    await vi.waitFor(() => expect(states.at(-1)).toBe('ready'))
    expect(context.sources).toEqual([])
    expect(sound.schedule('knock', performance.now() + 100)).not.toBeNull()
    expect(context.sources).toHaveLength(1)
  })

  it('puts a sound at its time on the audio clock, and calls it off', () => {
    context.become('running')
    context.currentTime = 3
    const callOff = sound.schedule('bell', performance.now() + 150)
    const [source] = context.sources
    expect(source?.startedAt).toBeGreaterThan(3.14)
    expect(source?.startedAt).toBeLessThan(3.1501)
    callOff?.()
    expect(source?.isStopped).toBe(true)
  })

  it('calls off what was scheduled when the context stops, so that nothing comes in a heap after it', () => {
    context.become('running')
    sound.schedule('knock', performance.now() + 150)
    context.become('suspended')
    expect(context.sources.map((source) => source.isStopped)).toEqual([true])
    expect(states.at(-1)).toBe('blocked')
  })

  it('asks an interrupted context again every second until it goes on, and once it never ran asks nothing', async () => {
    vi.useFakeTimers()
    try {
      const resumes = vi.spyOn(context, 'resume')
      context.become('suspended')
      await vi.advanceTimersByTimeAsync(5_000)
      expect(resumes).not.toHaveBeenCalled()
      context.become('running')
      context.become('suspended')
      await vi.advanceTimersByTimeAsync(3_100)
      expect(resumes).toHaveBeenCalledTimes(3)
      expect(states.at(-1)).toBe('blocked')
      context.isGesture = true
      await vi.advanceTimersByTimeAsync(1_000)
      expect(states.at(-1)).toBe('ready')
      await vi.advanceTimersByTimeAsync(5_000)
      expect(resumes).toHaveBeenCalledTimes(4)
    } finally {
      vi.useRealTimers()
    }
  })

  it('sets a context going anew whose time stands still: its device has gone', () => {
    context.become('running')
    context.currentTime = 7
    const clock = vi.spyOn(performance, 'now')
    clock.mockReturnValue(1_000)
    expect(sound.schedule('knock', 1_100)).not.toBeNull()
    clock.mockReturnValue(1_400)
    expect(sound.schedule('knock', 1_500)).not.toBeNull()
    clock.mockReturnValue(1_600)
    expect(sound.schedule('knock', 1_700)).toBeNull()
    expect(context.state).toBe('suspended')
    clock.mockRestore()
  })

  it('is off at volume 0 or when switched off', () => {
    context.become('running')
    sound.configure(0, true)
    expect(states.at(-1)).toBe('off')
    sound.configure(0.5, false)
    expect(states.at(-1)).toBe('off')
    sound.configure(0.5, true)
    expect(states.at(-1)).toBe('ready')
    expect(howler.volume).toHaveBeenLastCalledWith(0.5)
  })

  it('says where no sound could be loaded, and loads it at the next tap once the network is back', async () => {
    vi.stubGlobal('fetch', () => Promise.reject(new TypeError('Failed to fetch')))
    context.become('running')
    const poor = browserSound()
    const said: string[] = []
    poor.watch((state) => said.push(state))
    await vi.waitFor(() => expect(said.at(-1)).toBe('failed'))
    vi.stubGlobal('fetch', async () => new Response(new ArrayBuffer(8)))
    await poor.unlock()
    await vi.waitFor(() => expect(said.at(-1)).toBe('ready'))
    poor.close()
  })
})
