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
  const onState = () => {
    // What was scheduled on a context that stops would sound in a heap when it goes on.
    if (context?.state !== 'running') for (const source of [...pending]) silence(source)
    tell()
  }
  document.addEventListener('visibilitychange', onVisible)
  window.addEventListener('online', onGesture)
  for (const gesture of GESTURES) document.addEventListener(gesture, onGesture)
  context?.addEventListener('statechange', onState)

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
      if (!buffer) return null
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
      players.forEach((player) => player.unload())
    },
  }
}
