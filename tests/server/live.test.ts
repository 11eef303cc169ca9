import { eq } from 'drizzle-orm'
import { v7 } from 'uuid'
import { afterAll, afterEach, beforeAll, beforeEach, describe, expect, it, vi } from 'vitest'
import { memberships } from '@/db/schema/memberships'
import type { LiveBoardChange } from '@/server/contract/board'
import type { Viewer } from '@/server/contract/viewer'
import { recordEvents } from '@/server/data/attempts'
import { BoardFeed, type BoardFeedPorts } from '@/server/live/boards'
import { makeTestDatabase, type TestDatabase } from '../support/database'
import { makeGym, NOW, stamped, type TestGym } from '../support/gym'

let test: TestDatabase
let gym: TestGym
let coach: Viewer
let member: Viewer
let token = ''

vi.mock('@/db/client', async (original) => ({
  ...(await original<object>()),
  database: () => test.db,
  databaseSql: () => test.sql,
}))
vi.mock('next/headers', () => ({
  cookies: async () => ({ get: () => ({ name: 'floorside', value: token }) }),
  headers: async () => new Headers(),
}))

beforeAll(async () => {
  test = await makeTestDatabase()
  gym = await makeGym(test.db, 'Gym')
  coach = await gym.person('Coach', ['coach'])
  member = await gym.person('Member', ['member'])
})
beforeEach(async () => {
  const { startSession } = await import('@/server/auth/lucia')
  token = await startSession(coach.personId, { gymId: null, userAgent: '' })
})
afterAll(() => test.end())

const record = (seq: number, attemptId = v7()) =>
  recordEvents(
    member,
    {
      attemptId,
      now: NOW,
      input: {
        scheduledClassId: gym.scheduledClassId,
        versionId: gym.versionId,
        events: stamped(
          [
            { type: 'started', classMs: 0, version: gym.versionId, counting: 'press', options: [] },
            { type: 'stopped', classMs: 9_000, sign: 'chest-pain', note: 'it hurts here' },
          ],
          'device-a',
          seq,
        ),
      },
    },
    test.db,
  )

/** A stream as a browser reads it. */
async function open() {
  const { GET } = await import('@/app/api/v1/live/route')
  const answer = await GET(
    new Request(`http://gym.example/api/v1/live?boards=${gym.scheduledClassId}`),
    { params: Promise.resolve({}) },
  )
  const reader = answer.body?.getReader()
  if (!reader || !answer.ok) throw new Error(`no stream: ${answer.status}`)
  let text = ''
  let isOver = false
  const reading = (async () => {
    for (;;) {
      const next = await reader.read()
      if (next.done) break
      text += new TextDecoder().decode(next.value)
    }
    isOver = true
  })()
  return {
    answer,
    reading,
    end: () => reader.cancel(),
    text: () => text,
    isOver: () => isOver,
    changes: () =>
      [...text.matchAll(/^data: (.*)$/gm)].map(
        ([, data]) => JSON.parse(data ?? '') as LiveBoardChange,
      ),
  }
}

describe('the live stream', () => {
  it('tells the present revision at once and a change within two seconds, with ids and no health data', async () => {
    const stream = await open()
    await vi.waitFor(() => expect(stream.changes()).toHaveLength(1), 2_000)
    const before = stream.changes()[0]?.revision ?? -1
    await record(1)
    await vi.waitFor(() => expect(stream.changes().at(-1)?.revision).toBe(before + 2), 2_000)
    expect(stream.changes().at(-1)).toEqual({
      scheduledClassId: gym.scheduledClassId,
      revision: before + 2,
    })
    expect(stream.text()).toContain(`id: ${before + 2}\nevent: board\n`)
    expect(stream.text()).not.toMatch(/hurts|chest|Member/)
    await stream.end()
  })

  it('is sent uncompressed and uncached, which a proxy is told', async () => {
    const stream = await open()
    expect(stream.answer.headers.get('cache-control')).toBe('no-cache, no-transform')
    expect(stream.answer.headers.get('content-type')).toMatch(/^text\/event-stream/)
    await stream.end()
  })

  it('hears changes again after its connection to the database was cut', async () => {
    const stream = await open()
    await vi.waitFor(() => expect(stream.changes()).not.toHaveLength(0), 2_000)
    const before = stream.changes().at(-1)?.revision ?? -1
    const cut = await test.sql`select pg_terminate_backend(pid) from pg_stat_activity
      where datname = current_database() and query ilike 'listen%'`
    expect(cut).toHaveLength(1)
    await record(1)
    await vi.waitFor(() => expect(stream.changes().at(-1)?.revision).toBe(before + 2), {
      timeout: 12_000,
    })
    await stream.end()
  })

  it('can be ended by its reader without an error', async () => {
    const stream = await open()
    await expect(stream.end()).resolves.toBeUndefined()
  })
})

describe('an open stream', () => {
  // Only the clock of the stream is turned; the database keeps its own.
  beforeEach(() => {
    vi.useFakeTimers({ toFake: ['setInterval', 'clearInterval'] })
  })
  afterEach(() => {
    vi.useRealTimers()
  })
  const within15Seconds = () => vi.advanceTimersByTime(15_000 - 5_000)

  it('ends within 15 seconds of a sign-out', async () => {
    const stream = await open()
    const { digestOf, endSession } = await import('@/server/auth/lucia')
    await endSession(digestOf(token))
    within15Seconds()
    await vi.waitFor(() => expect(stream.isOver()).toBe(true))
  })

  it('ends within 15 seconds of a new password set elsewhere', async () => {
    const stream = await open()
    const { changeOwnPassword } = await import('@/server/data/people')
    await changeOwnPassword(coach, { passwordHash: 'x', keepSessionId: 'another' }, test.db)
    within15Seconds()
    await vi.waitFor(() => expect(stream.isOver()).toBe(true))
  })

  it('ends within 15 seconds of a deactivation', async () => {
    const stream = await open()
    const own = eq(memberships.id, coach.membershipId)
    await test.db.update(memberships).set({ deactivatedAt: NOW }).where(own)
    within15Seconds()
    await vi.waitFor(() => expect(stream.isOver()).toBe(true))
    await test.db.update(memberships).set({ deactivatedAt: null }).where(own)
  })

  it('stays while nothing changes, with a sign of life every 15 seconds', async () => {
    const stream = await open()
    vi.advanceTimersByTime(15_000)
    await vi.waitFor(() => expect(stream.text()).toContain(': here'))
    expect(stream.isOver()).toBe(false)
    await stream.end()
  })
})

describe('the feed behind the streams', () => {
  function feedWith(revisions: BoardFeedPorts['revisions']) {
    const timers: { work: () => void; ms: number }[] = []
    let heard: (id: string) => void = () => undefined
    let listening: () => void = () => undefined
    const feed = new BoardFeed({
      listen: async (onHeard, onListening) => {
        heard = onHeard
        listening = onListening
      },
      revisions,
      setTimer: (work, ms) => timers.push({ work, ms }),
    })
    /** Lets the timers up to `ms` run, once each. */
    const pass = async (ms: number) => {
      for (const timer of timers.filter((one) => one.ms <= ms)) {
        timers.splice(timers.indexOf(timer), 1)
        timer.work()
      }
      await new Promise((resolve) => setImmediate(resolve))
    }
    return { feed, pass, hear: (id: string) => heard(id), listenAgain: () => listening() }
  }

  it('reads again every second after a reading failed, and tells what was missed', async () => {
    let isAway = false
    let revision = 1
    const { feed, pass, hear } = feedWith(async (ids) => {
      if (isAway) throw new Error('away')
      return ids.map((scheduledClassId) => ({ scheduledClassId, revision }))
    })
    const told: number[] = []
    feed.read(['a'], (change) => told.push(change.revision))
    await pass(0)
    isAway = true
    revision = 2
    hear('a')
    await pass(150)
    expect(told).toEqual([1])
    isAway = false
    await pass(1_000)
    await pass(150)
    expect(told).toEqual([1, 2])
  })

  it('reads again whenever it listens anew, and tells only who asked for that board', async () => {
    let revision = 1
    const { feed, pass, listenAgain } = feedWith(async (ids) =>
      ids.map((scheduledClassId) => ({ scheduledClassId, revision })),
    )
    const told: Record<string, number[]> = { a: [], b: [] }
    const endA = feed.read(['a'], (change) => told.a?.push(change.revision))
    feed.read(['b'], (change) => told.b?.push(change.revision))
    await pass(0)
    revision = 5
    endA()
    listenAgain()
    await pass(150)
    expect(told).toEqual({ a: [1], b: [1, 5] })
  })
})

describe('at the end of the process', () => {
  it('every stream closes, and no new one opens', async () => {
    const stream = await open()
    const { closeAllStreams } = await import('@/server/live/registry')
    closeAllStreams()
    await stream.reading
    expect(stream.isOver()).toBe(true)
    await expect(open()).rejects.toThrow('503')
  })
})
