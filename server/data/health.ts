import 'server-only'
/** Health answers, and the easier options that stay after 'this hurts'. Seen by the member and the gym's coaches only. */
import { and, desc, eq, inArray, isNull, lte, or, sql } from 'drizzle-orm'
import { v7 } from 'uuid'
import type { DbOrTx } from '@/db/client'
import { timed } from '@/db/deadline'
import { auditEntries } from '@/db/schema/audit-entries'
import { gyms } from '@/db/schema/gyms'
import { healthAnswers } from '@/db/schema/health-answers'
import { hurtHolds } from '@/db/schema/hurt-holds'
import { memberships } from '@/db/schema/memberships'
import { people } from '@/db/schema/people'
import type { HealthStanding, HurtHold } from '@/server/contract/classes'
import { AppError } from '@/server/contract/errors'
import type { Viewer } from '@/server/contract/viewer'
import { standing, type HealthAnswers, type StandingInput } from '@/server/engine/fit/screening'

/** The latest answers of members, as the rules take them; with `givenBy`, the latest of then. */
export async function standingInputs(
  db: DbOrTx,
  membershipIds: string[],
  intervalDays: number,
  now: Date,
  givenBy?: Date,
): Promise<Map<string, StandingInput>> {
  if (membershipIds.length === 0) return new Map()
  const rows = await db
    .selectDistinctOn([healthAnswers.membershipId])
    .from(healthAnswers)
    .where(
      and(
        inArray(healthAnswers.membershipId, membershipIds),
        givenBy ? lte(healthAnswers.createdAt, givenBy) : undefined,
      ),
    )
    .orderBy(healthAnswers.membershipId, desc(healthAnswers.createdAt))
  return new Map(
    rows.map((row) => [
      row.membershipId,
      {
        answers: row.answers,
        answeredAtMs: row.createdAt.getTime(),
        clearedAtMs: row.clearedAt?.getTime() ?? null,
        limits: row.limits,
        intervalDays,
        nowMs: now.getTime(),
      },
    ]),
  )
}

/** How the viewer's own answers stand at `now`; with `givenBy`, by the answers that there were then. */
export const getHealth = timed(
  async (
    viewer: Viewer,
    params: { now: Date; givenBy?: Date },
    db: DbOrTx,
  ): Promise<HealthStanding> => {
    const [row] = await db
      .select({
        intervalDays: gyms.healthIntervalDays,
        adult: people.adult,
        consentAt: memberships.guardianConsentAt,
      })
      .from(memberships)
      .innerJoin(gyms, eq(gyms.id, memberships.gymId))
      .innerJoin(people, eq(people.id, memberships.personId))
      .where(eq(memberships.id, viewer.membershipId))
    if (!row) throw new AppError('not-found', 'You are not a member of this gym any more.')
    const inputs = await standingInputs(
      db,
      [viewer.membershipId],
      row.intervalDays,
      params.now,
      params.givenBy,
    )
    const input = inputs.get(viewer.membershipId)
    const consentMissing = !row.adult && row.consentAt === null
    const iso = (ms: number | null | undefined) =>
      ms === null || ms === undefined ? null : new Date(ms).toISOString()
    if (!input) {
      return {
        answers: null,
        answeredAt: null,
        goodUntil: null,
        standing: 'open',
        clearedAt: null,
        limits: [],
        consentMissing,
      }
    }
    const now = standing(input)
    return {
      answers: input.answers,
      answeredAt: iso(input.answeredAtMs),
      goodUntil: iso(now.goodUntilMs),
      standing: now.standing,
      clearedAt: iso(input.clearedAtMs),
      limits: [...input.limits],
      consentMissing,
    }
  },
)

/** Keeps a new set of the viewer's own answers, with clearance stated or limits chosen at once if they were. */
export const saveHealth = timed(
  async (
    viewer: Viewer,
    params: { answers: HealthAnswers; cleared: boolean; limits: string[]; now: Date },
    db: DbOrTx,
  ): Promise<void> => {
    await db.transaction(async (tx) => {
      await tx.insert(healthAnswers).values({
        id: v7(),
        membershipId: viewer.membershipId,
        answers: params.answers,
        clearedAt: params.cleared ? params.now : null,
        limits: params.limits,
        createdAt: params.now,
      })
      await tx.insert(auditEntries).values({
        id: v7(),
        gymId: viewer.gymId,
        personId: viewer.personId,
        action: 'health.answered',
        subject: viewer.membershipId,
      })
    })
  },
)

/** Places that still keep a member on easier options: not yet cleared by both. */
export async function openHolds(db: DbOrTx, membershipId: string): Promise<HurtHold[]> {
  const rows = await db
    .select()
    .from(hurtHolds)
    .where(
      and(
        eq(hurtHolds.membershipId, membershipId),
        or(isNull(hurtHolds.memberClearedAt), isNull(hurtHolds.coachClearedAt)),
      ),
    )
    .orderBy(desc(hurtHolds.createdAt))
  return rows.map((row) => ({
    id: row.id,
    place: row.place,
    since: row.createdAt.toISOString(),
    memberClearedAt: row.memberClearedAt?.toISOString() ?? null,
    coachClearedAt: row.coachClearedAt?.toISOString() ?? null,
  }))
}

export const listOwnHolds = timed(
  (viewer: Viewer, _params: Record<string, never>, db: DbOrTx): Promise<HurtHold[]> =>
    openHolds(db, viewer.membershipId),
)

/** The member says that it is well again, or the coach does; it takes both. Repeating changes nothing. */
export const clearHold = timed(
  async (
    viewer: Viewer,
    params: { holdId: string; as: 'member' | 'coach'; now: Date },
    db: DbOrTx,
  ): Promise<void> => {
    const own = eq(hurtHolds.membershipId, viewer.membershipId)
    const ofGym = inArray(
      hurtHolds.membershipId,
      db
        .select({ id: memberships.id })
        .from(memberships)
        .where(eq(memberships.gymId, viewer.gymId)),
    )
    if (params.as === 'coach' && !viewer.roles.includes('coach')) throw notThere()
    const at = sql`${params.now.toISOString()}::timestamptz`
    await db.transaction(async (tx) => {
      const changed = await tx
        .update(hurtHolds)
        .set(
          params.as === 'coach'
            ? { coachClearedAt: sql`coalesce(${hurtHolds.coachClearedAt}, ${at})` }
            : { memberClearedAt: sql`coalesce(${hurtHolds.memberClearedAt}, ${at})` },
        )
        .where(and(eq(hurtHolds.id, params.holdId), params.as === 'coach' ? ofGym : own))
        .returning({ id: hurtHolds.id })
      if (changed.length === 0) throw notThere()
      await tx.insert(auditEntries).values({
        id: v7(),
        gymId: viewer.gymId,
        personId: viewer.personId,
        action: `hold.cleared-by-${params.as}`,
        subject: params.holdId,
      })
    })
  },
)

function notThere(): AppError {
  return new AppError('not-found', 'That note is not there any more.')
}
