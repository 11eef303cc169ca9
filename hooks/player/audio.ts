/**
 * Sounds on the audio clock. howler makes, unlocks and mixes the context and is the way out where there
 * is none; but it starts sounds now, not at a time, so marks are put on its context as buffer sources.
 */
import { Howl, Howler } from 'howler'
import type { SoundName, SoundPort } from './ports'
import type { PlayerState } from './types'

const NAMES: readonly SoundName[] = [
  'knock',
  'bell',
  'bell-low',
  'half',
  'logged',
  'call-60',
  'call-30',
  'call-10',
]
const addressOf = (name: SoundName) => `/sounds/${name}.wav`
/** What comes this much too late is not sounded: two knocks in one tell nobody anything. */
const TOO_LATE_SECONDS = 0.25

/** The browser's sound. One a page: the audio context is the page's. */
export function browserSound(): SoundPort {
  // howler would put the context to sleep after 30 s of silence and the next beep would come late.
  Howler.autoSuspend = false
  Howler.volume(Howler.volume())
  const context: AudioContext | null = Howler.usingWebAudio ? (Howler.ctx ?? null) : null
  const buffers = new Map<SoundName, AudioBuffer>()
  const players = new Map<SoundName, Howl>()
  const watchers = new Set<(state: PlayerState['sound']) => void>()
  let isOn = true
  let volume = 1
  let isBroken = false
  let isClosed = false

  const state = (): PlayerState['sound'] => {
    if (!isOn || volume === 0) return 'off'
    if (isBroken) return 'failed'
    return context === null || context.state === 'running' ? 'ready' : 'blocked'
  }
  const tell = () => watchers.forEach((watcher) => watcher(state()))

  async function load(name: SoundName): Promise<void> {
    if (!context) {
      players.set(name, new Howl({ src: [addressOf(name)], html5: true, preload: true }))
      return
    }
    const answer = await fetch(addressOf(name))
    if (!answer.ok) throw new Error(`${name}: ${answer.status}`)
    buffers.set(name, await context.decodeAudioData(await answer.arrayBuffer()))
  }
  Promise.all(NAMES.map(load)).catch(() => {
    isBroken = true
    tell()
  })

  const resume = () => {
    if (context && context.state !== 'running' && !isClosed) context.resume().then(tell, tell)
  }
  const onVisible = () => {
    if (document.visibilityState === 'visible') resume()
  }
  document.addEventListener('visibilitychange', onVisible)
  document.addEventListener('pointerdown', resume)
  document.addEventListener('keydown', resume)
  context?.addEventListener('statechange', tell)

  /** The context's time at an instant of performance.now(). */
  function contextTime(at: AudioContext, atMs: number): number {
    const stamp = at.getOutputTimestamp?.()
    if (
      stamp?.contextTime !== undefined &&
      stamp.performanceTime !== undefined &&
      stamp.performanceTime > 0 &&
      Math.abs(at.currentTime - stamp.contextTime) < 0.5
    ) {
      return stamp.contextTime + (atMs - stamp.performanceTime) / 1_000
    }
    return at.currentTime + (atMs - performance.now()) / 1_000
  }

  return {
    watch(watcher) {
      watchers.add(watcher)
      watcher(state())
      return () => watchers.delete(watcher)
    },
    unlock: resume,
    configure(nextVolume, on) {
      volume = Math.min(1, Math.max(0, nextVolume))
      isOn = on
      Howler.volume(volume)
      Howler.mute(!on)
      tell()
    },
    schedule(name, atMs) {
      const nothing = () => undefined
      if (state() !== 'ready') return nothing
      if (!context) {
        const timer = setTimeout(
          () => players.get(name)?.play(),
          Math.max(0, atMs - performance.now()),
        )
        return () => clearTimeout(timer)
      }
      const buffer = buffers.get(name)
      if (!buffer) return nothing
      const at = contextTime(context, atMs)
      if (context.currentTime - at > TOO_LATE_SECONDS) return nothing
      const source = context.createBufferSource()
      source.buffer = buffer
      source.connect(Howler.masterGain)
      source.start(Math.max(context.currentTime, at))
      return () => {
        source.disconnect()
        source.stop()
      }
    },
    close() {
      isClosed = true
      watchers.clear()
      document.removeEventListener('visibilitychange', onVisible)
      document.removeEventListener('pointerdown', resume)
      document.removeEventListener('keydown', resume)
      context?.removeEventListener('statechange', tell)
      players.forEach((player) => player.unload())
    },
  }
}
