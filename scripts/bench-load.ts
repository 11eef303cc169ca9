/** A crowd that records over HTTP, each member as their player would: one event a request, in order. */
import { Agent, request } from 'node:http'
import { performance } from 'node:perf_hooks'
import { setTimeout as sleep } from 'node:timers/promises'
import { sql } from 'drizzle-orm'
import { v7 } from 'uuid'
import { openDatabase, type Database } from '@/db/client'
import { seededRandom } from '@/db/seed/random'
import { paths } from '@/server/contract/paths'
import type { ClassEvent } from '@/server/engine/tally/events'
// The browser test and the bench plant one class, which lies with the tests.
// eslint-disable-next-line no-restricted-imports
import { beepingClass, plantClass } from '@/tests/support/sound-class'
import type { BenchRow } from './bench-row'

const MEMBERS = 500
const EVENTS = 40
const MINUTE_MS = 60_000
const CUT_SHARE = 0.05
const ANSWER_MS = 15_000
const RETRY_MS = 1_000

/** As its player begins, counts its rounds and ends. */
function eventsOf(versionId: string): ClassEvent[] {
  return Array.from({ length: EVENTS }, (_, index): ClassEvent => {
    const stamp = {
      id: v7(),
      device: 'bench',
      seq: index + 1,
      classMs: index * 1_000,
      wallMs: Date.now(),
    }
    if (index === 0)
      return { ...stamp, type: 'started', version: versionId, counting: 'press', options: [] }
    if (index === EVENTS - 1) return { ...stamp, type: 'finished' }
    return { ...stamp, type: 'round-done', block: 'beeps', round: index, by: 'member' }
  })
}

/**
 * Posts `body`. With `cut` the connection goes as the answer begins, which is after the server has
 * committed: whoever sent it knows nothing of that.
 */
function post(
  agent: Agent,
  url: URL,
  headers: Record<string, string>,
  body: string,
  cut: boolean,
): Promise<number | 'cut'> {
  return new Promise((resolve, reject) => {
    const asking = request(
      url,
      {
        method: 'POST',
        agent,
        headers: { ...headers, 'content-length': Buffer.byteLength(body) },
        timeout: ANSWER_MS,
      },
      (answer) => {
        if (cut) {
          answer.destroy()
          resolve('cut')
          return
        }
        answer.resume()
        answer.once('end', () => resolve(answer.statusCode ?? 0))
        answer.once('error', reject)
      },
    )
    asking.once('timeout', () => asking.destroy(new Error('No answer.')))
    asking.once('error', reject)
    asking.end(body)
  })
}

interface Counts {
  answersMs: number[]
  cuts: number
  /** Answers other than 200, and none at all. */
  failures: number
}

/** Measures the product served at `origin` by one process, on the database at `url`. */
export async function loadRow(origin: string, url: string): Promise<BenchRow> {
  const { db, sql: pool } = openDatabase(url, 4)
  try {
    return await measured(origin, db)
  } finally {
    await pool.end({ timeout: 5 })
  }
}

async function measured(origin: string, db: Database): Promise<BenchRow> {
  const random = seededRandom(500)
  const planted = await plantClass(
    db,
    beepingClass({
      type: 'rounds',
      seconds: 600,
      stations: [
        { movement: 'goblet-squat', reps: 2 },
        { movement: 'push-up', reps: 2 },
      ],
    }),
  )
  const [scheduledClassId = ''] = planted.scheduledClassIds
  const crowd: { cookie: string; attemptId: string; events: ClassEvent[] }[] = []
  for (let index = 0; index < MEMBERS; index += 1) {
    const { cookie } = await planted.member(`Member ${index + 1}`)
    crowd.push({ cookie, attemptId: v7(), events: eventsOf(planted.versionId) })
  }
  // A connection each, as browsers have.
  const agent = new Agent({ keepAlive: true, maxSockets: MEMBERS })
  const counts: Counts = { answersMs: [], cuts: 0, failures: 0 }

  const send = async (one: (typeof crowd)[number], event: ClassEvent) => {
    const body = JSON.stringify({
      scheduledClassId,
      versionId: planted.versionId,
      todayNote: null,
      events: [event],
    })
    const headers = {
      'content-type': 'application/json',
      origin,
      cookie: `floorside=${one.cookie}`,
    }
    const address = new URL(paths.api.attemptEvents(one.attemptId), origin)
    for (let attempt = 0; attempt < 20; attempt += 1) {
      const isCut = random.chance(CUT_SHARE)
      const fromMs = performance.now()
      const status = await post(agent, address, headers, body, isCut).catch(() => 0)
      // What is cut has been answered by then as well.
      if (status === 200 || status === 'cut') counts.answersMs.push(performance.now() - fromMs)
      if (status === 200) return
      if (status === 'cut') counts.cuts += 1
      else {
        counts.failures += 1
        await sleep(RETRY_MS)
      }
    }
  }

  // Each at moments of their own in the minute; a member's next waits for the one before.
  const fromMs = performance.now()
  await Promise.all(
    crowd.map(async (one) => {
      const moments = one.events.map(() => random.between(0, MINUTE_MS)).sort((a, b) => a - b)
      for (const [index, event] of one.events.entries()) {
        await sleep(Math.max(0, fromMs + (moments[index] ?? 0) - performance.now()))
        await send(one, event)
      }
    }),
  )
  const tookS = (performance.now() - fromMs) / 1_000
  agent.destroy()

  const sent = crowd.flatMap((one) => one.events.map((event) => `${one.attemptId} ${event.id}`))
  const rows = await db.execute<{ attempt_id: string; id: string }>(sql`
    select e.attempt_id, e.id from attempt_events e
    join attempts a on a.id = e.attempt_id where a.gym_id = ${planted.gymId}`)
  const [noted] = await db.execute<{ revision: string }>(
    sql`select sum(revision) as revision from attempts where gym_id = ${planted.gymId}`,
  )
  const stored = [...rows].map((row) => `${row.attempt_id} ${row.id}`)
  const known = new Set(stored)
  const lost = sent.filter((one) => !known.has(one)).length
  // The tables, and the count that boards go by, must both have each event once.
  const doubled = Math.max(
    stored.length - known.size,
    stored.length - (sent.length - lost),
    Number(noted?.revision ?? 0) - known.size,
  )
  const p99Ms = percentile(counts.answersMs, 0.99)
  return {
    what: `recording over HTTP: ${MEMBERS} members, ${EVENTS} events each, in a minute (${tookS.toFixed(0)} s); ${counts.cuts} requests cut after the commit`,
    measured: `${lost} lost, ${doubled} doubled, p99 ${p99Ms.toFixed(0)} ms${counts.failures > 0 ? `, ${counts.failures} not answered well` : ''}`,
    bar: '0, 0, ≤ 500 ms',
    isHeld: lost === 0 && doubled === 0 && p99Ms <= 500 && counts.failures === 0 && tookS < 62,
  }
}

/** Nearest rank. */
function percentile(values: readonly number[], share: number): number {
  const sorted = [...values].sort((a, b) => a - b)
  return sorted[Math.max(0, Math.ceil(share * sorted.length) - 1)] ?? Number.NaN
}
