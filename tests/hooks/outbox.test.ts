import { IDBFactory } from 'fake-indexeddb'
import { beforeEach, describe, expect, it } from 'vitest'
import { newId } from '@/hooks/player/ids'
import { indexedMemory, safeMemory } from '@/hooks/player/memory'
import { createOutbox } from '@/hooks/player/outbox'
import type { KeptAttempt, PlayerMemory } from '@/hooks/player/ports'
import type { PlayerState } from '@/hooks/player/types'
import { recordEventsInput } from '@/server/contract/attempts'
import type { ClassEvent } from '@/server/engine/tally/events'
import { eventually, fakeServer } from '../support/player-bench'

const MEMBER = 'member-a'

const attemptOf = (attemptId: string, membershipId = MEMBER): KeptAttempt => ({
  attemptId,
  membershipId,
  scheduledClassId: 'class',
  versionId: 'version',
  todayNote: null,
  settings: { waitAtBriefs: false, changeExtraMs: 0 },
  options: {},
  startedWallMs: 1_000,
  over: null,
})
const event = (seq: number, note?: string): ClassEvent => ({
  id: newId(),
  device: 'd',
  seq,
  classMs: seq,
  wallMs: seq,
  type: 'hurt',
  where: 'knee',
  ...(note ? { note } : {}),
})

function outboxOf(memory: PlayerMemory, membershipId = MEMBER) {
  const server = fakeServer()
  const told: PlayerState['saving'][] = []
  const waits: number[] = []
  let due: (() => void) | null = null
  const outbox = createOutbox({
    memory,
    membershipId,
    send: (...args) => server.fetch(...args),
    setTimer(work, ms) {
      waits.push(ms)
      due = work
      return work
    },
    clearTimer() {
      due = null
    },
  })
  outbox.watch((saving) => told.push(saving))
  return {
    outbox,
    server,
    told,
    waits,
    /** What it said last, once it has looked at what waits. */
    last: () => told.slice(1).at(-1),
    retry: () => due?.(),
  }
}

async function keptEvents(memory: PlayerMemory, attempt: KeptAttempt, events: ClassEvent[]) {
  await memory.keepAttempt(attempt)
  await memory.keepEvents(
    events.map((one) => ({
      attemptId: attempt.attemptId,
      membershipId: attempt.membershipId,
      event: one,
      sent: false,
    })),
  )
}

describe('the outbox', () => {
  let memory: PlayerMemory
  beforeEach(() => {
    globalThis.indexedDB = new IDBFactory()
    memory = safeMemory(indexedMemory())
  })

  it('sends batches of at most 500 that the server can read, in order', async () => {
    const events = Array.from({ length: 1_203 }, (_, index) => event(index + 1))
    await keptEvents(memory, attemptOf('a'), events)
    const { outbox, server, last } = outboxOf(memory)
    outbox.kick()
    await eventually(() => expect(last()?.state).toBe('saved'))
    expect(server.requests.map((one) => one.input.events.length)).toEqual([500, 500, 203])
    for (const one of server.requests) {
      expect(recordEventsInput.safeParse(one.input).success).toBe(true)
    }
    expect(server.requests.flatMap((one) => one.input.events.map((each) => each.seq))).toEqual(
      events.map((each) => each.seq),
    )
  })

  it('lets a small batch outlive its page, and not one over 64 KiB in bytes (a browser refuses that)', async () => {
    await keptEvents(memory, attemptOf('a'), [event(1)])
    // Characters of three bytes each: under the limit by length, over it by bytes.
    const long = Array.from({ length: 30 }, (_, index) => event(index + 1, '“'.repeat(1_000)))
    await keptEvents(memory, attemptOf('b'), long)
    const { outbox, server, last } = outboxOf(memory)
    outbox.kick()
    await eventually(() => expect(last()?.state).toBe('saved'))
    const byAttempt = new Map(server.requests.map((one) => [one.attemptId, one.keepalive]))
    expect(Object.fromEntries(byAttempt)).toEqual({ a: true, b: false })
  })

  it('waits twice as long after every failure, 30 s at most, and from 1 s again once it worked', async () => {
    await keptEvents(memory, attemptOf('a'), [event(1)])
    const { outbox, server, waits, retry, last } = outboxOf(memory)
    server.mode = 'away'
    outbox.kick()
    for (let time = 1; time <= 8; time += 1) {
      await eventually(() => expect(waits).toHaveLength(time))
      retry()
    }
    expect(waits.slice(0, 8)).toEqual([1, 2, 4, 8, 16, 30, 30, 30].map((s) => s * 1_000))
    await eventually(() => expect(waits).toHaveLength(9))
    expect(last()).toEqual({ state: 'saved-here', unsent: 1, message: null })
    server.mode = 200
    retry()
    await eventually(() => expect(last()?.state).toBe('saved'))
    await keptEvents(memory, attemptOf('a'), [event(2)])
    server.mode = 503
    outbox.kick()
    await eventually(() => expect(waits.at(-1)).toBe(1_000))
  })

  it('stores each event once where the answer is cut after the server has committed', async () => {
    const events = [event(1), event(2)]
    await keptEvents(memory, attemptOf('a'), events)
    const { outbox, server, waits, retry, last } = outboxOf(memory)
    server.mode = 'cut-after-commit'
    outbox.kick()
    await eventually(() => expect(waits).toHaveLength(1))
    expect(last()).toMatchObject({ state: 'saved-here', unsent: 2 })
    server.mode = 200
    retry()
    await eventually(() => expect(last()?.state).toBe('saved'))
    expect(server.requests).toHaveLength(2)
    expect([...server.events.keys()]).toEqual(events.map((one) => one.id))
  })

  it('once signed out says what to do, keeps trying, and loses nothing', async () => {
    await keptEvents(memory, attemptOf('a'), [event(1)])
    const { outbox, server, waits, retry, last } = outboxOf(memory)
    server.mode = 401
    outbox.kick()
    await eventually(() =>
      expect(last()).toEqual({
        state: 'saved-here',
        unsent: 1,
        message: 'Sign in again to send; nothing is lost.',
      }),
    )
    expect(waits).toEqual([1_000])
    server.mode = 200
    retry()
    await eventually(() => expect(last()?.state).toBe('saved'))
  })

  it.each([403, 404, 409])(
    'keeps what is refused with %i, says why, and does not ask again until the next opening',
    async (status) => {
      await keptEvents(memory, attemptOf('a'), [event(1)])
      const first = outboxOf(memory)
      first.server.mode = status
      first.outbox.kick()
      await eventually(() => expect(first.last()?.message).toMatch(/It stays on this computer/))
      expect(first.last()).toMatchObject({ state: 'saved-here', unsent: 1 })
      first.outbox.kick()
      await eventually(() => expect(first.last()?.state).toBe('saved-here'))
      expect(first.server.requests).toHaveLength(1)
      expect(first.waits).toEqual([])
      const next = outboxOf(memory)
      next.outbox.kick()
      await eventually(() => expect(next.last()?.state).toBe('saved'))
    },
  )

  it('is not held back by one event that the server cannot read', async () => {
    const events = Array.from({ length: 20 }, (_, index) => event(index + 1))
    const bad = events[6]?.id
    await keptEvents(memory, attemptOf('a'), events)
    const { outbox, server, last } = outboxOf(memory)
    server.refuses = (one) => one.id === bad
    outbox.kick()
    await eventually(() => expect(last()).toMatchObject({ state: 'saved-here', unsent: 1 }))
    expect(last()?.message).toMatch(/It stays/)
    expect([...server.events.keys()]).toEqual(
      events.filter((one) => one.id !== bad).map((one) => one.id),
    )
  })

  it('sends what came while it was sending, without a second request at once', async () => {
    await keptEvents(memory, attemptOf('a'), [event(1)])
    const { outbox, server, last } = outboxOf(memory)
    outbox.kick()
    outbox.kick()
    await keptEvents(memory, attemptOf('a'), [event(2)])
    outbox.kick()
    await eventually(() => {
      expect(last()?.state).toBe('saved')
      expect(server.events.size).toBe(2)
    })
    expect(server.requests.length).toBeLessThanOrEqual(2)
  })

  it('sends nothing of another member', async () => {
    await keptEvents(memory, attemptOf('a', 'member-b'), [event(1)])
    const { outbox, server, last } = outboxOf(memory)
    outbox.kick()
    await eventually(() => expect(last()?.state).toBe('saved'))
    expect(server.requests).toEqual([])
  })

  it('does nothing more once closed', async () => {
    await keptEvents(memory, attemptOf('a'), [event(1)])
    const { outbox, server, waits } = outboxOf(memory)
    server.mode = 'away'
    outbox.kick()
    outbox.close()
    await new Promise((resolve) => setTimeout(resolve, 50))
    expect(waits).toEqual([])
  })
})
