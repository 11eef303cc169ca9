/**
 * The player's store: one per mounted player, all of the browser handed in. Class time comes from dated
 * facts and a clock that never goes back; what must survive a reload is kept before it is shown.
 */
import { createStore, type StoreApi } from 'zustand'
import type { PlayerData } from '@/server/contract/classes'
import { optionsForHolds } from '@/server/engine/fit/hurt'
import { AS_PLANNED } from '@/server/engine/spec/movement'
import type { ClassEvent } from '@/server/engine/tally/events'
import { fold } from '@/server/engine/tally/fold'
import {
  afterGap,
  apply,
  marksAhead,
  marksBetween,
  newRun,
  positionAt,
  runFromEvents,
} from '@/server/engine/timeline/run'
import {
  GAP_MS,
  type Command,
  type DueMark,
  type EventDraft,
  type Run,
  type RunSettings,
} from '@/server/engine/timeline/run-types'
import { markSound, markText } from './mark-text'
import type { Claim, KeptAttempt, PlayerPorts } from './ports'
import type { PlayerPreferences, PlayerState, PlayerStore, StationKey } from './types'

export const DEFAULT_PREFERENCES: PlayerPreferences = {
  counting: 'press',
  waitAtBriefs: false,
  changeExtraSeconds: 0,
  screenDiagonalInches: 14,
  distanceMetres: 2,
  soundVolume: 0.8,
  soundOn: true,
  lettersOn: true,
  keepHallDark: false,
}

/** How far ahead sounds are put on the audio clock; the ticker wakes several times within it. */
const LOOK_AHEAD_MS = 200
/** A mark later than this is dropped, never bunched with the next. */
const TOO_LATE_MS = 250
const ALIVE_EVERY_MS = 1_000
/** What the live cue timeline looks ahead. */
const CUE_LINE_MS = 60_000
/** Clocks of computers are set right by a second or so now and then; that is nothing to speak of. */
const CLOCK_SLACK_MS = 2_000
/** An attempt older than this is history, not a class to go on with. */
const OFFER_WITHIN_MS = 18 * 3_600_000

const CLOCK_CHANGED = 'The computer’s clock was changed. The class goes on as it was.'
const NOT_KEPT = 'This browser keeps nothing: leave the page open until everything is saved.'

export interface Player {
  store: StoreApi<PlayerStore>
  /** Reads what was kept and begins to listen. */
  open(): Promise<void>
  close(): void
}

/** A player for `data`, closed at first. */
export function createPlayer(data: PlayerData, ports: PlayerPorts): Player {
  const { memory } = ports
  /** Added to the monotonic clock, which stands still while some computers sleep. */
  let asleepMs = 0
  let seq = 0
  let claim: Claim | null = null
  let endTick: (() => void) | null = null
  const unwatch: (() => void)[] = []
  let lastTick: { nowMs: number; wallMs: number } | null = null
  let askedToMs = 0
  let shownToMs = 0
  let lastAliveMs = -Infinity
  let open: KeptAttempt | null = null
  let openAgoMs: number | null = null
  let foldedFor: readonly ClassEvent[] | null = null
  let isClosed = false
  const sounded = new Map<string, { dueAtMs: number; callOff: () => void }>()

  const clock = () => Math.round(ports.now()) + asleepMs
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
    tally: null,
    events: [],
    options: heldOptions(data),
    cueLine: [],
    due: null,
    notice: null,
    saving: { state: 'saved', unsent: 0, message: null },
    sound: 'blocked',
    otherTab: false,

    setPreferences(change) {
      const preferences = { ...get().preferences, ...change }
      set({ preferences })
      ports.sound.configure(preferences.soundVolume, preferences.soundOn)
      memory.keepPreferences(data.membershipId, preferences).catch(() => undefined)
    },
    setVolume(volume) {
      get().setPreferences({ soundVolume: volume })
    },
    chooseStartOption(key, option) {
      set({ options: { ...get().options, [key]: option } })
    },
    unlockSound: () => ports.sound.unlock(),
    playCount() {
      ports.sound.unlock()
      const from = ports.now() + 400
      for (let beat = 0; beat < 3; beat += 1) ports.sound.schedule('knock', from + beat * 1_000)
      ports.sound.schedule('bell', from + 3_000)
    },

    start(todayNote) {
      if (get().stage !== 'before') return
      ports.sound.unlock()
      ports.stayAwake(true)
      const attempt: KeptAttempt = {
        attemptId: ports.newId(),
        membershipId: data.membershipId,
        scheduledClassId: data.scheduledClass.scheduledClassId,
        versionId: data.versionId,
        todayNote,
        settings: settings(),
        options: get().options,
        startedWallMs: ports.wall(),
        over: false,
      }
      open = attempt
      seq = 0
      set({ attemptId: attempt.attemptId, events: [], stage: 'class' })
      void keep(() => memory.keepAttempt(attempt))
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
      const now = clock()
      const applied = apply(run, command, now)
      if (applied.refused !== null) {
        set({ notice: { text: applied.refused, atMs: now } })
        return
      }
      if (applied.run === run && applied.events.length === 0) return
      callOffAfter(now)
      askedToMs = now
      set({ run: applied.run, notice: null })
      if (command.type === 'choose-option') {
        const key: StationKey = `${command.block}/${command.station}`
        set({ options: { ...get().options, [key]: command.option } })
      }
      record(applied.events)
      for (const effect of applied.effects) {
        ports.sound.schedule(effect.sound, ports.now())
      }
      refresh(now)
    },

    resumeOpenAttempt() {
      if (get().stage !== 'resume' || !open) return
      ports.sound.unlock()
      ports.stayAwake(true)
      void claimAttempt(open.attemptId, false)
      reload(openAgoMs)
    },
    discardOpenAttempt() {
      if (get().stage !== 'resume' || !open) return
      void keep(() => memory.keepAttempt({ ...open!, over: true }))
      open = null
      set({ stage: 'before', attemptId: null, events: [], tally: null, run: null, position: null })
    },
    goOn(from) {
      if (get().stage !== 'gap') return
      ports.sound.unlock()
      ports.stayAwake(true)
      set({ stage: 'class', gap: null })
      get().send({ type: 'resume', from })
    },
    takeOver() {
      const { attemptId } = get()
      if (!attemptId) return
      void claimAttempt(attemptId, true).then(async () => {
        if (isClosed) return
        set({ otherTab: false })
        await readKept()
        if (open) reload(openAgoMs)
      })
    },
  }))

  const { setState: set, getState: get } = store

  /** Carries on where a kept attempt was: at once after a short gap, else as a question. */
  function reload(agoMs: number | null): void {
    if (!open) return
    const events = get().events
    const now = clock()
    const reloaded = runFromEvents(
      data.version,
      data.versionId,
      open.settings,
      events,
      now,
      keptAlive && agoMs !== null ? { agoMs, place: keptAlive.place } : null,
    )
    set({ attemptId: open.attemptId })
    beginRun(reloaded.run)
    record(reloaded.events)
    const left = reloaded.run.timeline.lengthMs - (positionAt(reloaded.run, now).classMs ?? 0)
    const asks = reloaded.gap !== null && reloaded.gap.agoMs !== null && reloaded.gap.agoMs < left
    set({
      stage: asks ? 'gap' : 'class',
      gap: asks ? { awayMs: reloaded.gap?.agoMs ?? 0, reason: 'away' } : null,
    })
    refresh(now)
  }

  let keptAlive: { place: KeptPlace; wallMs: number } | null = null

  function beginRun(run: Run): void {
    const now = clock()
    sounded.clear()
    askedToMs = now
    shownToMs = now
    lastTick = { nowMs: ports.now(), wallMs: ports.wall() }
    set({ run, position: positionAt(run, now) })
    endTick ??= ports.tick(tick)
  }

  function record(drafts: readonly EventDraft[]): void {
    const { attemptId } = get()
    if (drafts.length === 0 || !attemptId) return
    const wallMs = ports.wall()
    const events = drafts.map((draft): ClassEvent => {
      seq += 1
      return { ...draft, id: ports.newId(), device: ports.device, seq, wallMs } as ClassEvent
    })
    set({ events: [...get().events, ...events] })
    const kept = events.map((event) => ({
      attemptId,
      membershipId: data.membershipId,
      event,
      sent: false,
    }))
    void keep(() => memory.keepEvents(kept)).then(() => ports.kickOutbox())
    if (events.some((event) => event.type === 'finished') && open) {
      const over = { ...open, over: true }
      open = over
      void keep(() => memory.keepAttempt(over))
    }
    alive(true)
  }

  async function keep(write: () => Promise<void>): Promise<void> {
    try {
      await write()
    } catch {
      set({ saving: { ...get().saving, state: 'not-kept', message: NOT_KEPT } })
    }
  }

  function alive(atOnce: boolean): void {
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
    const nowMs = ports.now()
    const wallMs = ports.wall()
    const before = lastTick ?? { nowMs, wallMs }
    lastTick = { nowMs, wallMs }
    const awayMs = nowMs - before.nowMs
    const driftMs = wallMs - before.wallMs - awayMs
    if (driftMs > GAP_MS) {
      // Asleep with a clock that stood, or the clock was set on: they cannot be told apart, so ask.
      asleepMs += driftMs
      if (
        stage === 'class' &&
        awoke(before.nowMs + asleepMs - driftMs, awayMs + driftMs, 'clock-changed')
      )
        return
    } else if (Math.abs(driftMs) > CLOCK_SLACK_MS) {
      set({ notice: { text: CLOCK_CHANGED, atMs: clock() } })
    }
    if (awayMs > GAP_MS && stage === 'class') {
      if (awoke(before.nowMs + asleepMs, awayMs, 'away')) return
    }
    const now = clock()
    refresh(now)
    const { owed } = get().position ?? { owed: null }
    if (owed) get().send(owed)
    sound(now)
    alive(false)
  }

  /** After a gap: true where it is a pause and the member is asked. */
  function awoke(lastAliveAtMs: number, awayMs: number, reason: 'away' | 'clock-changed'): boolean {
    const { run } = get()
    if (!run) return false
    const reloaded = afterGap(run, lastAliveAtMs, clock())
    if (!reloaded.gap) return false
    callOffAfter(-Infinity)
    set({ run: reloaded.run, stage: 'gap', gap: { awayMs, reason } })
    record(reloaded.events)
    refresh(clock())
    return true
  }

  function callOffAfter(atMs: number): void {
    for (const [key, one] of sounded) {
      if (one.dueAtMs <= atMs) continue
      one.callOff()
      sounded.delete(key)
    }
  }

  /** Puts what falls due within the look-ahead on the audio clock, each mark once. */
  function sound(now: number): void {
    const { run, stage } = get()
    if (!run || stage !== 'class') return
    const toMs = now + LOOK_AHEAD_MS
    for (const mark of marksBetween(run, askedToMs, toMs)) {
      const name = markSound(mark)
      if (!name || sounded.has(mark.key)) continue
      const isLate = now - mark.dueAtMs > TOO_LATE_MS
      const callOff = isLate ? () => undefined : ports.sound.schedule(name, mark.dueAtMs - asleepMs)
      sounded.set(mark.key, { dueAtMs: mark.dueAtMs, callOff })
    }
    askedToMs = Math.max(askedToMs, toMs)
  }

  /** What is shown: position, cues to come, the one that is due, the tally when events came. */
  function refresh(now: number): void {
    const { run, events } = get()
    if (!run) return
    const position = positionAt(run, now)
    const patch: Partial<PlayerState> = { position }
    patch.cueLine = marksAhead(run, now, CUE_LINE_MS).flatMap((mark) => {
      const text = markText(data.version, mark)
      return text === null ? [] : [{ mark, text, dueInMs: mark.dueAtMs - now }]
    })
    patch.due = dueNow(run, now)
    if (foldedFor !== events) {
      foldedFor = events
      patch.tally = fold(data.version, events)
    }
    if (run.ended && get().stage === 'class') {
      patch.stage = 'after'
      ports.stayAwake(false)
    }
    set(patch)
  }

  let shown: { mark: DueMark; text: string } | null = null
  const IMPORTANCE = { cue: 3, call: 2, next: 1, beep: 0 } as const

  function dueNow(run: Run, now: number): PlayerState['due'] {
    const passed = marksBetween(run, shownToMs, now + 1).flatMap((mark) => {
      const text = markText(data.version, mark)
      return text === null ? [] : [{ mark, text }]
    })
    shownToMs = Math.max(shownToMs, now + 1)
    for (const one of passed) {
      const isLess =
        shown !== null &&
        one.mark.dueAtMs - shown.mark.dueAtMs < 1_000 &&
        IMPORTANCE[one.mark.what] < IMPORTANCE[shown.mark.what]
      if (!isLess) shown = one
    }
    return shown && { ...shown, sinceMs: Math.max(0, now - shown.mark.dueAtMs) }
  }

  async function claimAttempt(attemptId: string, take: boolean): Promise<void> {
    claim?.release()
    claim = null
    const got = await ports.claims.claim(attemptId, take, () => {
      claim = null
      callOffAfter(-Infinity)
      set({ otherTab: true })
    })
    if (isClosed) {
      got?.release()
      return
    }
    claim = got
    if (!got) {
      callOffAfter(-Infinity)
      set({ otherTab: true })
    }
  }

  /** What this browser, or else the server, knows of a class begun and not done. */
  async function readKept(): Promise<void> {
    const kept = await memory
      .latestAttempt(data.membershipId, data.scheduledClass.scheduledClassId)
      .catch(() => null)
    const usable =
      kept &&
      !kept.over &&
      kept.versionId === data.versionId &&
      ports.wall() - kept.startedWallMs < OFFER_WITHIN_MS
    const elsewhere = data.openAttempt
    if (usable) {
      const own = (await memory.events(kept.attemptId).catch(() => [])).map((one) => one.event)
      const known = new Set(own.map((event) => event.id))
      const others =
        elsewhere?.attemptId === kept.attemptId
          ? elsewhere.events.filter((event) => !known.has(event.id))
          : []
      open = kept
      keptAlive = await memory.alive(kept.attemptId).catch(() => null)
      openAgoMs = keptAlive ? ports.wall() - keptAlive.wallMs : null
      restore([...own, ...others], kept.options)
    } else if (elsewhere && elsewhere.events.length > 0) {
      const started = elsewhere.events.find((event) => event.type === 'started')
      const lastWallMs = Math.max(...elsewhere.events.map((event) => event.wallMs))
      if (kept?.attemptId === elsewhere.attemptId && kept.over) return
      if (ports.wall() - lastWallMs > OFFER_WITHIN_MS) return
      open = {
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
        over: false,
      }
      const begun = open
      await keep(() => memory.keepAttempt(begun))
      await keep(() =>
        memory.keepEvents(
          elsewhere.events.map((event) => ({
            attemptId: begun.attemptId,
            membershipId: data.membershipId,
            event,
            sent: true,
          })),
        ),
      )
      keptAlive = null
      openAgoMs = null
      restore(elsewhere.events, begun.options)
    }
  }

  function restore(events: ClassEvent[], options: Record<string, string>): void {
    seq = Math.max(0, ...events.map((event) => event.seq))
    foldedFor = events
    set({
      events,
      attemptId: open?.attemptId ?? null,
      options: { ...get().options, ...options },
      tally: fold(data.version, events),
    })
  }

  return {
    store,
    async open() {
      const preferences = await memory.preferences(data.membershipId).catch(() => null)
      set({ preferences: { ...DEFAULT_PREFERENCES, ...ports.usualScreen, ...preferences } })
      const { soundVolume, soundOn } = get().preferences
      ports.sound.configure(soundVolume, soundOn)
      unwatch.push(ports.sound.watch((state) => set({ sound: state })))
      unwatch.push(
        ports.watchOutbox((saving) => {
          const isLost = !memory.isDurable && saving.unsent > 0
          set({ saving: isLost ? { ...saving, state: 'not-kept', message: NOT_KEPT } : saving })
        }),
      )
      await readKept()
      if (isClosed) return
      const tally = get().tally
      if (!open) set({ stage: 'before' })
      else if (tally?.state === 'stopped') {
        // A class that was stopped is never gone on with unasked.
        set({ stage: 'resume' })
      } else if (openAgoMs !== null && openAgoMs >= 0 && openAgoMs <= GAP_MS) {
        await claimAttempt(open.attemptId, false)
        if (!get().otherTab) reload(openAgoMs)
        ports.stayAwake(true)
      } else set({ stage: 'resume' })
      ports.kickOutbox()
    },
    close() {
      isClosed = true
      endTick?.()
      endTick = null
      for (const end of unwatch) end()
      callOffAfter(-Infinity)
      claim?.release()
      ports.stayAwake(false)
      ports.sound.close()
    },
  }
}

type KeptPlace = NonNullable<Awaited<ReturnType<PlayerPorts['memory']['alive']>>>['place']

/** Options that earlier 'this hurts' hold, by station. */
function heldOptions(data: PlayerData): Record<StationKey, string> {
  const held = data.holds
    .filter((hold) => hold.memberClearedAt === null || hold.coachClearedAt === null)
    .map((hold) => hold.place)
  return Object.fromEntries(
    optionsForHolds(data.version, held).map((one) => [`${one.block}/${one.station}`, one.option]),
  )
}

type StartOptions = Extract<Command, { type: 'start' }>['options']

function startOptions(data: PlayerData, chosen: Record<StationKey, string>): StartOptions {
  const held = heldOptions(data)
  return data.version.spec.blocks.flatMap((block) =>
    block.format.type === 'rest'
      ? []
      : block.format.stations.map((_, station) => {
          const key: StationKey = `${block.id}/${station}`
          const option = chosen[key] ?? AS_PLANNED
          const from =
            held[key] === option ? 'fitted' : chosen[key] === undefined ? 'coach' : 'chosen'
          return { block: block.id, station, option, from } as const
        }),
  )
}
