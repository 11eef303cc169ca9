import { v7 } from 'uuid'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { learntPaces } from '@/db/schema/learnt-paces'
import type { Viewer } from '@/server/contract/viewer'
import { recordEvents } from '@/server/data/attempts'
import { getBoard } from '@/server/data/boards'
import { forecastsOf, getLearntPaces } from '@/server/data/paces'
import { blockPlan, roundReps } from '@/server/engine/pace/block-plan'
import { LEAST_ATTEMPTS } from '@/server/engine/pace/learn'
import { compile } from '@/server/engine/timeline/compile'
import type { EventDraft } from '@/server/engine/timeline/run-types'
import { makeTestDatabase, type TestDatabase } from '../support/database'
import { makeGym, NOW, stamped, type TestGym } from '../support/gym'

let test: TestDatabase
let gym: TestGym
let coach: Viewer
const HOUR_MS = 3_600_000

beforeAll(async () => {
  test = await makeTestDatabase()
  gym = await makeGym(test.db, 'Gym')
  coach = await gym.person('Coach', ['coach'])
})
afterAll(() => test.end())

/** Rounds of the first block with rounds, each taking `times` its planned time. */
function roundsAt(times: number): EventDraft[] {
  const block = gym.version.spec.blocks.find((one) => one.format.type === 'rounds')
  const plan = block && blockPlan(gym.version, block)
  if (!block || !plan) throw new Error('the class has a block with rounds')
  const bodyMs =
    compile(gym.version).segments.find((one) => one.block === block.id && one.kind === 'work')
      ?.startMs ?? 0
  const drafts: EventDraft[] = []
  let atSeconds = 0
  for (let round = 1; ; round += 1) {
    const reps = plan.stations.reduce(
      (sum, station) => sum + station.repsIn(round) * station.secondsPerRep,
      0,
    )
    const changes =
      plan.stations.length > 1
        ? plan.stations.reduce((sum, station) => sum + station.changeSeconds, 0)
        : 0
    atSeconds += reps * times + changes
    if (atSeconds > plan.seconds || roundReps(plan, round) === 0) return drafts
    drafts.push({
      type: 'round-done',
      classMs: bodyMs + Math.round(atSeconds * 1_000),
      block: block.id,
      round,
      by: 'member',
    })
  }
}

async function playedBy(name: string, times: number, now: Date): Promise<void> {
  const viewer = await gym.person(name, ['member'])
  const lengthMs = compile(gym.version).lengthMs
  await recordEvents(
    viewer,
    {
      attemptId: v7(),
      now,
      input: {
        scheduledClassId: gym.scheduledClassId,
        versionId: gym.versionId,
        events: stamped([
          { type: 'started', classMs: 0, version: gym.versionId, counting: 'press', options: [] },
          ...roundsAt(times),
          { type: 'finished', classMs: lengthMs },
        ]),
      },
    },
    test.db,
  )
}

describe('what a gym’s results teach', () => {
  it('is nothing before enough attempts: forecasts rest on the planned tempo', async () => {
    await playedBy('First', 1.5, NOW)
    const learnt = await getLearntPaces(coach, { now: NOW }, test.db)
    expect(learnt).toEqual({ paces: [], tiring: null })
    const board = await getBoard(
      coach,
      { scheduledClassId: gym.scheduledClassId, now: NOW },
      test.db,
    )
    expect(board.forecast.length).toBeGreaterThan(0)
    expect(board.forecast.every((one) => one.basis === null)).toBe(true)
  })

  it('is kept for an hour, then worked out anew with what has come', async () => {
    const soon = new Date(NOW.getTime() + 60_000)
    for (let index = 1; index < LEAST_ATTEMPTS; index += 1) {
      await playedBy(`M${index}`, 1.5, soon)
    }
    expect((await getLearntPaces(coach, { now: soon }, test.db)).paces).toEqual([])
    const later = new Date(NOW.getTime() + 2 * HOUR_MS)
    const learnt = await getLearntPaces(coach, { now: later }, test.db)
    expect(learnt.paces.length).toBeGreaterThan(0)
    expect(new Set(learnt.paces.map((pace) => pace.attempts))).toEqual(new Set([LEAST_ATTEMPTS]))
    const [row] = await test.db.select().from(learntPaces)
    expect(row?.computedAt).toEqual(later)
  })

  it('moves the forecast of blocks made of it, and says how many attempts stand behind it', async () => {
    const now = new Date(NOW.getTime() + 2 * HOUR_MS)
    const learnt = await getLearntPaces(coach, { now }, test.db)
    const planned = forecastsOf(gym.version, { paces: [], tiring: null })
    const taught = forecastsOf(gym.version, learnt)
    const index = taught.findIndex((one) => one.basis !== null)
    expect(taught[index]?.basis?.attempts).toBe(LEAST_ATTEMPTS)
    const reps = (one?: { rounds: number; reps: number }) =>
      (one?.rounds ?? 0) * 1_000 + (one?.reps ?? 0)
    expect(reps(taught[index])).toBeLessThan(reps(planned[index]))
  })

  it('of one gym is not the other’s', async () => {
    const other = await makeGym(test.db, 'Other')
    const stranger = await other.person('Coach', ['coach'])
    expect(await getLearntPaces(stranger, { now: NOW }, test.db)).toEqual({
      paces: [],
      tiring: null,
    })
  })
})
