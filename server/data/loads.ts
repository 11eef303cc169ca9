import 'server-only'
/** What the gym's classes ask of its members. For coaches. */
import { and, eq, gte, isNull, lt } from 'drizzle-orm'
import type { DbOrTx } from '@/db/client'
import { timed } from '@/db/deadline'
import { hurtHolds } from '@/db/schema/hurt-holds'
import { memberships } from '@/db/schema/memberships'
import { scheduledClasses } from '@/db/schema/scheduled-classes'
import { AppError } from '@/server/contract/errors'
import type { StationSwaps, WeeksLoad } from '@/server/contract/load'
import type { Viewer } from '@/server/contract/viewer'
import { fit } from '@/server/engine/fit/fit'
import { classLoad, sumLoads } from '@/server/engine/load/class-load'
import { AS_PLANNED } from '@/server/engine/spec/names'
import type { PublishedVersion } from '@/server/engine/spec/version'
import { localDay, versionsOf } from './classes'
import { fittedTo, profilesOf } from './fit'

const WEEKS = 4
const DAY_MS = 86_400_000

function mustCoach(viewer: Viewer): void {
  if (!viewer.roles.includes('coach')) throw new AppError('not-found', 'There is no such class.')
}

/** The sum of what the classes of the last four weeks, up to yesterday, asked for as planned. */
export const weeksLoad = timed(
  async (viewer: Viewer, params: { now: Date }, db: DbOrTx): Promise<WeeksLoad> => {
    mustCoach(viewer)
    const { timeZone } = viewer.gym
    const from = localDay(timeZone, new Date(params.now.getTime() - WEEKS * 7 * DAY_MS))
    const rows = await db
      .select({ versionId: scheduledClasses.versionId })
      .from(scheduledClasses)
      .where(
        and(
          eq(scheduledClasses.gymId, viewer.gymId),
          gte(scheduledClasses.day, from),
          lt(scheduledClasses.day, localDay(timeZone, params.now)),
        ),
      )
    const versions = await versionsOf(
      db,
      rows.map((row) => row.versionId),
    )
    const loads = new Map([...versions].map(([id, version]) => [id, classLoad(version)]))
    return {
      ...sumLoads(rows.flatMap((row) => loads.get(row.versionId) ?? [])),
      classes: rows.length,
    }
  },
)

/** For every station how many of the gym's active members it starts on another option. */
export const swapsOf = timed(
  async (
    viewer: Viewer,
    params: { version: PublishedVersion },
    db: DbOrTx,
  ): Promise<StationSwaps[]> => {
    mustCoach(viewer)
    const active = (
      await db
        .select({ id: memberships.id, roles: memberships.roles })
        .from(memberships)
        .where(and(eq(memberships.gymId, viewer.gymId), isNull(memberships.deactivatedAt)))
    ).filter((row) => row.roles.includes('member'))
    const profiles = await profilesOf(
      db,
      viewer.gymId,
      active.map((row) => row.id),
    )
    const holds = await db
      .select({
        membershipId: hurtHolds.membershipId,
        place: hurtHolds.place,
        memberClearedAt: hurtHolds.memberClearedAt,
        coachClearedAt: hurtHolds.coachClearedAt,
      })
      .from(hurtHolds)
      .innerJoin(memberships, eq(memberships.id, hurtHolds.membershipId))
      .where(eq(memberships.gymId, viewer.gymId))
    const counts = new Map<string, StationSwaps>()
    for (const [membershipId, profile] of profiles) {
      const own = holds.filter((hold) => hold.membershipId === membershipId)
      for (const { block, station, option } of fit(params.version, fittedTo(profile, own))) {
        const key = `${block}/${station}`
        const count = counts.get(key) ?? { block, station, members: 0, of: profiles.size }
        if (option !== AS_PLANNED) count.members += 1
        counts.set(key, count)
      }
    }
    return [...counts.values()]
  },
)
