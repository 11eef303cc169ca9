/**
 * The keys for play, pause and next of a keyboard, a headset or a lock screen, and what stands there: the
 * movement, its block and the class. Browsers give these keys to pages that play something, so a silent
 * track runs along with the class.
 */
import type { PublishedVersion } from '@/server/engine/spec/version'
import type { Position, Run } from '@/server/engine/timeline/run-types'

/** Browsers take shorter tracks for a sound of the page and not for something that plays. */
const TRACK_SECONDS = 10
const TRACK_RATE = 8_000

export interface MediaKeys {
  play(): void
  pause(): void
  next(): void
}

export interface MediaNow {
  title: string
  artist: string
  album: string
  state: 'playing' | 'paused' | 'none'
}

/** What stands on the lock screen at a position. */
export function mediaNow(
  version: PublishedVersion,
  run: Run | null,
  position: Position | null,
): MediaNow {
  const album = version.spec.title
  if (!run || !position || position.phase === 'ready' || position.phase === 'over') {
    return { title: album, artist: '', album, state: 'none' }
  }
  const block = version.spec.blocks[position.blockIndex]
  const nameOf = (slug: string | undefined) =>
    version.movements.find((movement) => movement.slug === slug)?.name
  const stations = block && block.format.type !== 'rest' ? block.format.stations : []
  const index = position.lead?.station ?? position.segment?.station ?? 0
  const present = nameOf(stations[index]?.movement)
  const names = stations.map((station) => nameOf(station.movement)).filter(Boolean)
  const kind = position.phase === 'brief' ? 'brief' : position.segment?.kind
  const isOwnRound = position.round !== null && position.lead === null
  const title =
    kind === 'rest'
      ? 'Rest'
      : kind === 'brief'
        ? `Brief: ${block?.title ?? ''}`
        : ((isOwnRound ? names.join(', ') : present) ?? block?.title ?? album)
  const round = position.lead?.round ?? position.round ?? position.segment?.round
  const isNumbered = round !== undefined && kind !== 'brief' && kind !== 'rest'
  return {
    title: title || (block?.title ?? album),
    artist: `${block?.title ?? ''}${isNumbered ? `, round ${round}` : ''}`,
    album,
    state: position.halted ? 'paused' : 'playing',
  }
}

/** Silence as a WAV file: 8-bit mono, every sample in the middle. */
export function silentTrack(): Uint8Array<ArrayBuffer> {
  const samples = TRACK_SECONDS * TRACK_RATE
  const bytes = new Uint8Array(44 + samples).fill(128, 44)
  const view = new DataView(bytes.buffer)
  const letters = (at: number, text: string) =>
    [...text].forEach((letter, index) => view.setUint8(at + index, letter.charCodeAt(0)))
  letters(0, 'RIFF')
  view.setUint32(4, 36 + samples, true)
  letters(8, 'WAVEfmt ')
  view.setUint32(16, 16, true)
  view.setUint16(20, 1, true)
  view.setUint16(22, 1, true)
  view.setUint32(24, TRACK_RATE, true)
  view.setUint32(28, TRACK_RATE, true)
  view.setUint16(32, 1, true)
  view.setUint16(34, 8, true)
  letters(36, 'data')
  view.setUint32(40, samples, true)
  return bytes
}

export interface MediaPort {
  /** To be told at every change; only what differs is passed on. */
  show(now: MediaNow): void
  close(): void
}

/** The browser's media session. `keys` are called as the member presses them. */
export function browserMedia(keys: MediaKeys): MediaPort {
  const session = navigator.mediaSession as MediaSession | undefined
  const actions = { play: keys.play, pause: keys.pause, nexttrack: keys.next } as const
  let last = ''
  let track: { player: HTMLAudioElement; address: string } | null = null

  const handle = (action: keyof typeof actions, handler: (() => void) | null) => {
    try {
      session?.setActionHandler(action, handler)
    } catch {
      // Older browsers know the session and not this action.
    }
  }
  for (const action of ['play', 'pause', 'nexttrack'] as const) handle(action, actions[action])

  function hold(state: MediaNow['state']): void {
    if (!session) return
    if (state === 'none') {
      track?.player.pause()
      return
    }
    if (!track) {
      const address = URL.createObjectURL(new Blob([silentTrack()], { type: 'audio/wav' }))
      const player = new Audio(address)
      player.loop = true
      track = { player, address }
    }
    if (state === 'playing') track.player.play().catch(() => undefined)
    else track.player.pause()
  }

  return {
    show(now) {
      const key = JSON.stringify(now)
      if (!session || key === last) return
      last = key
      hold(now.state)
      session.playbackState = now.state
      const { title, artist, album } = now
      session.metadata =
        typeof MediaMetadata === 'undefined' || now.state === 'none'
          ? null
          : new MediaMetadata({ title, artist, album })
    },
    close() {
      for (const action of ['play', 'pause', 'nexttrack'] as const) handle(action, null)
      hold('none')
      if (track) URL.revokeObjectURL(track.address)
      track = null
      if (!session) return
      session.playbackState = 'none'
      session.metadata = null
    },
  }
}
