/**
 * A player's store for component tests: the real engine and fold on a clock that the test sets, no
 * browser rim. Every command is kept in `sent`.
 */
import { createStore, type StoreApi } from 'zustand'
import type { PlayerPreferences, PlayerStore, StationKey } from '@/hooks/player/types'
import type { PlayerData } from '@/server/contract/classes'
import { fold } from '@/server/engine/tally/fold'
import type { ClassEvent } from '@/server/engine/tally/events'
import { apply, marksAhead, newRun, positionAt } from '@/server/engine/timeline/run'
import type { Command, EventDraft, PlacedMark, Run } from '@/server/engine/timeline/run-types'
import { playerFixture } from './player-fixture'

export const FAKE_PREFERENCES: PlayerPreferences = {
  counting: 'press',
  leadLogs: true,
  waitAtBriefs: false,
  changeExtraSeconds: 0,
  screenDiagonalInches: 14,
  distanceMetres: 2,
  soundVolume: 0.8,
  soundOn: true,
  voiceOn: true,
  voice: null,
  voiceRate: 1,
  voiceVolume: 0.9,
  lettersOn: true,
  keepHallDark: false,
}

export interface FakePlayer {
  store: StoreApi<PlayerStore>
  /** Every command that a screen sent, in order. */
  sent: Command[]
  /** Names of the other actions that were called. */
  called: string[]
  /** Moves the clock to `ms` and works out position, cues and tally anew. */
  setClock(ms: number): void
  clock(): number
}

export function fakePlayer(
  options: {
    data?: Partial<PlayerData>
    preferences?: Partial<PlayerPreferences>
    state?: Partial<PlayerStore>
    /** Started, with the clock at this many milliseconds of run time. */
    startedAtMs?: number
  } = {},
): FakePlayer {
  const data = playerFixture(options.data)
  const preferences = { ...FAKE_PREFERENCES, ...options.preferences }
  const sent: Command[] = []
  const called: string[] = []
  let nowMs = 0
  let run: Run = newRun(data.version, data.versionId, {
    waitAtBriefs: preferences.waitAtBriefs,
    changeExtraMs: preferences.changeExtraSeconds * 1000,
  })
  let events: ClassEvent[] = []
  let chosen: Record<StationKey, string> = {}

  const stamp = (drafts: EventDraft[]) => {
    events = [
      ...events,
      ...drafts.map(
        (draft, index) =>
          ({
            ...draft,
            id: `fake-${events.length + index}`,
            device: 'fake',
            seq: events.length + index + 1,
            wallMs: nowMs,
          }) as ClassEvent,
      ),
    ]
  }
  const textOf = (mark: PlacedMark): string | null => {
    if (mark.what === 'call') {
      return mark.half ? 'Half-way' : mark.left === 60 ? '1 minute' : `${mark.left} seconds`
    }
    if (mark.what === 'next') return 'Next'
    if (mark.what !== 'cue') return null
    const block = data.version.spec.blocks.find((each) => each.id === mark.block)
    return block?.cues?.find((each) => each.id === mark.id)?.text ?? null
  }
  const work = (): Partial<PlayerStore> => {
    const position = positionAt(run, nowMs)
    const lines = marksAhead(run, nowMs, 60_000).flatMap((mark) => {
      const text = textOf(mark)
      return text === null ? [] : [{ mark, text, dueInMs: mark.dueAtMs - nowMs }]
    })
    return {
      run,
      events,
      options: chosen,
      position,
      positionAtMs: performance.now(),
      tally: fold(data.version, events),
      cueLine: lines,
    }
  }
  const send = (command: Command) => {
    sent.push(command)
    const applied = apply(run, command, nowMs)
    run = applied.run
    stamp(applied.events)
    if (command.type === 'choose-option') {
      chosen = { ...chosen, [`${command.block}/${command.station}`]: command.option }
    }
    store.setState({
      ...work(),
      notice: applied.refused ? { text: applied.refused, atMs: nowMs } : store.getState().notice,
    })
  }
  const note =
    (name: string) =>
    (...values: unknown[]) => {
      called.push([name, ...values.filter((value) => typeof value === 'string')].join(' '))
    }

  const store = createStore<PlayerStore>()((set) => ({
    data,
    preferences,
    stage: 'before',
    gap: null,
    attemptId: null,
    run: null,
    position: null,
    positionAtMs: 0,
    tally: null,
    events: [],
    options: chosen,
    cueLine: [],
    due: null,
    notice: null,
    saving: { state: 'saved', unsent: 0, message: null },
    sound: 'ready',
    voices: [{ id: 'anna', name: 'Anna', language: 'en' }],
    caption: null,
    otherTab: false,
    setPreferences: (change) =>
      set((state) => ({ preferences: { ...state.preferences, ...change } })),
    chooseStartOption: (key, option) => {
      chosen = { ...chosen, [key]: option }
      set({ options: chosen })
    },
    start: note('start'),
    send,
    resumeOpenAttempt: note('resumeOpenAttempt'),
    discardOpenAttempt: note('discardOpenAttempt'),
    goOn: note('goOn'),
    takeOver: note('takeOver'),
    playCount: note('playCount'),
    tryVoice: note('tryVoice'),
    unlockSound: note('unlockSound'),
    setVolume: (soundVolume) =>
      set((state) => ({ preferences: { ...state.preferences, soundVolume } })),
    ...options.state,
  }))
  if (options.startedAtMs !== undefined) {
    send({
      type: 'start',
      versionId: data.versionId,
      counting: preferences.counting,
      options: [],
    })
    sent.length = 0
    nowMs = options.startedAtMs
    store.setState({ stage: 'class', ...work(), ...options.state })
  }
  return {
    store,
    sent,
    called,
    setClock: (ms) => {
      nowMs = ms
      store.setState(work())
    },
    clock: () => nowMs,
  }
}
