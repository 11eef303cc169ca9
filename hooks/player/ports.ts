/** The browser as the player's store sees it: everything that a test replaces. */
import type { ClassEvent } from '@/server/engine/tally/events'
import type { SoundName } from '@/server/engine/timeline/mark-sound'
import type { Place, RunSettings } from '@/server/engine/timeline/run-types'
import type { PlayerPreferences, PlayerState, VoiceChoice } from './types'

export interface SoundPort {
  /** Tells the state now and at every change. Returns the way to end it. */
  watch(tell: (state: PlayerState['sound']) => void): () => void
  /** To be called from a key or a tap: browsers let sound begin only there. Settles once that is tried. */
  unlock(): Promise<void>
  /** 0 to 1; 0 and `on: false` are silence. */
  configure(volume: number, on: boolean): void
  /** Sounds at an instant of the monotonic clock. Returns the way to call it off; null where sound does not run. */
  schedule(name: SoundName, atMs: number): (() => void) | null
  close(): void
}

export interface VoiceSettings {
  on: boolean
  /** `VoiceChoice.id`; null, or one that is gone: the first of the list. */
  voice: string | null
  /** 1 is the voice's usual speed. */
  rate: number
  /** 0 to 1. */
  volume: number
}

export interface VoicePort {
  /** Tells the voices now and whenever they change; none: nothing can be said aloud here. */
  watch(tell: (voices: VoiceChoice[]) => void): () => void
  configure(settings: VoiceSettings): void
  /**
   * Says `text` at once, at `level` (0 to 1) of the chosen volume, and calls `done` when it has ended or
   * failed. Returns the way to cut it; null where it is not said: off, or no voice.
   */
  say(text: string, level: number, done: () => void): (() => void) | null
  close(): void
}

/** One attempt as the browser keeps it. */
export interface KeptAttempt {
  attemptId: string
  membershipId: string
  scheduledClassId: string
  versionId: string
  todayNote: string | null
  settings: RunSettings
  options: Record<string, string>
  startedWallMs: number
  /** `ended`: only its rating may be missing. `discarded`: the member chose to start anew. Neither is offered again. */
  over: 'ended' | 'discarded' | null
}

export interface KeptEvent {
  attemptId: string
  membershipId: string
  event: ClassEvent
  sent: boolean
}

export interface KeptAlive {
  attemptId: string
  place: Place | null
  wallMs: number
}

/** What survives a reload. Every write rejects where it was not kept. */
export interface PlayerMemory {
  /** False: a reload would lose what was not sent. */
  readonly isDurable: boolean
  preferences(membershipId: string): Promise<Partial<PlayerPreferences> | null>
  keepPreferences(membershipId: string, preferences: PlayerPreferences): Promise<void>
  latestAttempt(membershipId: string, scheduledClassId: string): Promise<KeptAttempt | null>
  attempt(attemptId: string): Promise<KeptAttempt | null>
  keepAttempt(attempt: KeptAttempt): Promise<void>
  events(attemptId: string): Promise<KeptEvent[]>
  keepEvents(events: readonly KeptEvent[]): Promise<void>
  alive(attemptId: string): Promise<KeptAlive | null>
  keepAlive(alive: KeptAlive): Promise<void>
  /** Events of one member that wait to be sent, by attempt. */
  unsent(membershipId: string): Promise<{ attempt: KeptAttempt; events: ClassEvent[] }[]>
  markSent(attemptId: string, ids: readonly string[]): Promise<void>
}

export interface Claim {
  release(): void
}

export interface ClaimPort {
  /** Null where another tab plays the attempt. With `take` it is taken from it. `lost`: another tab took it. */
  claim(attemptId: string, take: boolean, lost: () => void): Promise<Claim | null>
}

export type UsualScreen = Pick<PlayerPreferences, 'screenDiagonalInches' | 'distanceMetres'>

export interface PlayerPorts {
  /** Whole milliseconds that never go back and know nothing of the computer's clock. */
  now(): number
  /** The computer's clock, milliseconds since 1970. */
  wall(): number
  /** Wakes about every 50 ms, in hidden tabs too. Returns the way to end it. */
  tick(wake: () => void): () => void
  sound: SoundPort
  voice: VoicePort
  memory: PlayerMemory
  /** What the member's screen is taken for until they say better; without it a laptop at two metres. */
  usualScreen?: UsualScreen
  claims: ClaimPort
  /** UUIDv7. */
  newId(): string
  device: string
  /** Something new waits to be sent. */
  kickOutbox(): void
  watchOutbox(tell: (saving: PlayerState['saving']) => void): () => void
  /** The highest `seq` that the server has of an attempt, at every answer: other devices' events count too. */
  watchSeq(tell: (attemptId: string, highestSeq: number) => void): () => void
  stayAwake(on: boolean): void
}
