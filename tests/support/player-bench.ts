/**
 * A living room for the player's store: clocks that the test moves, storage that can refuse, a server
 * that can be away, and several tabs of one browser. Everything between is the product's own.
 */
import { IDBFactory } from 'fake-indexeddb'
import { vi } from 'vitest'
import { newId } from '@/hooks/player/ids'
import { indexedMemory, safeMemory } from '@/hooks/player/memory'
import { createOutbox, type Outbox } from '@/hooks/player/outbox'
import type { ClaimPort, PlayerMemory, PlayerPorts } from '@/hooks/player/ports'
import type { SoundName } from '@/server/engine/timeline/mark-sound'
import { createPlayer, type Player } from '@/hooks/player/store'
import type { PlayerState, PlayerStore } from '@/hooks/player/types'
import type { RecordEventsInput } from '@/server/contract/attempts'
import type { PlayerData } from '@/server/contract/classes'
import type { ClassEvent } from '@/server/engine/tally/events'
import { playerFixture } from './player-fixture'

export interface Sounded {
  name: SoundName
  atMs: number
  /** When it was put on the audio clock. */
  askedAtMs: number
  isCalledOff: boolean
}

/** A text that was given to the voice; it is said until `done` is called, or it is cut. */
export interface Said {
  text: string
  level: number
  atMs: number
  cutAtMs: number | null
  done: () => void
}

export interface FakeServer {
  /** Every event that it has, by id. */
  events: Map<string, { attemptId: string; event: ClassEvent }>
  /** Bodies in order of arrival. */
  requests: { attemptId: string; input: RecordEventsInput; keepalive: boolean }[]
  /** What it does with the next requests: a status, no answer, or storing and then no answer. */
  mode: number | 'away' | 'cut-after-commit'
  refuses: (event: ClassEvent) => boolean
  fetch: typeof fetch
}

export function fakeServer(): FakeServer {
  const server: FakeServer = {
    events: new Map(),
    requests: [],
    mode: 200,
    refuses: () => false,
    async fetch(address, init) {
      if (server.mode === 'away') throw new TypeError('Failed to fetch')
      const attemptId = /attempts\/([^/]+)/.exec(String(address))?.[1] ?? ''
      const input = JSON.parse(String(init?.body)) as RecordEventsInput
      server.requests.push({ attemptId, input, keepalive: init?.keepalive ?? false })
      const failed = (status: number) =>
        Response.json({ error: { code: 'internal', message: `It said ${status}.` } }, { status })
      if (typeof server.mode === 'number' && server.mode !== 200) return failed(server.mode)
      if (input.events.some(server.refuses)) return failed(400)
      for (const event of input.events) {
        if (!server.events.has(event.id)) server.events.set(event.id, { attemptId, event })
      }
      if (server.mode === 'cut-after-commit') throw new TypeError('network error')
      const seqs = [...server.events.values()]
        .filter((one) => one.attemptId === attemptId)
        .map((one) => one.event.seq)
      return Response.json({
        stored: input.events.map((event) => event.id),
        highestSeq: Math.max(0, ...seqs),
      })
    },
  }
  return server
}

export interface Tab {
  player: Player
  state(): PlayerStore
  outbox: Outbox
  memory: PlayerMemory
  sounds: Sounded[]
  said: Said[]
  awake: boolean
  /** The tab is gone without a word: nothing of its own runs on. */
  kill(): void
}

export function playerBench(change: Partial<PlayerData> = {}) {
  globalThis.indexedDB = new IDBFactory()
  const data = playerFixture(change)
  const server = fakeServer()
  const tabs: (Tab & { wake: (() => void) | null; isGone: boolean })[] = []
  const holders = new Map<string, { tab: number; lost: () => void }>()
  const timers: { atMs: number; work: () => void }[] = []
  let nowMs = 5_000
  let wallMs = Date.parse('2026-12-01T18:00:00Z')
  const sound: { state: PlayerState['sound'] } = { state: 'ready' }
  const soundWatchers = new Set<(state: PlayerState['sound']) => void>()

  /** Until storage, server and store have all answered. */
  async function settle(): Promise<void> {
    for (let round = 0; round < 25; round += 1) {
      await new Promise((resolve) => setImmediate(resolve))
    }
  }

  async function openTab(
    options: { memory?: PlayerMemory; data?: Partial<PlayerData>; isMute?: boolean } = {},
  ): Promise<Tab> {
    const number = tabs.length
    const memory = options.memory ?? safeMemory(indexedMemory())
    const own = { ...data, ...options.data }
    const sounds: Sounded[] = []
    const said: Said[] = []
    const outbox = createOutbox({
      memory,
      membershipId: own.membershipId,
      send: (...args) => (tab.isGone ? new Promise(() => undefined) : server.fetch(...args)),
      setTimer(work, ms) {
        const timer = { atMs: nowMs + ms, work }
        timers.push(timer)
        return timer
      },
      clearTimer(timer) {
        const index = timers.findIndex((one) => one === timer)
        if (index >= 0) timers.splice(index, 1)
      },
    })
    const claims: ClaimPort = {
      async claim(attemptId, take, lost) {
        const held = holders.get(attemptId)
        if (held && held.tab !== number && !take) return null
        if (held && held.tab !== number) held.lost()
        holders.set(attemptId, { tab: number, lost })
        return {
          release() {
            if (holders.get(attemptId)?.tab === number) holders.delete(attemptId)
          },
        }
      },
    }
    const ports: PlayerPorts = {
      now: () => nowMs,
      wall: () => wallMs,
      tick(wake) {
        tab.wake = wake
        return () => {
          tab.wake = null
        }
      },
      sound: {
        watch(tell) {
          soundWatchers.add(tell)
          tell(sound.state)
          return () => soundWatchers.delete(tell)
        },
        unlock: async () => undefined,
        configure: () => undefined,
        schedule(name, atMs) {
          if (sound.state !== 'ready') return null
          const one: Sounded = { name, atMs, askedAtMs: nowMs, isCalledOff: false }
          sounds.push(one)
          return () => {
            one.isCalledOff = true
          }
        },
        close: () => undefined,
      },
      voice: {
        watch(tell) {
          tell(options.isMute ? [] : [{ id: 'anna', name: 'Anna', language: 'en' }])
          return () => undefined
        },
        configure: () => undefined,
        say(text, level, done) {
          if (options.isMute) return null
          const one: Said = { text, level, atMs: nowMs, cutAtMs: null, done }
          said.push(one)
          return () => {
            one.cutAtMs = nowMs
          }
        },
        close: () => undefined,
      },
      memory,
      claims,
      newId,
      device: `device-${number}`,
      kickOutbox: outbox.kick,
      watchOutbox: outbox.watch,
      watchSeq: outbox.watchSeq,
      stayAwake(on) {
        tab.awake = on
      },
    }
    const player = createPlayer(own, ports)
    const tab: (typeof tabs)[number] = {
      player,
      state: () => player.store.getState(),
      outbox,
      memory,
      sounds,
      said,
      awake: false,
      wake: null,
      isGone: false,
      kill() {
        tab.isGone = true
        tab.wake = null
        outbox.close()
        for (const [attemptId, held] of holders) if (held.tab === number) holders.delete(attemptId)
      },
    }
    tabs.push(tab)
    await player.open()
    await settle()
    return tab
  }

  function tickAll(): void {
    for (const tab of tabs) tab.wake?.()
  }

  return {
    data,
    server,
    openTab,
    settle,
    now: () => nowMs,
    wall: () => wallMs,
    sound(state: PlayerState['sound']) {
      sound.state = state
      soundWatchers.forEach((tell) => tell(state))
    },
    /** Time passes with a wake every 50 ms, or less often where only the end matters. */
    async pass(ms: number, everyMs = 50): Promise<void> {
      const endMs = nowMs + ms
      while (nowMs < endMs) {
        const step = Math.min(everyMs, endMs - nowMs)
        nowMs += step
        wallMs += step
        tickAll()
        for (const due of timers.filter((timer) => timer.atMs <= nowMs)) {
          timers.splice(timers.indexOf(due), 1)
          due.work()
        }
      }
      await settle()
    },
    /** Nothing of the page runs for so long, then it wakes. */
    async freeze(ms: number): Promise<void> {
      nowMs += ms
      wallMs += ms
      tickAll()
      await settle()
    },
    /** The monotonic clock stands, the computer's goes on: asleep, or the clock was set. */
    async jumpWall(ms: number): Promise<void> {
      wallMs += ms
      nowMs += 50
      wallMs += 50
      tickAll()
      await settle()
    },
    /** Time passes while no page is open. */
    away(ms: number): void {
      nowMs += ms
      wallMs += ms
    },
  }
}

export type PlayerBench = ReturnType<typeof playerBench>

/** Waits, in real time, for what storage and server do behind the store. */
export const eventually = <T>(check: () => T | Promise<T>) => vi.waitFor(check, { timeout: 2_000 })
