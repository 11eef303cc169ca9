/** What the player's rim gives its screens. The rim computes, the screens draw. */
import type { PlacedMark, Position, Run, Command } from '@/server/engine/timeline/run-types'
import type { AttemptTally } from '@/server/engine/tally/types'
import type { ClassEvent, Counting } from '@/server/engine/tally/events'
import type { PlayerData } from '@/server/contract/classes'

/** A voice of this computer. */
export interface VoiceChoice {
  id: string
  name: string
  /** BCP 47. */
  language: string
}

/** Chosen before class and kept in the browser for the next one. */
export interface PlayerPreferences {
  counting: Counting
  /** A lead that is joined in class logs the rounds that it completes. */
  leadLogs: boolean
  waitAtBriefs: boolean
  changeExtraSeconds: number
  screenDiagonalInches: number
  distanceMetres: number
  soundVolume: number
  soundOn: boolean
  voiceOn: boolean
  /** Which voice; null: the first of this computer's list. */
  voice: string | null
  voiceRate: number
  voiceVolume: number
  lettersOn: boolean
  keepHallDark: boolean
}

export type StationKey = `${string}/${number}`

export interface PlayerState {
  data: PlayerData
  preferences: PlayerPreferences
  /** `loading` until IndexedDB has answered; `resume`: an open attempt is offered; `gap`: asks where to go on. */
  stage: 'loading' | 'before' | 'resume' | 'class' | 'gap' | 'after'
  gap: { awayMs: number; reason: 'away' | 'clock-changed' } | null
  attemptId: string | null
  run: Run | null
  /** Refreshed several times a second and at every command. */
  position: Position | null
  /** The instant of `position` on the page's own clock (performance.now()): what is painted goes on from it. */
  positionAtMs: number
  tally: AttemptTally | null
  events: ClassEvent[]
  /** option slug per station, as chosen before class or in it. */
  options: Record<StationKey, string>
  /** Marks of the near future and past for the live cue timeline, pending cues placed as they fall due. */
  cueLine: { mark: PlacedMark; text: string; dueInMs: number }[]
  /** The cue or call that is due now, shown large, with how long it has been. */
  due: { mark: PlacedMark; text: string; sinceMs: number } | null
  /** A sentence for the member about the last command ('Logged a second ago: not counted twice'). */
  notice: { text: string; atMs: number } | null
  saving: {
    state: 'saved' | 'saved-here' | 'sending' | 'not-kept'
    unsent: number
    message: string | null
  }
  sound: 'ready' | 'blocked' | 'off' | 'failed'
  /** Voices of this computer; none: captions and sounds go on without. */
  voices: VoiceChoice[]
  /** The caption of what is being said, or would be. */
  caption: string | null
  otherTab: boolean
}

export interface PlayerActions {
  setPreferences(change: Partial<PlayerPreferences>): void
  chooseStartOption(key: StationKey, option: string): void
  start(todayNote: string | null): void
  /** Every command of the engine; the store stamps and stores the events. */
  send(command: Command): void
  resumeOpenAttempt(): void
  discardOpenAttempt(): void
  goOn(from: 'where-i-was' | 'where-the-clock-would-be'): void
  takeOver(): void
  playCount(): void
  /** Says a sentence, to be heard before class. */
  tryVoice(): void
  unlockSound(): void
  setVolume(volume: number): void
}
export type PlayerStore = PlayerState & PlayerActions
