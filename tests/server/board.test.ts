import { eq } from 'drizzle-orm'
import { v7 } from 'uuid'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { classVersions } from '@/db/schema/class-versions'
import { memberships } from '@/db/schema/memberships'
import { scheduledClasses } from '@/db/schema/scheduled-classes'
import { parseBoardView } from '@/server/contract/board-view'
import type { Viewer } from '@/server/contract/viewer'
import { recordEvents } from '@/server/data/attempts'
import { boardRevisions, getBoard, listenableBoards, participation } from '@/server/data/boards'
import { listToday } from '@/server/data/classes'
import { getGymOverview } from '@/server/data/people'
import { boardCsv } from '@/server/http/board-csv'
import type { EventDraft } from '@/server/engine/timeline/run-types'
import { makeTestDatabase, type TestDatabase } from '../support/database'
import { makeGym, NOW, stamped, type TestGym } from '../support/gym'

let test: TestDatabase

beforeAll(async () => {
  test = await makeTestDatabase()
})
afterAll(() => test.end())

const begun = (versionId: string): EventDraft => ({
  type: 'started',
  classMs: 0,
  version: versionId,
  counting: 'press',
  options: [],
})
const round = (number: number, by: 'member' | 'afterwards' = 'member'): EventDraft => ({
  type: 'round-done',
  classMs: 60_000 * number,
  block: 'row-and-lunge',
  round: number,
  by,
})

async function play(
  gym: TestGym,
  member: Viewer,
  drafts: EventDraft[],
  more: { now?: Date; versionId?: string; todayNote?: string } = {},
): Promise<string> {
  const attemptId = v7()
  const versionId = more.versionId ?? gym.versionId
  await recordEvents(
    member,
    {
      attemptId,
      now: more.now ?? NOW,
      input: {
        scheduledClassId: gym.scheduledClassId,
        versionId,
        todayNote: more.todayNote ?? null,
        events: stamped([begun(versionId), ...drafts]),
      },
    },
    test.db,
  )
  return attemptId
}

const boardOf = (gym: TestGym, viewer: Viewer) =>
  getBoard(viewer, { scheduledClassId: gym.scheduledClassId, now: NOW }, test.db)
const rejection = (work: Promise<unknown>) =>
  work.then(
    () => 'done',
    (error: { code?: string }) => error.code,
  )

describe('a board', () => {
  it('has what each member did: rounds, reps, option, skip, note, pain and stop', async () => {
    const gym = await makeGym(test.db, 'Whole')
    const coach = await gym.person('Coach', ['coach'])
    const done = await gym.person('Done', ['member'])
    const stopped = await gym.person('Stopped', ['member'])
    const away = await gym.person('Away', ['member'])
    await play(
      gym,
      done,
      [
        round(1),
        {
          type: 'option-chosen',
          classMs: 70_000,
          block: 'row-and-lunge',
          station: 1,
          option: 'step-shorter',
          reason: 'knee',
        },
        round(2, 'afterwards'),
        { type: 'reps-noted', classMs: 200_000, block: 'row-and-lunge', round: 3, reps: 5 },
        { type: 'block-skipped', classMs: 500_000, block: 'five-for-time', reason: 'no room' },
        { type: 'finished', classMs: 900_000 },
        { type: 'rated', classMs: 900_000, rpe: 7, note: 'Long but good' },
      ],
      { todayNote: 'slept badly' },
    )
    await play(gym, stopped, [
      { type: 'hurt', classMs: 30_000, where: 'knee' },
      { type: 'stopped', classMs: 40_000, sign: 'chest-pain' },
    ])
    const board = await boardOf(gym, coach)
    const rowOf = (viewer: Viewer) =>
      board.rows.find((one) => one.membershipId === viewer.membershipId)

    const block = rowOf(done)?.tally?.blocks.find((one) => one.block === 'row-and-lunge')
    expect(block).toMatchObject({ rounds: 2, reps: 5, countedAfterwards: true })
    expect(block?.options.find((one) => one.station === 1)?.used).toContain('step-shorter')
    expect(
      rowOf(done)?.tally?.blocks.find((one) => one.block === 'five-for-time')?.skipped,
    ).toEqual({ reason: 'no room' })
    expect(rowOf(done)).toMatchObject({ todayNote: 'slept badly', otherAttempts: 0, late: false })
    expect(rowOf(done)?.tally?.rating).toMatchObject({ rpe: 7, note: 'Long but good' })
    expect(rowOf(stopped)?.tally).toMatchObject({ state: 'stopped' })
    expect(rowOf(stopped)?.tally?.stop?.sign).toBe('chest-pain')
    expect(rowOf(stopped)?.tally?.hurts.map((one) => one.where)).toEqual(['knee'])
    expect(rowOf(away)).toMatchObject({ attemptId: null, tally: null, startedAt: null })
    expect(board.rows.map((row) => row.memberName)).not.toContain('Coach')
    expect(board.forecast.map((one) => one.block)).toContain('row-and-lunge')
    expect(board.revision).toBe(11)
  })

  it('counts an attempt by the version that it was done on', async () => {
    const gym = await makeGym(test.db, 'Two versions')
    const coach = await gym.person('Coach', ['coach'])
    const member = await gym.person('Member', ['member'])
    await play(gym, member, [round(1), round(2)])
    const before = (await boardOf(gym, coach)).rows[0]?.tally
    // The class is published anew with other reps, and scheduled in place of the first.
    const [first] = await test.db
      .select()
      .from(classVersions)
      .where(eq(classVersions.id, gym.versionId))
    if (!first) throw new Error('no version')
    const anew = structuredClone(first.content)
    for (const block of anew.spec.blocks) {
      if (block.format.type !== 'rounds') continue
      for (const station of block.format.stations) station.reps = 50
    }
    const versionId = v7()
    await test.db.insert(classVersions).values({ ...first, id: versionId, content: anew })
    await test.db
      .update(scheduledClasses)
      .set({ versionId })
      .where(eq(scheduledClasses.id, gym.scheduledClassId))
    const board = await boardOf(gym, coach)
    expect(board.versionId).toBe(versionId)
    expect(board.rows[0]?.tally).toEqual(before)
  })

  it('lists the class’s group and whoever came all the same, and nobody who left without coming', async () => {
    const gym = await makeGym(test.db, 'Groups', { group: 'Evening' })
    const coach = await gym.person('Coach', ['coach'])
    const came = await gym.person('Came and left', ['member'], { group: 'Evening' })
    await gym.person('Evening', ['member'], { group: 'Evening' })
    await gym.person('Morning', ['member'], { group: 'Morning' })
    const gone = await gym.person('Gone', ['member'], { group: 'Evening' })
    await play(gym, came, [round(1)])
    for (const viewer of [came, gone]) {
      await test.db
        .update(memberships)
        .set({ deactivatedAt: NOW })
        .where(eq(memberships.id, viewer.membershipId))
    }
    const { rows } = await boardOf(gym, coach)
    expect(rows.map((row) => row.memberName)).toEqual(['Came and left', 'Evening'])
  })

  it('is closed to members, to an owner who is no coach, and to another gym’s coach', async () => {
    const gym = await makeGym(test.db, 'Closed')
    const elsewhere = await makeGym(test.db, 'Elsewhere')
    for (const viewer of [
      await gym.person('Member', ['member']),
      await gym.person('Owner', ['owner']),
      await elsewhere.person('Coach', ['coach']),
    ]) {
      expect(await rejection(boardOf(gym, viewer))).toBe('not-found')
    }
    const foreign = await elsewhere.person('Listener', ['coach'])
    const ids = { scheduledClassIds: [gym.scheduledClassId, elsewhere.scheduledClassId] }
    expect(await listenableBoards(foreign, ids, test.db)).toEqual([elsewhere.scheduledClassId])
  })

  it('has a revision that grows by the events stored, repeated or not', async () => {
    const gym = await makeGym(test.db, 'Revisions')
    const member = await gym.person('Member', ['member'])
    const revision = async () =>
      (await boardRevisions([gym.scheduledClassId], test.db))[0]?.revision
    expect(await revision()).toBe(0)
    const events = stamped([begun(gym.versionId), round(1)])
    const params = {
      attemptId: v7(),
      now: NOW,
      input: { scheduledClassId: gym.scheduledClassId, versionId: gym.versionId, events },
    }
    await recordEvents(member, params, test.db)
    expect(await revision()).toBe(2)
    await recordEvents(member, params, test.db)
    expect(await revision()).toBe(2)
  })

  it('goes into a spreadsheet that runs nothing of what members typed', async () => {
    const gym = await makeGym(test.db, 'Spreadsheet')
    const coach = await gym.person('Coach', ['coach'])
    const member = await gym.person('=HYPERLINK("http://evil.example")', ['member'])
    await play(gym, member, [
      { type: 'finished', classMs: 900_000 },
      { type: 'rated', classMs: 900_000, rpe: 3, note: '@SUM(1+1)' },
    ])
    const csv = boardCsv(
      await boardOf(gym, coach),
      parseBoardView(new URLSearchParams()),
      NOW.getTime(),
    )
    // OWASP, CSV Injection: a cell must not begin with =, +, -, @, tab or carriage return.
    expect(csv).not.toMatch(/(^|[,\n]"?)[=+@\t]/m)
    expect(csv).toContain("'=HYPERLINK")
  })
})

describe('what an owner sees', () => {
  it('is people and how many came, without any health data', async () => {
    const gym = await makeGym(test.db, 'Owned')
    const owner = await gym.person('Owner', ['owner'])
    const member = await gym.person('Member', ['member'], {
      answered: ['pregnant-or-recent-birth'],
    })
    await play(gym, member, [{ type: 'hurt', classMs: 1_000, where: 'knee', note: 'swollen' }], {
      todayNote: 'a cold',
    })
    const overview = await getGymOverview(owner, {}, test.db)
    const counts = await participation(
      owner,
      { scheduledClassIds: [gym.scheduledClassId] },
      test.db,
    )
    expect([...counts.values()]).toEqual([{ started: 1, finished: 0 }])
    expect(overview.people.map((one) => one.name)).toEqual(['Member', 'Owner'])
    expect(JSON.stringify([overview, ...counts])).not.toMatch(/knee|swollen|a cold|pregnan/)
    const coach = await gym.person('Coach', ['coach'])
    expect(await rejection(getGymOverview(coach, {}, test.db))).toBe('not-found')
  })
})

describe('today', () => {
  it('is the gym’s own day, whatever the server’s clock calls it', async () => {
    const gym = await makeGym(test.db, 'Days')
    const member = await gym.person('Member', ['member'])
    const listed = async (instant: string) =>
      (await listToday(member, { now: new Date(instant) }, test.db)).length
    // Oslo is one hour ahead of UTC in winter: 1 December there is from 23:00 on the day before.
    expect(await listed('2026-11-30T22:59:59Z')).toBe(0)
    expect(await listed('2026-11-30T23:00:00Z')).toBe(1)
    expect(await listed('2026-12-01T22:59:59Z')).toBe(1)
    expect(await listed('2026-12-01T23:00:00Z')).toBe(0)
  })
})
