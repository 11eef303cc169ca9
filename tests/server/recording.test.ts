import { eq, sql } from 'drizzle-orm'
import { v7 } from 'uuid'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { attemptEvents } from '@/db/schema/attempt-events'
import { attempts } from '@/db/schema/attempts'
import { classVersions } from '@/db/schema/class-versions'
import { hurtHolds } from '@/db/schema/hurt-holds'
import { memberships } from '@/db/schema/memberships'
import { recordEventsInput, uuidV7Schema, type RecordEventsInput } from '@/server/contract/attempts'
import type { Viewer } from '@/server/contract/viewer'
import { getAttempt, listOwnAttempts, recordEvents } from '@/server/data/attempts'
import { getBoard } from '@/server/data/boards'
import { saveHealth } from '@/server/data/health'
import { getPlayerData } from '@/server/data/player'
import type { ClassEvent } from '@/server/engine/tally/events'
import { makeTestDatabase, type TestDatabase } from '../support/database'
import { answersWith, makeGym, NOW, stamped, type TestGym } from '../support/gym'

let test: TestDatabase
let gym: TestGym
let member: Viewer
let other: Viewer
let coach: Viewer

beforeAll(async () => {
  test = await makeTestDatabase()
  gym = await makeGym(test.db, 'Gym A')
  member = await gym.person('Member', ['member'])
  other = await gym.person('Other', ['member'])
  coach = await gym.person('Coach', ['coach'])
})
afterAll(() => test.end())

function started(versionId = gym.versionId): ClassEvent[] {
  return stamped([
    { type: 'started', classMs: 0, version: versionId, counting: 'press', options: [] },
    { type: 'round-done', classMs: 60_000, block: 'row-and-lunge', round: 1, by: 'member' },
    { type: 'round-done', classMs: 90_000, block: 'row-and-lunge', round: 2, by: 'member' },
  ])
}

function input(events: ClassEvent[], more: Partial<RecordEventsInput> = {}): RecordEventsInput {
  return {
    scheduledClassId: gym.scheduledClassId,
    versionId: gym.versionId,
    todayNote: null,
    events,
    ...more,
  }
}

const record = (viewer: Viewer, attemptId: string, sent: RecordEventsInput) =>
  recordEvents(viewer, { attemptId, input: sent, now: NOW }, test.db)

async function storedIds(attemptId: string): Promise<string[]> {
  const rows = await test.db
    .select({ id: attemptEvents.id })
    .from(attemptEvents)
    .where(eq(attemptEvents.attemptId, attemptId))
  return rows.map((row) => row.id).sort()
}

const rejection = async (work: Promise<unknown>): Promise<string> =>
  work.then(
    () => 'done',
    (error: unknown) =>
      typeof error === 'object' && error !== null && 'code' in error
        ? String(error.code)
        : 'unknown',
  )

describe('recording', () => {
  it('stores each event exactly once when a request is repeated', async () => {
    const attemptId = v7()
    const events = started()
    const first = await record(member, attemptId, input(events))
    const again = await record(member, attemptId, input(events))
    expect(again).toEqual(first)
    expect(await storedIds(attemptId)).toEqual(events.map((event) => event.id).sort())
    const [attempt] = await test.db.select().from(attempts).where(eq(attempts.id, attemptId))
    expect(attempt?.revision).toBe(events.length)
  })

  it('stores each event exactly once when the same requests come all at once', async () => {
    const attemptId = v7()
    const events = started()
    await Promise.all([
      ...Array.from({ length: 6 }, () => record(member, attemptId, input(events))),
      ...events.map((event) => record(member, attemptId, input([event]))),
    ])
    expect(await storedIds(attemptId)).toEqual(events.map((event) => event.id).sort())
    const [attempt] = await test.db.select().from(attempts).where(eq(attempts.id, attemptId))
    expect(attempt?.revision).toBe(events.length)
  })

  it('takes events in any order and folds them to the same tally', async () => {
    const attemptId = v7()
    const events = started()
    for (const event of [...events].reverse()) await record(member, attemptId, input([event]))
    const attempt = await getAttempt(member, { attemptId }, test.db)
    expect(attempt.tally.blocks.find((block) => block.block === 'row-and-lunge')?.rounds).toBe(2)
    expect(attempt.events.map((one) => one.event.seq)).toEqual([1, 2, 3])
  })

  it('keeps the state of the latest event whatever comes late', async () => {
    const attemptId = v7()
    const [begin, round] = started()
    const [finished] = stamped([{ type: 'finished', classMs: 999_000 }], 'device-a', 9)
    const [paused] = stamped([{ type: 'paused', classMs: 100_000 }], 'device-a', 5)
    if (!begin || !round || !finished || !paused) throw new Error('no events')
    await record(member, attemptId, input([begin, finished]))
    await record(member, attemptId, input([paused, round]))
    const [attempt] = await test.db.select().from(attempts).where(eq(attempts.id, attemptId))
    expect(attempt?.state).toBe('finished')
  })

  it('refuses another member’s attempt as if it were not there, and stores nothing', async () => {
    const attemptId = v7()
    await record(member, attemptId, input(started()))
    const before = await storedIds(attemptId)
    expect(await rejection(record(other, attemptId, input(started())))).toBe('not-found')
    expect(await storedIds(attemptId)).toEqual(before)
  })

  it('refuses a class of another gym', async () => {
    const elsewhere = await makeGym(test.db, 'Gym B')
    const stranger = await elsewhere.person('Stranger', ['member'])
    expect(await rejection(record(stranger, v7(), input(started())))).toBe('not-found')
  })

  it('refuses a version that is not the class’s', async () => {
    const elsewhere = await makeGym(test.db, 'Gym C')
    const sent = input(started(elsewhere.versionId), { versionId: elsewhere.versionId })
    expect(await rejection(record(member, v7(), sent))).toBe('conflict')
    expect(await rejection(record(member, v7(), input(started('another-version'))))).toBe(
      'conflict',
    )
  })

  it('takes an older version of the same class, which an attempt may have begun on', async () => {
    const [current] = await test.db
      .select()
      .from(classVersions)
      .where(eq(classVersions.id, gym.versionId))
    if (!current) throw new Error('no version')
    const older = v7()
    await test.db.insert(classVersions).values({ ...current, id: older })
    const result = await record(member, v7(), input(started(older), { versionId: older }))
    expect(result.stored).toHaveLength(3)
  })

  it('does not start an attempt while the health questions are open, and goes on with one begun', async () => {
    const unasked = await gym.person('Unasked', ['member'], { answered: false })
    expect(await rejection(record(unasked, v7(), input(started())))).toBe('not-allowed')
    const breathless = await gym.person('Breathless', ['member'], { answered: ['breathless'] })
    expect(await rejection(record(breathless, v7(), input(started())))).toBe('not-allowed')

    const attemptId = v7()
    const later = await gym.person('Answers anew', ['member'])
    const events = started()
    await record(later, attemptId, input(events.slice(0, 1)))
    await saveHealth(
      later,
      { answers: answersWith('chest-pain'), cleared: false, limits: [], now: NOW },
      test.db,
    )
    expect((await record(later, attemptId, input(events))).stored).toHaveLength(3)
  })

  it('takes a class that was begun while the answers were good and is sent after they ran out', async () => {
    const away = await gym.person('Away', ['member'])
    // Answered a day before; good for 90 days (the gym's setting).
    const after = new Date(NOW.getTime() + 100 * 86_400_000)
    const events = started().map((event) => ({
      ...event,
      wallMs: after.getTime() - 20 * 86_400_000,
    }))
    const sent = { attemptId: v7(), input: input(events), now: after }
    expect((await recordEvents(away, sent, test.db)).stored).toHaveLength(3)
    const begunToday = started().map((event) => ({ ...event, wallMs: after.getTime() }))
    expect(
      await rejection(
        recordEvents(away, { attemptId: v7(), input: input(begunToday), now: after }, test.db),
      ),
    ).toBe('not-allowed')
  })

  it('stores all or nothing of a request that is cut, and all of it when it comes again', async () => {
    const attemptId = v7()
    const events = started()
    const cut = test.db.transaction(async (tx) => {
      await recordEvents(member, { attemptId, input: input(events), now: NOW }, tx)
      throw new Error('the process died before the commit')
    })
    await expect(cut).rejects.toThrow('died')
    expect(await storedIds(attemptId)).toEqual([])
    // The answer is lost after the commit: the client knows nothing and sends again.
    await record(member, attemptId, input(events))
    await record(member, attemptId, input(events))
    expect(await storedIds(attemptId)).toHaveLength(3)
  })

  it('keeps a member’s own attempts in their reach after they changed groups', async () => {
    const evening = await makeGym(test.db, 'Gym with groups', { group: 'Evening' })
    const moved = await evening.person('Moved', ['member'], { group: 'Evening' })
    const attemptId = v7()
    await recordEvents(
      moved,
      {
        attemptId,
        now: NOW,
        input: {
          scheduledClassId: evening.scheduledClassId,
          versionId: evening.versionId,
          events: started(evening.versionId),
        },
      },
      test.db,
    )
    await test.db
      .update(memberships)
      .set({ group: 'Morning' })
      .where(eq(memberships.id, moved.membershipId))
    expect((await getAttempt(moved, { attemptId }, test.db)).tally.state).toBe('in-class')
    const stranger = await evening.person('Of the morning', ['member'], { group: 'Morning' })
    const params = { scheduledClassId: evening.scheduledClassId, now: NOW }
    expect(await rejection(getPlayerData(stranger, params, test.db))).toBe('not-found')
  })

  it('lists one’s own attempts by when they were recorded, each on one page', async () => {
    const busy = await gym.person('Busy', ['member'])
    const ids: string[] = []
    for (let at = 0; at < 53; at += 1) {
      // A computer whose clock is wrong makes ids out of order.
      const attemptId = v7({ msecs: NOW.getTime() - at * 1_000 })
      ids.unshift(attemptId)
      await test.db.insert(attempts).values({
        id: attemptId,
        gymId: gym.gymId,
        membershipId: busy.membershipId,
        scheduledClassId: gym.scheduledClassId,
        versionId: gym.versionId,
        createdAt: new Date(NOW.getTime() + Math.floor(at / 3)),
      })
    }
    const first = await listOwnAttempts(busy, { before: null }, test.db)
    const before = first.attempts.at(-1)?.attemptId ?? null
    const second = await listOwnAttempts(busy, { before }, test.db)
    const seen = [...first.attempts, ...second.attempts].map((one) => one.attemptId)
    expect(first.more).toBe(true)
    expect(second.more).toBe(false)
    expect(new Set(seen)).toEqual(new Set(ids))
    expect(seen).toHaveLength(53)
    expect(seen.slice(0, 2).every((id) => ids.slice(0, 2).includes(id))).toBe(true)
    expect((await listOwnAttempts(member, { before }, test.db)).attempts).toEqual([])
  })

  it('keeps events from the future and from a clock that went back, in the order of their seq', async () => {
    const attemptId = v7()
    const events = started().map((event, index) => ({
      ...event,
      wallMs: index === 1 ? NOW.getTime() + 10 * 365 * 86_400_000 : index === 2 ? 0 : event.wallMs,
    }))
    await record(member, attemptId, input(events))
    const attempt = await getAttempt(member, { attemptId }, test.db)
    expect(attempt.events.map((one) => one.event.id)).toEqual(events.map((event) => event.id))
    expect(Date.parse(attempt.lastEventAt ?? '')).toBe(NOW.getTime())
  })

  it.each([
    ['begun in the window without a network, sent after it', '2026-12-01T12:00:00Z', false],
    ['begun after the window', '2026-12-01T22:30:00Z', true],
    ['begun by a clock that cannot be right, sent after the window', '1970-01-01T00:00:00Z', true],
    ['begun by a clock that runs ahead, sent after the window', '2026-12-03T00:00:00Z', true],
  ])('marks only what begins after the window as late: %s', async (_name, begun, late) => {
    const attemptId = v7()
    const events = started().map((event) => ({ ...event, wallMs: Date.parse(begun) }))
    const now = new Date('2026-12-01T23:00:00Z')
    await recordEvents(member, { attemptId, input: input(events), now }, test.db)
    expect((await getAttempt(member, { attemptId }, test.db)).late).toBe(late)
  })

  it('raises a hold for every hurt, once', async () => {
    const attemptId = v7()
    const hurt = stamped([{ type: 'hurt', classMs: 70_000, where: 'knee' }], 'device-a', 7)
    await record(member, attemptId, input([...started(), ...hurt]))
    await record(member, attemptId, input(hurt))
    const holds = await test.db.select().from(hurtHolds).where(eq(hurtHolds.attemptId, attemptId))
    expect(holds.map((hold) => hold.place)).toEqual(['knee'])
  })

  it('offers an open attempt to another device with its events', async () => {
    const someone = await gym.person('Two devices', ['member'])
    const attemptId = v7()
    const events = started()
    await record(someone, attemptId, input(events))
    const data = await getPlayerData(
      someone,
      { scheduledClassId: gym.scheduledClassId, now: NOW },
      test.db,
    )
    expect(data.openAttempt?.attemptId).toBe(attemptId)
    expect(data.openAttempt?.events).toEqual(events)
  })

  it('shows the coach the latest finished of several attempts, with a sign of the others', async () => {
    const twice = await gym.person('Twice', ['member'])
    const finish = (seq: number) =>
      stamped([{ type: 'finished', classMs: 999_000 }], 'device-a', seq)
    const done = v7()
    await record(twice, done, input([...started(), ...finish(9)]))
    await record(twice, v7(), input(started()))
    const board = await getBoard(
      coach,
      { scheduledClassId: gym.scheduledClassId, now: NOW },
      test.db,
    )
    const row = board.rows.find((one) => one.membershipId === twice.membershipId)
    expect(row?.attemptId).toBe(done)
    expect(row?.otherAttempts).toBe(1)
    expect(row?.tally?.state).toBe('finished')
  })
})

describe('a published version', () => {
  it('is never changed, whoever tries', async () => {
    const change = test.db
      .update(classVersions)
      .set({ content: sql`'{}'::jsonb` })
      .where(eq(classVersions.id, gym.versionId))
    await expect(change).rejects.toThrow()
    const [kept] = await test.db
      .select()
      .from(classVersions)
      .where(eq(classVersions.id, gym.versionId))
    expect(kept?.content).toEqual(gym.version)
  })
})

describe('what the events route lets in', () => {
  const good = (): RecordEventsInput => ({
    scheduledClassId: 'class',
    versionId: 'v',
    events: started('v'),
  })
  it('takes what a player sends', () => {
    expect(recordEventsInput.safeParse(good()).success).toBe(true)
  })
  it.each([
    ['no events', { events: [] }],
    ['more than 500 events', { events: Array.from({ length: 501 }, () => started('v')[0]) }],
    ['an unknown type', { events: [{ ...started('v')[0], type: 'cheered' }] }],
    ['a negative class time', { events: [{ ...started('v')[1], classMs: -1 }] }],
    ['a huge round', { events: [{ ...started('v')[1], round: 1e12 }] }],
    ['a fractional round', { events: [{ ...started('v')[1], round: 1.5 }] }],
    ['an unknown key', { events: [{ ...started('v')[1], cheers: 3 }] }],
    ['no class', { scheduledClassId: '' }],
    ['an unknown key beside the events', { role: 'coach' }],
  ])('refuses %s', (_name, change) => {
    expect(recordEventsInput.safeParse({ ...good(), ...change }).success).toBe(false)
  })

  // RFC 9562, section 5.7 and appendix A.6: the UUIDv7 example, with its version and variant bits.
  it('takes the UUIDv7 of RFC 9562 and ours, and no other version', () => {
    expect(uuidV7Schema.safeParse('017F22E2-79B0-7CC3-98C4-DC0C0C07398F').success).toBe(true)
    expect(uuidV7Schema.safeParse('C232AB00-9414-11EC-B3C8-9F6BDECED846').success).toBe(false)
    expect(uuidV7Schema.safeParse('919108F7-52D1-4320-9BAC-F847DB4148A8').success).toBe(false)
    const made = v7()
    expect(uuidV7Schema.safeParse(made).success).toBe(true)
  })
  it('lays out our ids as RFC 9562 has it: 48 bits of milliseconds, version 7, variant 10', () => {
    const at = 1_645_557_742_000
    const bits = BigInt(`0x${v7({ msecs: at }).replaceAll('-', '')}`)
    expect(Number(bits >> 80n)).toBe(at)
    expect((bits >> 76n) & 0xfn).toBe(7n)
    expect((bits >> 62n) & 0x3n).toBe(2n)
  })
})
