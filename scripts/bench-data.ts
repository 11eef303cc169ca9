/** What recording and reading come to on a real database, as ratios taken in one run. */
import { performance } from 'node:perf_hooks'
import { randomUUID } from 'node:crypto'
import { sql } from 'drizzle-orm'
import postgres from 'postgres'
import { v7 } from 'uuid'
import { openDatabase, type Database } from '@/db/client'
import { migrateDatabase } from '@/db/migrate'
import { seedDemoGym } from '@/db/seed'
import type { Viewer } from '@/server/contract/viewer'
import { recordEvents } from '@/server/data/attempts'
import { getBoard } from '@/server/data/boards'
import type { ClassEvent } from '@/server/engine/tally/events'
import type { BenchRow } from './bench-row'

const LANES = 32
const REQUESTS = 3_000
const TURNS = 5
const ATTEMPTS = 200
const FEW_EVENTS = 10_000
const MANY_EVENTS = 1_000_000
const EVENTS_AN_ATTEMPT = 40
const READINGS = 31

function median(values: number[]): number {
  return values.sort((a, b) => a - b)[Math.floor(values.length / 2)] ?? Number.NaN
}

/** Requests a second, `LANES` at a time. */
async function rate(work: (turn: number) => Promise<unknown>): Promise<number> {
  let next = 0
  const from = performance.now()
  await Promise.all(
    Array.from({ length: LANES }, async () => {
      while (next < REQUESTS) await work(next++)
    }),
  )
  return (REQUESTS / (performance.now() - from)) * 1_000
}

/** The columns of a person at the demo gym, as a query gives them. */
type PersonRow = {
  membership_id: string
  person_id: string
  gym_id: string
  roles: Viewer['roles']
  name: string
  email: string
  gym_name: string
  place: string
  time_zone: string
}

async function viewersOf(db: Database): Promise<Viewer[]> {
  const rows = await db.execute<PersonRow>(sql`
    select m.id as membership_id, m.person_id, m.gym_id, m.roles, p.name, p.email,
      g.name as gym_name, g.place, g.time_zone
    from memberships m join people p on p.id = m.person_id join gyms g on g.id = m.gym_id`)
  return [...rows].map((row) => ({
    personId: row.person_id,
    membershipId: row.membership_id,
    gymId: row.gym_id,
    roles: row.roles,
    name: row.name,
    email: row.email,
    gym: { name: row.gym_name, place: row.place, timeZone: row.time_zone },
    gyms: [{ gymId: row.gym_id, name: row.gym_name }],
  }))
}

/** The fullest class of the demo: the one whose board is read. */
async function fullestClass(db: Database): Promise<{ id: string; version_id: string }> {
  const [row] = await db.execute<{ id: string; version_id: string }>(sql`
    select s.id, s.version_id from scheduled_classes s join attempts a on a.scheduled_class_id = s.id
    group by s.id order by count(*) desc limit 1`)
  if (!row) throw new Error('The demo has no class that was played.')
  return row
}

async function recordingRow(db: Database, viewers: Viewer[]): Promise<BenchRow> {
  const { id: scheduledClassId, version_id: versionId } = await fullestClass(db)
  const members = viewers.filter((viewer) => viewer.roles.includes('member'))
  const attempts = Array.from({ length: ATTEMPTS }, (_, index) => {
    const viewer = members[index % members.length]
    if (!viewer) throw new Error('The demo has no members.')
    return { attemptId: v7(), viewer }
  })
  for (const { attemptId, viewer } of attempts) {
    await db.execute(sql`
      insert into attempts (id, gym_id, membership_id, scheduled_class_id, version_id)
      values (${attemptId}, ${viewer.gymId}, ${viewer.membershipId}, ${scheduledClassId}, ${versionId})`)
  }
  let seq = 0
  const event = (): ClassEvent => ({
    id: v7(),
    device: 'bench',
    seq: (seq += 1),
    type: 'round-done',
    classMs: 60_000,
    wallMs: Date.now(),
    block: 'work',
    round: 1,
    by: 'member',
  })
  const at = (turn: number) => {
    const attempt = attempts[turn % attempts.length]
    if (!attempt) throw new Error('No attempt to record.')
    return attempt
  }
  const bare = (turn: number) => {
    const one = event()
    const content = JSON.stringify(one)
    return db.$client`
      insert into attempt_events (attempt_id, id, seq, content, received_at)
      values (${at(turn).attemptId}, ${one.id}, ${one.seq}, ${content}::text::jsonb, now())
      on conflict do nothing`
  }
  const recorded = (turn: number) => {
    const { attemptId, viewer } = at(turn)
    const input = { scheduledClassId, versionId, events: [event()] }
    return recordEvents(viewer, { attemptId, input, now: new Date() }, db)
  }
  await rate(bare)
  await rate(recorded)
  const ratios: number[] = []
  const rates: number[] = []
  for (let turn = 0; turn < TURNS; turn += 1) {
    const bareRate = await rate(bare)
    const recordedRate = await rate(recorded)
    ratios.push(recordedRate / bareRate)
    rates.push(recordedRate)
  }
  const ratio = median(ratios)
  return {
    what: 'recording, against the same insert by bare postgres.js',
    measured: `${ratio.toFixed(2)} × (${Math.round(median(rates))} a second)`,
    bar: '≥ 0.5 ×',
    isHeld: ratio >= 0.5,
  }
}

/** Fills up to `count` events with attempts of other classes than `scheduledClassId`. */
async function fillTo(db: Database, count: number, scheduledClassId: string): Promise<void> {
  const [have] = await db.execute<{ count: string }>(sql`select count(*) from attempt_events`)
  const missing = Math.max(0, count - Number(have?.count ?? 0))
  const howMany = Math.ceil(missing / EVENTS_AN_ATTEMPT)
  if (howMany === 0) return
  // Longer than a reader may wait, so without the pool's own limit.
  await db.transaction(async (tx) => {
    await tx.execute(sql`set local statement_timeout = 0`)
    await tx.execute(sql`
      with classes as (select array_agg(id) ids, array_agg(version_id) versions
        from scheduled_classes where id <> ${scheduledClassId}),
      members as (select array_agg(id) ids, min(gym_id) gym_id from memberships),
      made as (
        insert into attempts (id, gym_id, membership_id, scheduled_class_id, version_id)
        select gen_random_uuid()::text, members.gym_id,
          members.ids[1 + n % cardinality(members.ids)],
          classes.ids[1 + n % cardinality(classes.ids)],
          classes.versions[1 + n % cardinality(classes.versions)]
        from generate_series(1, ${howMany}::int) n, classes, members returning id)
      insert into attempt_events (attempt_id, id, seq, content)
      select made.id, gen_random_uuid()::text, seq, jsonb_build_object(
        'id', seq::text, 'device', 'bench', 'seq', seq, 'type', 'round-done', 'classMs', seq * 1000,
        'wallMs', 0, 'block', 'work', 'round', seq, 'by', 'member')
      from made, generate_series(1, ${EVENTS_AN_ATTEMPT}::int) seq`)
    await tx.execute(sql`analyze attempts`)
    await tx.execute(sql`analyze attempt_events`)
  })
}

async function boardRow(db: Database, viewers: Viewer[]): Promise<BenchRow> {
  const coach = viewers.find((viewer) => viewer.roles.includes('coach'))
  if (!coach) throw new Error('The demo has no coach.')
  const { id: scheduledClassId } = await fullestClass(db)
  const readingMs = async () => {
    const times: number[] = []
    for (let reading = 0; reading < READINGS; reading += 1) {
      const from = performance.now()
      await getBoard(coach, { scheduledClassId, now: new Date() }, db)
      times.push(performance.now() - from)
    }
    return median(times)
  }
  await fillTo(db, FEW_EVENTS, scheduledClassId)
  await readingMs()
  const fewMs = await readingMs()
  await fillTo(db, MANY_EVENTS, scheduledClassId)
  const plan = await db.execute(sql`
    explain select content from attempt_events where attempt_id in
      (select id from attempts where scheduled_class_id = ${scheduledClassId})`)
  const isByIndex = !JSON.stringify(plan).includes('Seq Scan on attempt_events')
  await readingMs()
  const manyMs = await readingMs()
  const ratio = manyMs / fewMs
  return {
    what: `a board with ${MANY_EVENTS.toLocaleString('en')} events stored, against ${FEW_EVENTS.toLocaleString('en')}`,
    measured: `${ratio.toFixed(2)} × (${manyMs.toFixed(0)} ms, ${isByIndex ? 'by index' : 'BY READING ALL'})`,
    bar: '≤ 2 ×, by index',
    isHeld: ratio <= 2 && isByIndex,
  }
}

/** Measures on a database of its own on the server at `url`, and removes it. */
export async function dataRows(url: string): Promise<BenchRow[]> {
  const name = `floorside_bench_${randomUUID().replaceAll('-', '')}`
  const own = new URL(url)
  own.pathname = `/${name}`
  const admin = postgres(url, { max: 1, onnotice: () => undefined })
  await admin.unsafe(`create database ${name}`)
  try {
    await migrateDatabase(own.toString())
    return await measured(openDatabase(own.toString()).db)
  } finally {
    await admin.unsafe(`drop database if exists ${name} with (force)`)
    await admin.end({ timeout: 5 })
  }
}

async function measured(db: Database): Promise<BenchRow[]> {
  try {
    await seedDemoGym(db, { now: new Date(), hashPassword: async () => 'nobody signs in here' })
    const viewers = await viewersOf(db)
    // The board first: recording fills the fullest class.
    const board = await boardRow(db, viewers)
    const recording = await recordingRow(db, viewers)
    return [recording, board]
  } finally {
    // Before its database goes: a connection that is cut while it writes ends the process.
    await db.$client.end({ timeout: 5 })
  }
}
