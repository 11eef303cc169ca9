/**
 * The player's store: one per mounted player, all of the browser handed in. Class time comes from dated
 * facts and a clock that never goes back; what must survive a reload is kept before it is shown as done.
 */
import { createStore, type StoreApi } from 'zustand'
import type { PlayerData } from '@/server/contract/classes'
import { AS_PLANNED } from '@/server/engine/spec/names'
import type { ClassEvent } from '@/server/engine/tally/events'
import { fold } from '@/server/engine/tally/fold'
import {
  afterGap,
  apply,
  marksAhead,
  newRun,
  positionAt,
  runFromEvents,
} from '@/server/engine/timeline/run'
import {
  GAP_MS,
  type Command,
  type EventDraft,
  type Run,
  type RunSettings,
} from '@/server/engine/timeline/run-types'
import { markText } from './mark-text'
import type { Claim, KeptAlive, KeptAttempt, PlayerPorts } from './ports'
import { createRunClock } from './run-clock'
import { createRunner } from './runner'
import { createSpeaker } from './speaker'
import type { PlayerPreferences, PlayerState, PlayerStore, StationKey } from './types'

export const DEFAULT_PREFERENCES: PlayerPreferences = {
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

const ALIVE_EVERY_MS = 1_000
/** What the live cue timeline looks ahead. */
const CUE_LINE_MS = 60_000
/** An attempt older than this is history, not a class to go on with. */
const OFFER_WITHIN_MS = 18 * 3_600_000
/** A reload this soon after the end comes back to the rating that is still missing. */
const RATE_WITHIN_MS = 30 * 60_000
/** A browser whose storage does not answer must not hold a logged round back from the screen. */
const SHOW_AFTER_MS = 2_000

const CLOCK_CHANGED = 'The computer’s clock was changed. The class goes on as it was.'
const VOICE_SAMPLE = 'Half-way. Shoulders down, and breathe out as you stand up.'
const NOT_KEPT = 'This browser keeps nothing: leave the page open until everything is saved.'

export interface Player {
  store: StoreApi<PlayerStore>
  /** Reads what was kept and begins to listen. */
  open(): Promise<void>
  close(): void
}

/** An attempt that was begun and may be gone on with. */
interface OpenAttempt {
  attempt: KeptAttempt
  alive: KeptAlive | null
  /** How long ago its last sign of life was when it was read, at `readAtMs` of the run's clock; null: unknown. */
  agoMs: number | null
  readAtMs: number
}

/** A player for `data`, closed at first. */
export function createPlayer(data: PlayerData, ports: PlayerPorts): Player {
  const { memory } = ports
  const clock = createRunClock(ports)
  const runner = createRunner(data.version, ports.sound, clock)
  const speaker = createSpeaker(data.version, ports.voice, (caption) => set({ caption }))
  const unwatch: (() => void)[] = []
  let seq = 0
  let claim: Claim | null = null
  let endTick: (() => void) | null = null
  let lastAliveMs = -Infinity
  let open: OpenAttempt | null = null
  let isClosed = false
  /** Writes go one after another: no event is ever there without its attempt. */
  let writing: Promise<void> = Promise.resolve()
  let countToCallOff: (() => void)[] = []

  const settings = (): RunSettings => {
    const { waitAtBriefs, changeExtraSeconds } = store.getState().preferences
    return { waitAtBriefs, changeExtraMs: changeExtraSeconds * 1_000 }
  }

  const store = createStore<PlayerStore>()((set, get) => ({
    data,
    preferences: DEFAULT_PREFERENCES,
    stage: 'loading',
    gap: null,
    attemptId: null,
    run: null,
    position: null,
    positionAtMs: 0,
    tally: null,
    events: [],
    options: fittedOptions(data),
    cueLine: [],
    due: null,
    notice: null,
    saving: { state: 'saved', unsent: 0, message: null },
    sound: 'blocked',
    voices: [],
    caption: null,
    otherTab: false,

    setPreferences(change) {
      const preferences = { ...get().preferences, ...change }
      set({ preferences })
      configureSound(preferences)
      memory.keepPreferences(data.membershipId, preferences).catch(() => undefined)
    },
    setVolume(volume) {
      get().setPreferences({ soundVolume: volume })
    },
    chooseStartOption(key, option) {
      set({ options: { ...get().options, [key]: option } })
    },
    unlockSound() {
      void ports.sound.unlock()
    },
    playCount() {
      // The first press on a page is what lets sound begin: the count waits for that.
      void ports.sound.unlock().then(() => {
        if (isClosed) return
        for (const callOff of countToCallOff) callOff()
        const from = ports.now() + 300
        const beats = (['knock', 'knock', 'knock', 'bell'] as const).map((name, beat) =>
          ports.sound.schedule(name, from + beat * 1_000),
        )
        countToCallOff = beats.filter((callOff) => callOff !== null)
      })
    },

    tryVoice() {
      void ports.sound.unlock()
      set({ caption: VOICE_SAMPLE })
      const clear = () => {
        if (!isClosed && get().caption === VOICE_SAMPLE) set({ caption: null })
      }
      if (!ports.voice.say(VOICE_SAMPLE, 1, clear)) clear()
    },

    start(todayNote) {
      if (get().stage !== 'before') return
      wakeUp()
      const attempt: KeptAttempt = {
        attemptId: ports.newId(),
        membershipId: data.membershipId,
        scheduledClassId: data.scheduledClass.scheduledClassId,
        versionId: data.versionId,
        todayNote,
        settings: settings(),
        options: get().options,
        startedWallMs: ports.wall(),
        over: null,
      }
      open = { attempt, alive: null, agoMs: 0, readAtMs: clock.now() }
      seq = 0
      set({ attemptId: attempt.attemptId, events: [], stage: 'class' })
      void write(() => memory.keepAttempt(attempt))
      beginRun(newRun(data.version, data.versionId, attempt.settings))
      get().send({
        type: 'start',
        versionId: data.versionId,
        counting: get().preferences.counting,
        options: startOptions(data, get().options),
      })
      void claimAttempt(attempt.attemptId, false)
    },

    send(command) {
      const { run, otherTab } = get()
      if (!run || otherTab) return
      const now = clock.now()
      // What fell due up to now belongs to the run as it was.
      if (get().stage === 'class') runner.sound(run, now)
      runner.due(run, now)
      const applied = apply(run, command, now)
      if (applied.refused !== null) {
        set({ notice: { text: applied.refused, atMs: now } })
        return
      }
      if (applied.run === run && applied.events.length === 0) return
      runner.changed(now)
      set({ run: applied.run, notice: null })
      if (command.type === 'choose-option') {
        const key: StationKey = `${command.block}/${command.station}`
        set({ options: { ...get().options, [key]: command.option } })
      }
      for (const effect of applied.effects) ports.sound.schedule(effect.sound, ports.now())
      record(applied.events)
      refresh(now)
      if (get().stage === 'class') speak(now)
      keepAlive(true)
    },

    resumeOpenAttempt() {
      if (get().stage !== 'resume' || !open) return
      wakeUp()
      void carryOn(open)
    },
    discardOpenAttempt() {
      if (get().stage !== 'resume' || !open) return
      const left = open
      void claimAttempt(left.attempt.attemptId, false).then(() => {
        if (isClosed || get().otherTab) return
        // It is ended where it was left, so that neither board nor server takes it for a class in progress.
        const { run, events } = runFromKept(left)
        record(events)
        record(apply(run, { type: 'end-class' }, clock.now()).events)
        markOver(left, 'discarded')
        open = null
        set({ stage: 'before', attemptId: null, events: [], tally: null })
      })
    },
    goOn(from) {
      if (get().stage !== 'gap') return
      wakeUp()
      set({ stage: 'class', gap: null })
      get().send({ type: 'resume', from })
    },
    takeOver() {
      const { attemptId } = get()
      if (!attemptId) return
      wakeUp()
      void claimAttempt(attemptId, true).then(async () => {
        await writing
        await readKept()
        if (isClosed) return
        set({ otherTab: false })
        if (open) reload(open)
      })
    },
  }))

  const { setState: set, getState: get } = store
  let foldedFor: readonly ClassEvent[] | null = null

  function configureSound(preferences: PlayerPreferences): void {
    ports.sound.configure(preferences.soundVolume, preferences.soundOn)
    ports.voice.configure({
      on: preferences.voiceOn,
      voice: preferences.voice,
      rate: preferences.voiceRate,
      volume: preferences.voiceVolume,
    })
  }

  function speak(now: number): void {
    const { run, position } = get()
    if (run && position) speaker.tick(run, position, now)
  }

  function silence(): void {
    runner.silence()
    speaker.silence()
  }

  function wakeUp(): void {
    void ports.sound.unlock()
    ports.stayAwake(true)
  }

  async function carryOn(kept: OpenAttempt): Promise<void> {
    await claimAttempt(kept.attempt.attemptId, false)
    if (!isClosed && !get().otherTab) reload(kept)
  }

  function runFromKept({ attempt, alive, agoMs, readAtMs }: OpenAttempt) {
    const now = clock.now()
    return runFromEvents(
      data.version,
      data.versionId,
      attempt.settings,
      get().events,
      now,
      alive && agoMs !== null ? { agoMs: agoMs + now - readAtMs, place: alive.place } : null,
    )
  }

  /** Carries on where a kept attempt was: at once after a short gap, else as a question. */
  function reload(kept: OpenAttempt): void {
    const reloaded = runFromKept(kept)
    set({ attemptId: kept.attempt.attemptId })
    beginRun(reloaded.run)
    record(reloaded.events)
    const awayMs = reloaded.gap?.agoMs ?? null
    set({
      stage: awayMs === null ? 'class' : 'gap',
      gap: awayMs === null ? null : { awayMs, reason: 'away' },
    })
    refresh(clock.now())
    if (kept.attempt.over === 'ended') get().send({ type: 'end-class' })
  }

  function beginRun(run: Run): void {
    const now = clock.now()
    clock.restart()
    runner.begin(now)
    speaker.begin(now)
    set({ run, position: positionAt(run, now), positionAtMs: clock.toMonotonic(now) })
    endTick ??= ports.tick(tick)
  }

  /** Stamps and keeps events, then shows them in the tally. */
  function record(drafts: readonly EventDraft[]): void {
    const { attemptId } = get()
    if (drafts.length === 0 || !attemptId) return
    const wallMs = ports.wall()
    const events = drafts.map((draft): ClassEvent => {
      seq += 1
      return { ...draft, id: ports.newId(), device: ports.device, seq, wallMs }
    })
    const { saving } = get()
    if (saving.state !== 'not-kept') {
      set({ saving: { ...saving, state: 'sending', unsent: saving.unsent + events.length } })
    }
    const kept = write(() =>
      memory.keepEvents(
        events.map((event) => ({
          attemptId,
          membershipId: data.membershipId,
          event,
          sent: false,
        })),
      ),
    )
    const show = () => {
      if (isClosed || get().attemptId !== attemptId) return
      const known = new Set(get().events.map((event) => event.id))
      const fresh = events.filter((event) => !known.has(event.id))
      if (fresh.length === 0) return
      set({ events: [...get().events, ...fresh] })
      refresh(clock.now())
    }
    void soonOr(kept, SHOW_AFTER_MS).then(show)
    void kept.then(() => ports.kickOutbox())
    const isOver = events.some((event) => event.type === 'finished' || event.type === 'rated')
    if (isOver && open && open.attempt.over === null) markOver(open, 'ended')
  }

  function markOver(kept: OpenAttempt, over: 'ended' | 'discarded'): void {
    kept.attempt = { ...kept.attempt, over }
    const { attempt } = kept
    void write(() => memory.keepAttempt(attempt))
  }

  function write(work: () => Promise<void>): Promise<void> {
    writing = writing.then(work).catch(() => {
      set({ saving: { ...get().saving, state: 'not-kept', message: NOT_KEPT } })
    })
    return writing
  }

  function keepAlive(atOnce: boolean): void {
    const { attemptId, position } = get()
    const now = ports.now()
    if (!attemptId || !position || (!atOnce && now - lastAliveMs < ALIVE_EVERY_MS)) return
    lastAliveMs = now
    memory
      .keepAlive({ attemptId, place: position.place, wallMs: ports.wall() })
      .catch(() => undefined)
  }

  function tick(): void {
    const { run, stage, otherTab } = get()
    if (!run || otherTab || isClosed) return
    const wake = clock.wake()
    const now = clock.now()
    if (wake.type === 'clock-changed') set({ notice: { text: CLOCK_CHANGED, atMs: now } })
    if (wake.type === 'gap' && stage === 'class') {
      const away = afterGap(run, wake.lastAliveMs, now)
      if (away.gap) {
        silence()
        set({ run: away.run, stage: 'gap', gap: { awayMs: wake.awayMs, reason: wake.reason } })
        record(away.events)
        refresh(now)
        return
      }
    }
    refresh(now)
    const { owed } = get().position ?? { owed: null }
    if (owed) get().send(owed)
    const { run: current, stage: after } = get()
    if (current && after === 'class') {
      runner.sound(current, now)
      speak(now)
    }
    keepAlive(false)
  }

  /** What is shown: position, cues to come, the one that is due, the tally when events came. */
  function refresh(now: number): void {
    const { run, events } = get()
    if (!run) return
    const patch: Partial<PlayerState> = {
      position: positionAt(run, now),
      positionAtMs: clock.toMonotonic(now),
    }
    patch.cueLine = marksAhead(run, now, CUE_LINE_MS).flatMap((mark) => {
      const text = markText(data.version, run.timeline.segments, mark)
      return text === null ? [] : [{ mark, text, dueInMs: mark.dueAtMs - now }]
    })
    patch.due = runner.due(run, now)
    if (foldedFor !== events) {
      foldedFor = events
      patch.tally = fold(data.version, events)
    }
    if (run.ended && get().stage === 'class') {
      speaker.silence()
      patch.stage = 'after'
      if (open && open.attempt.over === null) markOver(open, 'ended')
      ports.stayAwake(false)
      endTick?.()
      endTick = null
    }
    set(patch)
  }

  async function claimAttempt(attemptId: string, take: boolean): Promise<void> {
    claim?.release()
    claim = null
    const got = await ports.claims.claim(attemptId, take, () => {
      claim = null
      leaveToOther()
    })
    if (isClosed) {
      got?.release()
      return
    }
    claim = got
    if (!got) leaveToOther()
  }

  function leaveToOther(): void {
    if (isClosed) return
    silence()
    ports.stayAwake(false)
    set({ otherTab: true })
  }

  /** What this browser, or else the server, knows of a class begun and not done. */
  async function readKept(): Promise<void> {
    open = null
    const kept = await memory
      .latestAttempt(data.membershipId, data.scheduledClass.scheduledClassId)
      .catch(() => null)
    if (kept && kept.versionId === data.versionId && (await readOwn(kept))) return
    await readElsewhere()
  }

  /** True where it is to be gone on with, or still to be rated. */
  async function readOwn(kept: KeptAttempt): Promise<boolean> {
    if (kept.over === 'discarded' || ports.wall() - kept.startedWallMs > OFFER_WITHIN_MS) {
      return false
    }
    const own = (await memory.events(kept.attemptId).catch(() => [])).map((one) => one.event)
    const alive = await memory.alive(kept.attemptId).catch(() => null)
    const agoMs = alive ? ports.wall() - alive.wallMs : null
    const isRated = own.some((event) => event.type === 'rated')
    if (kept.over === 'ended' && (isRated || agoMs === null || agoMs > RATE_WITHIN_MS)) {
      return false
    }
    const known = new Set(own.map((event) => event.id))
    const others =
      data.openAttempt?.attemptId === kept.attemptId
        ? data.openAttempt.events.filter((event) => !known.has(event.id))
        : []
    open = { attempt: kept, alive, agoMs, readAtMs: clock.now() }
    restore(kept, [...own, ...others])
    return true
  }

  /** An attempt that was begun on another device, or whose copy here is gone. */
  async function readElsewhere(): Promise<void> {
    const elsewhere = data.openAttempt
    if (!elsewhere || elsewhere.events.length === 0) return
    if ((await memory.attempt(elsewhere.attemptId).catch(() => null))?.over) return
    const started = elsewhere.events.find((event) => event.type === 'started')
    const lastWallMs = Math.max(...elsewhere.events.map((event) => event.wallMs))
    if (ports.wall() - lastWallMs > OFFER_WITHIN_MS) return
    const attempt: KeptAttempt = {
      attemptId: elsewhere.attemptId,
      membershipId: data.membershipId,
      scheduledClassId: data.scheduledClass.scheduledClassId,
      versionId: data.versionId,
      todayNote: null,
      settings: settings(),
      options: Object.fromEntries(
        (started?.options ?? []).map((one) => [`${one.block}/${one.station}`, one.option]),
      ),
      startedWallMs: started?.wallMs ?? lastWallMs,
      over: null,
    }
    await write(() => memory.keepAttempt(attempt))
    await write(() =>
      memory.keepEvents(
        elsewhere.events.map((event) => ({
          attemptId: attempt.attemptId,
          membershipId: data.membershipId,
          event,
          sent: true,
        })),
      ),
    )
    open = { attempt, alive: null, agoMs: null, readAtMs: clock.now() }
    restore(attempt, elsewhere.events)
  }

  function restore(attempt: KeptAttempt, events: ClassEvent[]): void {
    seq = events.reduce((highest, event) => Math.max(highest, event.seq), 0)
    foldedFor = events
    const tally = fold(data.version, events)
    const chosen = Object.fromEntries(
      events
        .filter((event) => event.type === 'option-chosen')
        .sort((one, other) => one.seq - other.seq)
        .map((event) => [`${event.block}/${event.station}`, event.option]),
    )
    set({
      events,
      attemptId: attempt.attemptId,
      options: { ...get().options, ...attempt.options, ...chosen },
      tally,
    })
  }

  return {
    store,
    async open() {
      const preferences = await memory.preferences(data.membershipId).catch(() => null)
      if (isClosed) return
      set({ preferences: { ...DEFAULT_PREFERENCES, ...ports.usualScreen, ...preferences } })
      configureSound(get().preferences)
      unwatch.push(ports.voice.watch((voices) => set({ voices })))
      unwatch.push(ports.sound.watch((state) => set({ sound: state })))
      unwatch.push(
        ports.watchOutbox((saving) => {
          const isLost = !memory.isDurable && saving.unsent > 0
          set({ saving: isLost ? { ...saving, state: 'not-kept', message: NOT_KEPT } : saving })
        }),
      )
      unwatch.push(
        ports.watchSeq((attemptId, highestSeq) => {
          if (attemptId === get().attemptId) seq = Math.max(seq, highestSeq)
        }),
      )
      await readKept()
      if (isClosed) return
      ports.kickOutbox()
      if (!open) set({ stage: 'before' })
      // A stopped class stands still on its own screen, one that ended on its rating: nothing to ask first.
      else if (
        open.attempt.over === 'ended' ||
        get().tally?.state === 'stopped' ||
        (open.agoMs !== null && open.agoMs >= 0 && open.agoMs <= GAP_MS)
      ) {
        ports.stayAwake(true)
        await carryOn(open)
      } else set({ stage: 'resume' })
    },
    close() {
      isClosed = true
      endTick?.()
      endTick = null
      for (const end of unwatch) end()
      silence()
      for (const callOff of countToCallOff) callOff()
      claim?.release()
      ports.stayAwake(false)
      ports.sound.close()
      ports.voice.close()
    },
  }
}

/** Settles with `work`, or after `ms` without it. */
function soonOr(work: Promise<void>, ms: number): Promise<void> {
  return new Promise((resolve) => {
    const timer = setTimeout(resolve, ms)
    void work.then(() => {
      clearTimeout(timer)
      resolve()
    })
  })
}

type StartOptions = Extract<Command, { type: 'start' }>['options']

/** Options that the class is fitted with, by station; those as planned are not among them. */
function fittedOptions(data: PlayerData): Record<StationKey, string> {
  return Object.fromEntries(
    data.fitted
      .filter((one) => one.option !== AS_PLANNED)
      .map((one) => [`${one.block}/${one.station}`, one.option]),
  )
}

function startOptions(data: PlayerData, chosen: Record<StationKey, string>): StartOptions {
  const fitted = new Map(data.fitted.map((one) => [`${one.block}/${one.station}`, one]))
  return data.version.spec.blocks.flatMap((block) =>
    block.format.type === 'rest'
      ? []
      : block.format.stations.map((_, station) => {
          const key: StationKey = `${block.id}/${station}`
          const option = chosen[key] ?? AS_PLANNED
          const own = fitted.get(key)
          // What nobody touched is the coach's, as planned or by their rule.
          const isCoachs = own === undefined || own.from === 'planned' || own.from === 'coach'
          const isUntouched = option === (own?.option ?? AS_PLANNED)
          const from = !isUntouched ? 'chosen' : isCoachs ? 'coach' : 'fitted'
          return { block: block.id, station, option, from } as const
        }),
  )
}
