import 'server-only'
/** People of a gym, their own kit and account. */
import { and, asc, eq, sql } from 'drizzle-orm'
import { v7 } from 'uuid'
import type { DbOrTx } from '@/db/client'
import { timed } from '@/db/deadline'
import { auditEntries } from '@/db/schema/audit-entries'
import { gyms } from '@/db/schema/gyms'
import { memberships } from '@/db/schema/memberships'
import { people } from '@/db/schema/people'
import { signInSessions } from '@/db/schema/sign-in-sessions'
import { AppError } from '@/server/contract/errors'
import type { Role, Viewer } from '@/server/contract/viewer'

export interface GymPerson {
  membershipId: string
  name: string
  email: string
  roles: Role[]
  group: string | null
  deactivated: boolean
}

export interface GymOverview {
  name: string
  place: string
  timeZone: string
  emergencyNumber: string | null
  healthIntervalDays: number
  people: GymPerson[]
}

/** The gym as its owner sees it: people and settings, no health data. Throws `not-found` for others. */
export const getGymOverview = timed(
  async (viewer: Viewer, _params: Record<string, never>, db: DbOrTx): Promise<GymOverview> => {
    if (!viewer.roles.includes('owner')) throw new AppError('not-found', 'There is no such page.')
    const [gym] = await db.select().from(gyms).where(eq(gyms.id, viewer.gymId))
    if (!gym) throw new AppError('not-found', 'There is no such gym.')
    const rows = await db
      .select({
        membershipId: memberships.id,
        name: people.name,
        email: people.email,
        roles: memberships.roles,
        group: memberships.group,
        deactivatedAt: memberships.deactivatedAt,
      })
      .from(memberships)
      .innerJoin(people, eq(people.id, memberships.personId))
      .where(eq(memberships.gymId, viewer.gymId))
      .orderBy(asc(people.name))
    return {
      name: gym.name,
      place: gym.place,
      timeZone: gym.timeZone,
      emergencyNumber: gym.emergencyNumber,
      healthIntervalDays: gym.healthIntervalDays,
      people: rows.map(({ deactivatedAt, ...person }) => ({
        ...person,
        deactivated: deactivatedAt !== null,
      })),
    }
  },
)

/** The viewer's own kit: item → how many. */
export const getKit = timed(
  async (
    viewer: Viewer,
    _params: Record<string, never>,
    db: DbOrTx,
  ): Promise<Record<string, number>> => {
    const [row] = await db
      .select({ kit: memberships.kit })
      .from(memberships)
      .where(eq(memberships.id, viewer.membershipId))
    return row?.kit ?? {}
  },
)

/** Replaces the viewer's own kit; weights in kilograms. */
export const saveKit = timed(
  async (
    viewer: Viewer,
    params: { kit: Record<string, number>; kitWeights: Record<string, number[]> },
    db: DbOrTx,
  ): Promise<void> => {
    await db
      .update(memberships)
      .set({ kit: params.kit, kitWeights: params.kitWeights })
      .where(eq(memberships.id, viewer.membershipId))
  },
)

/** Sets the viewer's own password and ends their other sessions, in one transaction. */
export const changeOwnPassword = timed(
  async (
    viewer: Viewer,
    params: { passwordHash: string; keepSessionId: string },
    db: DbOrTx,
  ): Promise<void> => {
    await db.transaction(async (tx) => {
      await tx
        .update(people)
        .set({ passwordHash: params.passwordHash })
        .where(eq(people.id, viewer.personId))
      await tx
        .delete(signInSessions)
        .where(
          and(
            eq(signInSessions.userId, viewer.personId),
            sql`${signInSessions.id} <> ${params.keepSessionId}`,
          ),
        )
      await tx.insert(auditEntries).values({
        id: v7(),
        gymId: viewer.gymId,
        personId: viewer.personId,
        action: 'password.changed',
        subject: viewer.personId,
      })
    })
  },
)

/** How many sessions the viewer has, this one among them. */
export const countSessions = timed(
  async (viewer: Viewer, _params: Record<string, never>, db: DbOrTx): Promise<number> => {
    const rows = await db
      .select({ id: signInSessions.id })
      .from(signInSessions)
      .where(
        and(eq(signInSessions.userId, viewer.personId), sql`${signInSessions.expiresAt} > now()`),
      )
    return rows.length
  },
)
