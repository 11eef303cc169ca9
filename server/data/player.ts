import 'server-only'
import { and, desc, eq } from 'drizzle-orm'
import type { DbOrTx } from '@/db/client'
import { timed } from '@/db/deadline'
import { attempts } from '@/db/schema/attempts'
import { classVersions } from '@/db/schema/class-versions'
import { gyms } from '@/db/schema/gyms'
import { memberships } from '@/db/schema/memberships'
import type { PlayerData } from '@/server/contract/classes'
import { AppError } from '@/server/contract/errors'
import type { Viewer } from '@/server/contract/viewer'
import { fold } from '@/server/engine/tally/fold'
import type { AttemptTally } from '@/server/engine/tally/types'
import { eventsOf, openAttemptOf } from './attempts'
import { getScheduledClass } from './classes'
import { fitOwn } from './fit'
import { getHealth, openHolds } from './health'

/**
 * All that the player needs for a class of the viewer's; after this the client is on its own. An open
 * attempt is played on the version that it began on. Throws `not-found` for a class that is not theirs.
 */
export const getPlayerData = timed(
  async (
    viewer: Viewer,
    params: { scheduledClassId: string; now: Date },
    db: DbOrTx,
  ): Promise<PlayerData> => {
    if (!viewer.roles.includes('member')) throw new AppError('not-found', 'There is no such class.')
    const { scheduledClass, version } = await getScheduledClass(viewer, params, db)
    const [own] = await db
      .select({ kit: memberships.kit, emergencyNumber: gyms.emergencyNumber })
      .from(memberships)
      .innerJoin(gyms, eq(gyms.id, memberships.gymId))
      .where(eq(memberships.id, viewer.membershipId))
    const open = await openAttemptOf(db, viewer, params.scheduledClassId)
    const begunOn = open && open.versionId !== scheduledClass.versionId ? open.versionId : null
    const [older] = begunOn
      ? await db
          .select({ content: classVersions.content })
          .from(classVersions)
          .where(and(eq(classVersions.id, begunOn), eq(classVersions.gymId, viewer.gymId)))
      : []
    return {
      scheduledClass,
      versionId: older && begunOn ? begunOn : scheduledClass.versionId,
      version: older?.content ?? version,
      membershipId: viewer.membershipId,
      memberName: viewer.name,
      kit: own?.kit ?? {},
      health: await getHealth(viewer, { now: params.now }, db),
      holds: await openHolds(db, viewer.membershipId),
      fitted: await fitOwn(viewer, { version: older?.content ?? version }, db),
      emergencyNumber: own?.emergencyNumber ?? null,
      openAttempt: open ? { attemptId: open.attemptId, events: open.events } : null,
      lastTally: await lastTally(db, viewer, scheduledClass.versionId),
    }
  },
)

/** Tally of the latest finished attempt on the same version, so that its blocks are the same. */
async function lastTally(
  db: DbOrTx,
  viewer: Viewer,
  versionId: string,
): Promise<AttemptTally | null> {
  const [last] = await db
    .select({ id: attempts.id, version: classVersions.content })
    .from(attempts)
    .innerJoin(classVersions, eq(classVersions.id, attempts.versionId))
    .where(
      and(
        eq(attempts.membershipId, viewer.membershipId),
        eq(attempts.versionId, versionId),
        eq(attempts.state, 'finished'),
      ),
    )
    .orderBy(desc(attempts.createdAt))
    .limit(1)
  return last ? fold(last.version, await eventsOf(db, last.id)) : null
}
