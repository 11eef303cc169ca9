/**
 * Sounds on the audio clock. howler makes, unlocks and mixes the context and is the way out where there
 * is none; but it starts sounds now, not at a time, so marks are put on its context as buffer sources.
 */
import { Howl, Howler } from 'howler/dist/howler.core.min.js'
import { SOUND_NAMES, type SoundName } from '@/server/engine/timeline/mark-sound'
import type { SoundPort } from './ports'
import type { PlayerState } from './types'

const addressOf = (name: SoundName) => `/sounds/${name}.wav`
/** Loudspeakers without wires lag by up to this much; a timestamp further off is stale. */
const MOST_LATENCY_SECONDS = 0.5
/** How often an interrupted context (a call, a device that went away) is asked to go on. */
const RETRY_MS = 1_000
/** A context that says it runs and whose time stands still for so long has lost its device. */
const STALLED_MS = 500
/** What browsers take for a person's doing; a finger counts when it is lifted. */
const GESTURES = ['pointerdown', 'pointerup', 'click', 'keydown'] as const

/**
 * The context's time at an instant of performance.now(). The output timestamp says what is heard when,
 * so that a mark sounds with its picture; a stale one (the context slept) is not believed.
 */
export function contextTimeAt(
  context: Pick<AudioContext, 'currentTime' | 'getOutputTimestamp'>,
  atMs: number,
  nowMs: number,
): number {
  const plain = context.currentTime + (atMs - nowMs) / 1_000
  const { contextTime, performanceTime } = context.getOutputTimestamp?.() ?? {}
  if (contextTime === undefined || !performanceTime) return plain
  const heard = contextTime + (atMs - performanceTime) / 1_000
  return Math.abs(heard - plain) < MOST_LATENCY_SECONDS ? heard : plain
}

/** The browser's sound. One a page: the audio context is the page's. */
export function browserSound(): SoundPort {
  // howler would put the context to sleep after 30 s of silence and the next beep would come late.
  Howler.autoSuspend = false
  Howler.volume(Howler.volume())
  const context: AudioContext | null = Howler.usingWebAudio ? (Howler.ctx ?? null) : null
  const buffers = new Map<SoundName, AudioBuffer>()
  const players = new Map<SoundName, Howl>()
  const pending = new Set<AudioBufferSourceNode>()
  const watchers = new Set<(state: PlayerState['sound']) => void>()
  let isOn = true
  let volume = 1
  let isBroken = false
  let isClosed = false
  /** Before the first gesture asking is futile; once sound has run, it may go on by itself. */
  let hasRun = context?.state === 'running'
  let retry: ReturnType<typeof setTimeout> | null = null
  let seen = { contextTime: -1, atMs: 0 }

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
    if (buffers.has(name)) return
    const answer = await fetch(addressOf(name))
    if (!answer.ok) throw new Error(`${name}: ${answer.status}`)
    buffers.set(name, await context.decodeAudioData(await answer.arrayBuffer()))
  }
  function loadAll(): void {
    Promise.all(SOUND_NAMES.map(load)).then(
      () => {
        isBroken = false
        tell()
      },
      () => {
        isBroken = true
        tell()
      },
    )
  }
  loadAll()

  function silence(source: AudioBufferSourceNode): void {
    if (!pending.delete(source)) return
    source.disconnect()
    source.stop()
  }

  async function resume(): Promise<void> {
    if (isClosed) return
    if (isBroken) loadAll()
    if (context && context.state !== 'running') await context.resume().catch(() => undefined)
    tell()
  }
  const onGesture = () => {
    if (isBroken || context?.state !== 'running') void resume()
  }
  const onVisible = () => {
    if (document.visibilityState === 'visible') onGesture()
  }
  const askAgain = () => {
    if (retry !== null || isClosed || !hasRun || context?.state === 'running') return
    retry = setTimeout(() => {
      retry = null
      void resume().then(askAgain)
    }, RETRY_MS)
  }
  const onState = () => {
    if (context?.state === 'running') hasRun = true
    else {
      // What was scheduled on a context that stops would sound in a heap when it goes on.
      for (const source of [...pending]) silence(source)
      askAgain()
    }
    tell()
  }
  /** True where the device behind a running context has gone: it is set going again on the present one. */
  const isStalled = (running: AudioContext): boolean => {
    const nowMs = performance.now()
    if (running.currentTime !== seen.contextTime) {
      seen = { contextTime: running.currentTime, atMs: nowMs }
      return false
    }
    if (nowMs - seen.atMs < STALLED_MS) return false
    seen.atMs = nowMs
    void running.suspend().catch(() => undefined)
    return true
  }
  document.addEventListener('visibilitychange', onVisible)
  window.addEventListener('online', onGesture)
  for (const gesture of GESTURES) document.addEventListener(gesture, onGesture)
  context?.addEventListener('statechange', onState)
  navigator.mediaDevices?.addEventListener?.('devicechange', onGesture)

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
      if (isClosed || state() !== 'ready') return null
      if (!context) {
        const player = players.get(name)
        if (player?.state() !== 'loaded') return null
        const timer = setTimeout(() => player.play(), Math.max(0, atMs - performance.now()))
        return () => clearTimeout(timer)
      }
      const buffer = buffers.get(name)
      if (!buffer || isStalled(context)) return null
      const source = context.createBufferSource()
      source.buffer = buffer
      source.connect(Howler.masterGain)
      source.addEventListener('ended', () => pending.delete(source))
      pending.add(source)
      const at = contextTimeAt(context, atMs, performance.now())
      source.start(Math.max(context.currentTime, at))
      return () => silence(source)
    },
    close() {
      isClosed = true
      watchers.clear()
      for (const source of [...pending]) silence(source)
      document.removeEventListener('visibilitychange', onVisible)
      window.removeEventListener('online', onGesture)
      for (const gesture of GESTURES) document.removeEventListener(gesture, onGesture)
      context?.removeEventListener('statechange', onState)
      navigator.mediaDevices?.removeEventListener?.('devicechange', onGesture)
      if (retry !== null) clearTimeout(retry)
      players.forEach((player) => player.unload())
    },
  }
}
