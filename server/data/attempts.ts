import 'server-only'
/** Recording and reading attempts. */
import { and, asc, desc, eq, inArray, sql } from 'drizzle-orm'
import { v7 } from 'uuid'
import { executePrepared, type DbOrTx } from '@/db/client'
import { timed } from '@/db/deadline'
import { attemptEvents } from '@/db/schema/attempt-events'
import { attempts } from '@/db/schema/attempts'
import { auditEntries } from '@/db/schema/audit-entries'
import { classVersions } from '@/db/schema/class-versions'
import { hurtHolds } from '@/db/schema/hurt-holds'
import { memberships } from '@/db/schema/memberships'
import { people } from '@/db/schema/people'
import { scheduledClasses } from '@/db/schema/scheduled-classes'
import type { AttemptDto, RecordEventsInput, RecordEventsResult } from '@/server/contract/attempts'
import type { HealthStanding } from '@/server/contract/classes'
import { AppError } from '@/server/contract/errors'
import type { Viewer } from '@/server/contract/viewer'
import type { ClassEvent } from '@/server/engine/tally/events'
import { fold } from '@/server/engine/tally/fold'
import type { AttemptState } from '@/server/engine/tally/types'
import { tellBoard } from './board-notices'
import { getScheduledClass, visibleTo } from './classes'
import { getHealth, openHolds } from './health'

const STATE_AFTER: Partial<Record<ClassEvent['type'], AttemptState>> = {
  started: 'in-class',
  resumed: 'in-class',
  paused: 'paused',
  stopped: 'stopped',
  finished: 'finished',
}

function byOrder(a: ClassEvent, b: ClassEvent): number {
  return a.seq - b.seq || (a.id < b.id ? -1 : 1)
}

type RecordParams = { attemptId: string; input: RecordEventsInput; now: Date }

/**
 * Stores events of the viewer's own attempt, each exactly once whatever is repeated, and answers with
 * the ids that are stored now. The attempt is made by its first events. Throws `not-found` for a class
 * that is not the viewer's or another member's attempt, `conflict` for another class or version than
 * the attempt's, `not-allowed` where health answers keep a new attempt from starting.
 */
export const recordEvents = timed(
  async (viewer: Viewer, params: RecordParams, db: DbOrTx): Promise<RecordEventsResult> => {
    const { input } = params
    const hasMore = input.events.some((event) => event.type === 'started' || event.type === 'hurt')
    // Nearly all batches are rounds of an attempt that stands, and one statement is a transaction.
    const stored =
      (hasMore ? null : await store(viewer, params, db)) ??
      (await db.transaction((tx) => beginAndStore(viewer, params, tx)))
    if (stored.fresh > 0) await tellBoard(db, input.scheduledClassId)
    return { stored: input.events.map((event) => event.id), highestSeq: stored.highestSeq }
  },
)

interface Stored {
  /** How many of the batch had not been stored before. */
  fresh: number
  highestSeq: number
}

async function beginAndStore(viewer: Viewer, params: RecordParams, tx: DbOrTx): Promise<Stored> {
  const { attemptId, input } = params
  const [known] = await tx.select().from(attempts).where(eq(attempts.id, attemptId)).for('update')
  if (known && known.membershipId !== viewer.membershipId) throw notThere()
  if (
    known &&
    (known.scheduledClassId !== input.scheduledClassId || known.versionId !== input.versionId)
  ) {
    throw new AppError(
      'conflict',
      'These rounds belong to another class than the one recorded here. They stay on this computer.',
    )
  }
  const started = input.events.filter((event) => event.type === 'started')
  if (started.some((event) => event.version !== input.versionId)) {
    throw new AppError('conflict', 'This class was started on another version of the class.')
  }
  if (!known) await begin(viewer, params, tx)
  const stored = await store(viewer, params, tx)
  if (!stored) throw notThere()
  if (started.length > 0 && stored.fresh > 0 && !known?.startedAt) {
    await auditStart(viewer, attemptId, tx)
  }
  await raiseHolds(viewer, params, tx)
  return stored
}

async function begin(
  viewer: Viewer,
  { attemptId, input, now }: RecordParams,
  tx: DbOrTx,
): Promise<void> {
  const [scheduled] = await tx
    .select()
    .from(scheduledClasses)
    .where(and(visibleTo(viewer), eq(scheduledClasses.id, input.scheduledClassId)))
  if (!scheduled || !viewer.roles.includes('member')) throw notThere()
  if (scheduled.versionId !== input.versionId) {
    // The class was published anew meanwhile: an attempt keeps the version that it began on.
    const versions = await tx
      .select({ id: classVersions.id, classId: classVersions.classId })
      .from(classVersions)
      .where(
        and(
          inArray(classVersions.id, [input.versionId, scheduled.versionId]),
          eq(classVersions.gymId, viewer.gymId),
        ),
      )
    const classOf = (id: string) => versions.find((version) => version.id === id)?.classId
    const asked = classOf(input.versionId)
    if (asked === undefined || asked !== classOf(scheduled.versionId)) {
      throw new AppError('conflict', 'That is not a version of this class.')
    }
  }
  const first =
    input.events.find((event) => event.type === 'started') ?? [...input.events].sort(byOrder)[0]
  const begunAt = saidAt(first?.wallMs ?? now.getTime(), now)
  // Begun without a network, a class may arrive after the answers ran out: those of then count as well.
  const mayPlay =
    isClear(await getHealth(viewer, { now }, tx)) ||
    isClear(await getHealth(viewer, { now: begunAt, givenBy: begunAt }, tx))
  if (!mayPlay) {
    throw new AppError(
      'not-allowed',
      'The health questions come first. Answer them, then start the class.',
    )
  }
  await tx
    .insert(attempts)
    .values({
      id: attemptId,
      gymId: viewer.gymId,
      membershipId: viewer.membershipId,
      scheduledClassId: scheduled.id,
      versionId: input.versionId,
      late: begunAt > scheduled.closesAt,
      todayNote: input.todayNote?.trim() || null,
      createdAt: now,
    })
    .onConflictDoNothing()
  const [made] = await tx
    .select({ membershipId: attempts.membershipId })
    .from(attempts)
    .where(eq(attempts.id, attemptId))
    .for('update')
  if (made?.membershipId !== viewer.membershipId) throw notThere()
}

/** For this long a class may wait on a member's computer to be sent. */
const MOST_UNSENT_MS = 60 * 86_400_000

/** An instant that a member's computer names, where it can be right; else that of receipt. */
function saidAt(wallMs: number, now: Date): Date {
  const isPlausible = wallMs <= now.getTime() && wallMs >= now.getTime() - MOST_UNSENT_MS
  return isPlausible ? new Date(wallMs) : now
}

function isClear(health: HealthStanding): boolean {
  return health.standing === 'clear' && !health.consentMissing
}

/**
 * Stores what is new of a batch of the viewer's own attempt and keeps the attempt's dates and state, in
 * one statement. Null where there is no such attempt of theirs. Each part bears being repeated: what
 * was known changes nothing. Batches insert in one order, so that two that overlap wait, not deadlock.
 */
async function store(
  viewer: Viewer,
  { attemptId, input, now }: RecordParams,
  db: DbOrTx,
): Promise<Stored | null> {
  const events = [...input.events].sort(byOrder)
  const started = events.find((event) => event.type === 'started')
  const finished = events.findLast((event) => event.type === 'finished')
  const turning = events.findLast((event) => STATE_AFTER[event.type] !== undefined)
  const state = turning ? (STATE_AFTER[turning.type] ?? null) : null
  const said = (event: ClassEvent | undefined) =>
    event ? saidAt(event.wallMs, now).toISOString() : null
  const [row] = await executePrepared<{ highest: string; fresh: string }>(
    db,
    sql`
    with own as (
      select id from ${attempts}
      where id = ${attemptId} and membership_id = ${viewer.membershipId}
        and scheduled_class_id = ${input.scheduledClassId} and version_id = ${input.versionId}
    ), inserted as (
      insert into ${attemptEvents} (attempt_id, id, seq, content, received_at)
      select own.id, event ->> 'id', (event ->> 'seq')::bigint, event, ${now.toISOString()}::timestamptz
      from own, jsonb_array_elements(${JSON.stringify(events)}::text::jsonb) event
      on conflict do nothing
      returning 1
    ), noted as (
      update ${attempts} set
        revision = revision + fresh.count,
        last_event_at = ${now.toISOString()}::timestamptz,
        started_at = coalesce(started_at, ${said(started)}::timestamptz),
        finished_at = coalesce(finished_at, ${said(finished)}::timestamptz),
        state = case when state_seq < ${turning?.seq ?? -1}::bigint then ${state}::text else state end,
        state_seq = greatest(state_seq, ${turning?.seq ?? -1}::bigint)
      from (select count(*) from inserted) fresh
      where id = ${attemptId} and fresh.count > 0
    )
    select (select count(*) from inserted) as fresh, greatest(${events.at(-1)?.seq ?? 0}::bigint, (
      select seq from ${attemptEvents} where attempt_id = own.id order by seq desc limit 1
    )) as highest
    from own`,
  )
  return row ? { fresh: Number(row.fresh), highestSeq: Number(row.highest) } : null
}

/** 'This hurts' keeps the easier option for that place until member and coach have cleared it. */
async function raiseHolds(
  viewer: Viewer,
  { attemptId, input, now }: RecordParams,
  tx: DbOrTx,
): Promise<void> {
  const hurts = input.events.filter((event) => event.type === 'hurt')
  if (hurts.length === 0) return
  await tx
    .insert(hurtHolds)
    .values(
      hurts.map((event) => ({
        id: event.id,
        membershipId: viewer.membershipId,
        attemptId,
        place: event.where,
        createdAt: now,
      })),
    )
    .onConflictDoNothing()
}

async function auditStart(viewer: Viewer, attemptId: string, tx: DbOrTx): Promise<void> {
  await tx.insert(auditEntries).values({
    id: v7(),
    gymId: viewer.gymId,
    personId: viewer.personId,
    action: 'attempt.started',
    subject: attemptId,
  })
}

/** One attempt: the member's own, or any of the gym for its coaches. Throws `not-found` otherwise. */
export const getAttempt = timed(
  async (viewer: Viewer, params: { attemptId: string }, db: DbOrTx): Promise<AttemptDto> => {
    const isCoach = viewer.roles.includes('coach')
    const [row] = await db
      .select({ attempt: attempts, memberName: people.name, version: classVersions.content })
      .from(attempts)
      .innerJoin(memberships, eq(memberships.id, attempts.membershipId))
      .innerJoin(people, eq(people.id, memberships.personId))
      .innerJoin(classVersions, eq(classVersions.id, attempts.versionId))
      .where(
        and(
          eq(attempts.id, params.attemptId),
          eq(attempts.gymId, viewer.gymId),
          isCoach ? undefined : eq(attempts.membershipId, viewer.membershipId),
        ),
      )
    if (!row) throw notThere()
    const { attempt, memberName, version } = row
    const { scheduledClass } = await getScheduledClass(
      viewer,
      { scheduledClassId: attempt.scheduledClassId },
      db,
    )
    const events = await db
      .select({ event: attemptEvents.content, receivedAt: attemptEvents.receivedAt })
      .from(attemptEvents)
      .where(eq(attemptEvents.attemptId, attempt.id))
      .orderBy(asc(attemptEvents.seq), asc(attemptEvents.id))
    return {
      attemptId: attempt.id,
      membershipId: attempt.membershipId,
      memberName,
      scheduledClass,
      versionId: attempt.versionId,
      version,
      late: attempt.late,
      todayNote: attempt.todayNote,
      startedAt: attempt.startedAt?.toISOString() ?? null,
      finishedAt: attempt.finishedAt?.toISOString() ?? null,
      lastEventAt: attempt.lastEventAt?.toISOString() ?? null,
      tally: fold(
        version,
        events.map((one) => one.event),
      ),
      events: events.map((one) => ({ event: one.event, receivedAt: one.receivedAt.toISOString() })),
      holds: await openHolds(db, attempt.membershipId),
    }
  },
)

/** An attempt in a list of one's own. */
export interface OwnAttempt {
  attemptId: string
  scheduledClassId: string
  title: string
  day: string
  state: AttemptState
  startedAt: string | null
  late: boolean
  rpe: number | null
}

const ATTEMPTS_A_PAGE = 50

/** The viewer's own attempts, latest first, 50 at a time; `before` is the id of the last one seen. */
export const listOwnAttempts = timed(
  async (
    viewer: Viewer,
    params: { before: string | null },
    db: DbOrTx,
  ): Promise<{ attempts: OwnAttempt[]; more: boolean }> => {
    const rows = await db
      .select({
        attempt: attempts,
        title: sql<string>`${classVersions.content} -> 'spec' ->> 'title'`,
        day: scheduledClasses.day,
        rpe: sql<
          number | null
        >`(select (${attemptEvents.content} ->> 'rpe')::float from ${attemptEvents} where ${attemptEvents.attemptId} = ${attempts.id} and ${attemptEvents.content} ->> 'type' = 'rated' order by ${attemptEvents.seq} desc limit 1)`,
      })
      .from(attempts)
      .innerJoin(classVersions, eq(classVersions.id, attempts.versionId))
      .innerJoin(scheduledClasses, eq(scheduledClasses.id, attempts.scheduledClassId))
      .where(
        and(
          eq(attempts.membershipId, viewer.membershipId),
          params.before === null
            ? undefined
            : sql`(${attempts.createdAt}, ${attempts.id}) < (select seen.created_at, seen.id from ${attempts} seen where seen.id = ${params.before} and seen.membership_id = ${viewer.membershipId})`,
        ),
      )
      .orderBy(desc(attempts.createdAt), desc(attempts.id))
      .limit(ATTEMPTS_A_PAGE + 1)
    return {
      attempts: rows.slice(0, ATTEMPTS_A_PAGE).map(({ attempt, title, day, rpe }) => ({
        attemptId: attempt.id,
        scheduledClassId: attempt.scheduledClassId,
        title,
        day,
        state: attempt.state,
        startedAt: attempt.startedAt?.toISOString() ?? null,
        late: attempt.late,
        rpe,
      })),
      more: rows.length > ATTEMPTS_A_PAGE,
    }
  },
)

/** The viewer's latest attempt of a scheduled class that is neither finished nor stopped, with its events. */
export async function openAttemptOf(
  db: DbOrTx,
  viewer: Viewer,
  scheduledClassId: string,
): Promise<{ attemptId: string; versionId: string; events: ClassEvent[] } | null> {
  const [attempt] = await db
    .select({ id: attempts.id, versionId: attempts.versionId })
    .from(attempts)
    .where(
      and(
        eq(attempts.membershipId, viewer.membershipId),
        eq(attempts.scheduledClassId, scheduledClassId),
        inArray(attempts.state, ['in-class', 'paused']),
      ),
    )
    .orderBy(desc(attempts.createdAt))
    .limit(1)
  if (!attempt) return null
  const events = await eventsOf(db, attempt.id)
  return { attemptId: attempt.id, versionId: attempt.versionId, events }
}

/** Events of one attempt in their order. */
export async function eventsOf(db: DbOrTx, attemptId: string): Promise<ClassEvent[]> {
  const rows = await db
    .select({ content: attemptEvents.content })
    .from(attemptEvents)
    .where(eq(attemptEvents.attemptId, attemptId))
    .orderBy(asc(attemptEvents.seq), asc(attemptEvents.id))
  return rows.map((row) => row.content)
}

function notThere(): AppError {
  return new AppError('not-found', 'There is no such class or attempt.')
}
