import 'server-only'
/** Scheduled classes as members and coaches see them. */
import { TZDate } from '@date-fns/tz'
import { format } from 'date-fns'
import {
  and,
  asc,
  desc,
  eq,
  gt,
  gte,
  inArray,
  isNull,
  lt,
  lte,
  or,
  sql,
  type SQL,
} from 'drizzle-orm'
import type { DbOrTx } from '@/db/client'
import { timed } from '@/db/deadline'
import { attempts } from '@/db/schema/attempts'
import { classVersions } from '@/db/schema/class-versions'
import { memberships } from '@/db/schema/memberships'
import { people } from '@/db/schema/people'
import { scheduledClasses } from '@/db/schema/scheduled-classes'
import type { ScheduledClassSummary } from '@/server/contract/classes'
import { AppError } from '@/server/contract/errors'
import type { Viewer } from '@/server/contract/viewer'
import type { PublishedVersion } from '@/server/engine/spec/version'
import { compile, realLengthMs } from '@/server/engine/timeline/compile'
import type { Timeline } from '@/server/engine/timeline/types'

/** The gym's local date at an instant, yyyy-mm-dd. */
export function localDay(timeZone: string, at: Date): string {
  return format(new TZDate(at.getTime(), timeZone), 'yyyy-MM-dd')
}

/** What of the gym's schedule the viewer may see: coaches and owners all of it, members their group's and what they have done. */
export function visibleTo(viewer: Viewer): SQL | undefined {
  const mine = eq(scheduledClasses.gymId, viewer.gymId)
  if (viewer.roles.includes('coach') || viewer.roles.includes('owner')) return mine
  return and(
    mine,
    or(
      isNull(scheduledClasses.group),
      // A member without a group has a null here, which equals nothing: the gym-wide ones remain.
      eq(
        scheduledClasses.group,
        sql`(select ${memberships.group} from ${memberships} where ${memberships.id} = ${viewer.membershipId})`,
      ),
      sql`exists (select 1 from ${attempts} where ${attempts.scheduledClassId} = ${scheduledClasses.id} and ${attempts.membershipId} = ${viewer.membershipId})`,
    ),
  )
}

/** Which of the person's own gyms a class belongs to; null where it is none of theirs. */
export const ownGymOf = timed(
  async (
    viewer: Viewer,
    params: { scheduledClassId: string },
    db: DbOrTx,
  ): Promise<string | null> => {
    const [row] = await db
      .select({ gymId: scheduledClasses.gymId })
      .from(scheduledClasses)
      .where(
        and(
          eq(scheduledClasses.id, params.scheduledClassId),
          inArray(
            scheduledClasses.gymId,
            viewer.gyms.map((gym) => gym.gymId),
          ),
        ),
      )
    return row?.gymId ?? null
  },
)

type Row = Awaited<ReturnType<typeof selectClasses>>[number]

function selectClasses(db: DbOrTx, where: SQL | undefined) {
  return db
    .select({ scheduled: scheduledClasses, coachName: people.name })
    .from(scheduledClasses)
    .leftJoin(people, eq(people.id, scheduledClasses.coachId))
    .where(where)
    .$dynamic()
}

/** Published versions by id; a list of a year's classes holds only a few. */
export async function versionsOf(
  db: DbOrTx,
  ids: string[],
): Promise<Map<string, PublishedVersion>> {
  if (ids.length === 0) return new Map()
  const rows = await db
    .select({ id: classVersions.id, content: classVersions.content })
    .from(classVersions)
    .where(inArray(classVersions.id, [...new Set(ids)]))
  return new Map(rows.map((row) => [row.id, row.content]))
}

function blockLengths(
  { spec }: PublishedVersion,
  { segments }: Timeline,
): ScheduledClassSummary['blocks'] {
  return spec.blocks.map(({ id, kind }) => ({
    kind,
    lengthMs: segments
      .filter((segment) => segment.block === id)
      .reduce((sum, segment) => sum + segment.endMs - segment.startMs, 0),
  }))
}

/** Summaries of rows, with the viewer's own attempts. */
async function summarise(
  db: DbOrTx,
  viewer: Viewer,
  rows: Row[],
): Promise<ScheduledClassSummary[]> {
  const versions = await versionsOf(
    db,
    rows.map((row) => row.scheduled.versionId),
  )
  const lengths = new Map(
    [...versions].map(([id, version]) => {
      const timeline = compile(version)
      return [
        id,
        {
          real: realLengthMs(version),
          inClass: timeline.lengthMs,
          blocks: blockLengths(version, timeline),
        },
      ]
    }),
  )
  const own =
    rows.length === 0
      ? []
      : await db
          .select({
            attemptId: attempts.id,
            scheduledClassId: attempts.scheduledClassId,
            state: attempts.state,
            startedAt: attempts.startedAt,
          })
          .from(attempts)
          .where(
            and(
              eq(attempts.membershipId, viewer.membershipId),
              inArray(
                attempts.scheduledClassId,
                rows.map((row) => row.scheduled.id),
              ),
            ),
          )
          .orderBy(desc(attempts.createdAt))
  return rows.map(({ scheduled, coachName }) => {
    const version = versions.get(scheduled.versionId)
    const length = lengths.get(scheduled.versionId)
    return {
      scheduledClassId: scheduled.id,
      versionId: scheduled.versionId,
      title: version?.spec.title ?? '',
      focus: version?.spec.focus ?? null,
      day: scheduled.day,
      opensAt: scheduled.opensAt.toISOString(),
      closesAt: scheduled.closesAt.toISOString(),
      group: scheduled.group,
      coachName,
      realLengthMs: length?.real ?? 0,
      classLengthMs: length?.inClass ?? 0,
      blocks: length?.blocks ?? [],
      myAttempts: own
        .filter((attempt) => attempt.scheduledClassId === scheduled.id)
        .map(({ attemptId, state, startedAt }) => ({
          attemptId,
          state,
          startedAt: startedAt?.toISOString() ?? null,
        })),
    }
  })
}

const MOST_LISTED = 500

/** Classes on the gym's today, in the order in which they open. */
export const listToday = timed(
  async (viewer: Viewer, params: { now: Date }, db: DbOrTx): Promise<ScheduledClassSummary[]> => {
    const day = localDay(viewer.gym.timeZone, params.now)
    const rows = await selectClasses(
      db,
      and(visibleTo(viewer), eq(scheduledClasses.day, day)),
    ).orderBy(asc(scheduledClasses.opensAt), asc(scheduledClasses.id))
    return summarise(db, viewer, rows)
  },
)

/** Classes between two local days, both included, latest first; 500 at most. */
export const listBetween = timed(
  async (
    viewer: Viewer,
    params: { from: string; to: string },
    db: DbOrTx,
  ): Promise<ScheduledClassSummary[]> => {
    const rows = await selectClasses(
      db,
      and(
        visibleTo(viewer),
        gte(scheduledClasses.day, params.from),
        lte(scheduledClasses.day, params.to),
      ),
    )
      .orderBy(desc(scheduledClasses.day), asc(scheduledClasses.id))
      .limit(MOST_LISTED)
    return summarise(db, viewer, rows)
  },
)

/** The next class after today and the last one before it; either may be missing. */
export const nearestClasses = timed(
  async (
    viewer: Viewer,
    params: { now: Date },
    db: DbOrTx,
  ): Promise<{ next: ScheduledClassSummary | null; last: ScheduledClassSummary | null }> => {
    const day = localDay(viewer.gym.timeZone, params.now)
    const next = await selectClasses(db, and(visibleTo(viewer), gt(scheduledClasses.day, day)))
      .orderBy(asc(scheduledClasses.day), asc(scheduledClasses.id))
      .limit(1)
    const last = await selectClasses(db, and(visibleTo(viewer), lt(scheduledClasses.day, day)))
      .orderBy(desc(scheduledClasses.day), asc(scheduledClasses.id))
      .limit(1)
    const [nextSummary = null] = await summarise(db, viewer, next)
    const [lastSummary = null] = await summarise(db, viewer, last)
    return { next: nextSummary, last: lastSummary }
  },
)

/** One class with its frozen version. Throws `not-found` for another gym's, another group's or none. */
export const getScheduledClass = timed(
  async (
    viewer: Viewer,
    params: { scheduledClassId: string },
    db: DbOrTx,
  ): Promise<{ scheduledClass: ScheduledClassSummary; version: PublishedVersion }> => {
    const rows = await selectClasses(
      db,
      and(visibleTo(viewer), eq(scheduledClasses.id, params.scheduledClassId)),
    )
    const [scheduledClass] = await summarise(db, viewer, rows)
    const version = (
      await versionsOf(
        db,
        rows.map((row) => row.scheduled.versionId),
      )
    ).get(scheduledClass?.versionId ?? '')
    if (!scheduledClass || !version) throw new AppError('not-found', 'There is no such class.')
    return { scheduledClass, version }
  },
)
