import 'server-only'
/** The coach's board. Coaches of the gym only: a board holds health data. */
import { and, asc, eq, inArray, sql } from 'drizzle-orm'
import type { DbOrTx } from '@/db/client'
import { timed } from '@/db/deadline'
import { attemptEvents } from '@/db/schema/attempt-events'
import { attempts } from '@/db/schema/attempts'
import { gyms } from '@/db/schema/gyms'
import { memberships } from '@/db/schema/memberships'
import { people } from '@/db/schema/people'
import { scheduledClasses } from '@/db/schema/scheduled-classes'
import type { BoardDto, BoardRow, LiveBoardChange } from '@/server/contract/board'
import { AppError } from '@/server/contract/errors'
import type { Viewer } from '@/server/contract/viewer'
import { noteForCoach } from '@/server/engine/fit/screening'
import type { ClassEvent } from '@/server/engine/tally/events'
import { fold } from '@/server/engine/tally/fold'
import { getScheduledClass, versionsOf } from './classes'
import { standingInputs } from './health'
import { forecastsOf, getLearntPaces } from './paces'

type AttemptRow = typeof attempts.$inferSelect

/** The board of one class. Throws `not-found` for another gym's and for anybody who is no coach. */
export const getBoard = timed(
  async (
    viewer: Viewer,
    params: { scheduledClassId: string; now: Date },
    db: DbOrTx,
  ): Promise<BoardDto> => {
    mustCoach(viewer)
    const { scheduledClass, version } = await getScheduledClass(viewer, params, db)
    const all = await db
      .select()
      .from(attempts)
      .where(eq(attempts.scheduledClassId, params.scheduledClassId))
      .orderBy(asc(attempts.createdAt), asc(attempts.id))
    const members = await membersOf(db, viewer.gymId, scheduledClass.group, all)
    const byMember = new Map<string, AttemptRow[]>()
    for (const attempt of all) {
      byMember.set(attempt.membershipId, [...(byMember.get(attempt.membershipId) ?? []), attempt])
    }
    const shown = members.flatMap((member) => shownAttempt(byMember.get(member.membershipId)) ?? [])
    const events = await eventsByAttempt(
      db,
      shown.map((attempt) => attempt.id),
    )
    const olderVersions = await versionsOf(
      db,
      shown
        .map((attempt) => attempt.versionId)
        .filter((versionId) => versionId !== scheduledClass.versionId),
    )
    const notes = await healthNotes(
      db,
      viewer.gymId,
      members.map((one) => one.membershipId),
      params.now,
    )
    const rows = members.map(({ membershipId, memberName }): BoardRow => {
      const own = byMember.get(membershipId) ?? []
      const attempt = shownAttempt(own)
      return {
        membershipId,
        memberName,
        attemptId: attempt?.id ?? null,
        otherAttempts: Math.max(0, own.length - 1),
        late: attempt?.late ?? false,
        startedAt: attempt?.startedAt?.toISOString() ?? null,
        finishedAt: attempt?.finishedAt?.toISOString() ?? null,
        lastEventAt: attempt?.lastEventAt?.toISOString() ?? null,
        todayNote: attempt?.todayNote ?? null,
        healthNote: notes.get(membershipId) ?? null,
        // Each by the version that it was done on, which need not be the one scheduled now.
        tally: attempt
          ? fold(olderVersions.get(attempt.versionId) ?? version, events.get(attempt.id) ?? [])
          : null,
      }
    })
    return {
      scheduledClass,
      timeZone: viewer.gym.timeZone,
      versionId: scheduledClass.versionId,
      version,
      forecast: forecastsOf(version, await getLearntPaces(viewer, { now: params.now }, db)),
      rows,
      revision: all.reduce((sum, attempt) => sum + attempt.revision, 0),
      readAt: params.now.toISOString(),
    }
  },
)

/** Done twice, the latest finished one is shown; before any is finished, the latest. */
function shownAttempt(own: readonly AttemptRow[] | undefined): AttemptRow | undefined {
  return own?.findLast((attempt) => attempt.finishedAt !== null) ?? own?.at(-1)
}

/** Active members of the class's group, and whoever did it all the same. */
async function membersOf(
  db: DbOrTx,
  gymId: string,
  group: string | null,
  all: readonly AttemptRow[],
): Promise<{ membershipId: string; memberName: string }[]> {
  const came = new Set(all.map((attempt) => attempt.membershipId))
  const rows = await db
    .select({
      membershipId: memberships.id,
      memberName: people.name,
      roles: memberships.roles,
      group: memberships.group,
      deactivatedAt: memberships.deactivatedAt,
    })
    .from(memberships)
    .innerJoin(people, eq(people.id, memberships.personId))
    .where(eq(memberships.gymId, gymId))
    .orderBy(asc(people.name))
  return rows.filter(
    (row) =>
      came.has(row.membershipId) ||
      (row.deactivatedAt === null &&
        row.roles.includes('member') &&
        (group === null || row.group === group)),
  )
}

async function eventsByAttempt(db: DbOrTx, ids: string[]): Promise<Map<string, ClassEvent[]>> {
  const events = new Map<string, ClassEvent[]>()
  if (ids.length === 0) return events
  const rows = await db
    .select({ attemptId: attemptEvents.attemptId, content: attemptEvents.content })
    .from(attemptEvents)
    .where(inArray(attemptEvents.attemptId, ids))
  for (const row of rows) {
    const own = events.get(row.attemptId)
    if (own) own.push(row.content)
    else events.set(row.attemptId, [row.content])
  }
  return events
}

async function healthNotes(
  db: DbOrTx,
  gymId: string,
  membershipIds: string[],
  now: Date,
): Promise<Map<string, string>> {
  const [gym] = await db
    .select({ intervalDays: gyms.healthIntervalDays })
    .from(gyms)
    .where(eq(gyms.id, gymId))
  const inputs = await standingInputs(db, membershipIds, gym?.intervalDays ?? 90, now)
  return new Map(
    [...inputs].flatMap(([membershipId, input]) => {
      const note = noteForCoach(input)
      return note ? [[membershipId, note] as const] : []
    }),
  )
}

/** Which of these boards the viewer may listen to. */
export const listenableBoards = timed(
  async (
    viewer: Viewer,
    params: { scheduledClassIds: string[] },
    db: DbOrTx,
  ): Promise<string[]> => {
    mustCoach(viewer)
    if (params.scheduledClassIds.length === 0) return []
    const rows = await db
      .select({ id: scheduledClasses.id })
      .from(scheduledClasses)
      .where(
        and(
          eq(scheduledClasses.gymId, viewer.gymId),
          inArray(scheduledClasses.id, params.scheduledClassIds),
        ),
      )
    return rows.map((row) => row.id)
  },
)

/** Revisions of boards: how many events their attempts hold. For the live room, which has checked who listens. */
export const boardRevisions = timed(
  async (scheduledClassIds: string[], db: DbOrTx): Promise<LiveBoardChange[]> => {
    if (scheduledClassIds.length === 0) return []
    const rows = await db
      .select({
        scheduledClassId: attempts.scheduledClassId,
        revision: sql<string>`sum(${attempts.revision})`,
      })
      .from(attempts)
      .where(inArray(attempts.scheduledClassId, scheduledClassIds))
      .groupBy(attempts.scheduledClassId)
    return scheduledClassIds.map((scheduledClassId) => ({
      scheduledClassId,
      revision: Number(
        rows.find((row) => row.scheduledClassId === scheduledClassId)?.revision ?? 0,
      ),
    }))
  },
)

/** Members who took part, by class: no health data in it, so an owner may see it too. */
export const participation = timed(
  async (
    viewer: Viewer,
    params: { scheduledClassIds: string[] },
    db: DbOrTx,
  ): Promise<Map<string, { started: number; finished: number }>> => {
    if (!viewer.roles.includes('coach') && !viewer.roles.includes('owner')) {
      throw new AppError('not-found', 'There is no such page.')
    }
    if (params.scheduledClassIds.length === 0) return new Map()
    const rows = await db
      .select({
        id: attempts.scheduledClassId,
        started: sql<string>`count(distinct ${attempts.membershipId})`,
        finished: sql<string>`count(distinct ${attempts.membershipId}) filter (where ${attempts.finishedAt} is not null)`,
      })
      .from(attempts)
      .where(
        and(
          eq(attempts.gymId, viewer.gymId),
          inArray(attempts.scheduledClassId, params.scheduledClassIds),
        ),
      )
      .groupBy(attempts.scheduledClassId)
    return new Map(
      rows.map((row) => [row.id, { started: Number(row.started), finished: Number(row.finished) }]),
    )
  },
)

function mustCoach(viewer: Viewer): void {
  if (!viewer.roles.includes('coach')) throw new AppError('not-found', 'There is no such board.')
}
