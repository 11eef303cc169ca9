import 'server-only'
/** What classes are fitted to. Body notes and rules are health data: the member's own, and that gym's coaches'. */
import { and, asc, eq, inArray } from 'drizzle-orm'
import { v7 } from 'uuid'
import type { DbOrTx } from '@/db/client'
import { timed } from '@/db/deadline'
import { auditEntries } from '@/db/schema/audit-entries'
import { memberships } from '@/db/schema/memberships'
import { optionRules } from '@/db/schema/option-rules'
import { people } from '@/db/schema/people'
import { AppError } from '@/server/contract/errors'
import { BODY_NOTES, type BodyNote, type FitProfile } from '@/server/contract/fit'
import type { Viewer } from '@/server/contract/viewer'
import { fit, type FittedStation, type FittedTo } from '@/server/engine/fit/fit'
import type { PublishedVersion } from '@/server/engine/spec/version'
import type { HurtPlace } from '@/server/engine/tally/events'
import { openHolds } from './health'

/** The viewer's own. */
export const getOwnFit = timed(
  async (viewer: Viewer, _params: Record<string, never>, db: DbOrTx): Promise<FitProfile> => {
    const profile = (await profilesOf(db, viewer.gymId, [viewer.membershipId])).get(
      viewer.membershipId,
    )
    if (!profile) throw new AppError('not-found', 'There is no such member.')
    return profile
  },
)

/** A member's, for a coach of their gym. Throws `not-found` for anybody else. */
export const getMemberFit = timed(
  async (viewer: Viewer, params: { membershipId: string }, db: DbOrTx): Promise<FitProfile> => {
    mustCoach(viewer)
    const profiles = await profilesOf(db, viewer.gymId, [params.membershipId])
    const profile = profiles.get(params.membershipId)
    if (!profile) throw new AppError('not-found', 'There is no such member.')
    return profile
  },
)

/**
 * A version fitted to the viewer: their notes, kit, wish, what hurt and is not cleared, and their coach's
 * rules. Nothing of pregnancy is in it.
 */
export const fitOwn = timed(
  async (
    viewer: Viewer,
    params: { version: PublishedVersion },
    db: DbOrTx,
  ): Promise<FittedStation[]> => {
    const profile = await getOwnFit(viewer, {}, db)
    const holds = await openHolds(db, viewer.membershipId)
    return fit(params.version, fittedTo(profile, holds))
  },
)

/** What `fit` takes, of a profile and all places that ever hurt. */
export function fittedTo(
  profile: FitProfile,
  holds: readonly {
    place: HurtPlace
    memberClearedAt: Date | string | null
    coachClearedAt: Date | string | null
  }[],
): FittedTo {
  return {
    notes: profile.bodyNotes,
    holds: holds
      .filter((hold) => hold.memberClearedAt === null || hold.coachClearedAt === null)
      .map((hold) => hold.place),
    wantsMore: profile.wantsMore,
    // Who has never said what they own is not taken for somebody who owns nothing.
    kit: Object.keys(profile.kit).length > 0 ? profile.kit : null,
    rules: profile.rules,
  }
}

/** Of members of one gym, by membership. Whoever calls has checked who asks. */
export async function profilesOf(
  db: DbOrTx,
  gymId: string,
  membershipIds: string[],
): Promise<Map<string, FitProfile>> {
  if (membershipIds.length === 0) return new Map()
  const rows = await db
    .select({
      id: memberships.id,
      kit: memberships.kit,
      kitWeights: memberships.kitWeights,
      bodyNotes: memberships.bodyNotes,
      wantsMore: memberships.wantsMore,
    })
    .from(memberships)
    .where(and(eq(memberships.gymId, gymId), inArray(memberships.id, membershipIds)))
  const rules = await db
    .select({
      membershipId: optionRules.membershipId,
      movement: optionRules.movement,
      option: optionRules.option,
      since: optionRules.createdAt,
      setBy: people.name,
    })
    .from(optionRules)
    .leftJoin(people, eq(people.id, optionRules.setBy))
    .where(inArray(optionRules.membershipId, membershipIds))
    .orderBy(asc(optionRules.movement))
  return new Map(
    rows.map(({ id, bodyNotes, ...row }) => [
      id,
      {
        ...row,
        bodyNotes: BODY_NOTES.filter((note) => bodyNotes.includes(note)),
        rules: rules
          .filter((rule) => rule.membershipId === id)
          .map(({ movement, option, setBy, since }) => ({
            movement,
            option,
            setBy,
            since: since.toISOString(),
          })),
      },
    ]),
  )
}

/** Replaces the viewer's own notes and wish. */
export const saveOwnFit = timed(
  async (
    viewer: Viewer,
    params: { bodyNotes: BodyNote[]; wantsMore: boolean },
    db: DbOrTx,
  ): Promise<void> => {
    await db
      .update(memberships)
      .set({ bodyNotes: params.bodyNotes, wantsMore: params.wantsMore })
      .where(eq(memberships.id, viewer.membershipId))
  },
)

/**
 * A coach's rule for a member: this movement, this way; an empty option takes it back. Throws `not-found`
 * for another gym's member or to no coach.
 */
export const setOptionRule = timed(
  async (
    viewer: Viewer,
    params: { membershipId: string; movement: string; option: string; now: Date },
    db: DbOrTx,
  ): Promise<void> => {
    mustCoach(viewer)
    const { membershipId, movement, option, now } = params
    await db.transaction(async (tx) => {
      const [member] = await tx
        .select({ id: memberships.id })
        .from(memberships)
        .where(and(eq(memberships.id, membershipId), eq(memberships.gymId, viewer.gymId)))
      if (!member) throw new AppError('not-found', 'There is no such member.')
      if (option === '') {
        await tx
          .delete(optionRules)
          .where(
            and(eq(optionRules.membershipId, membershipId), eq(optionRules.movement, movement)),
          )
      } else {
        const row = { option, setBy: viewer.personId, createdAt: now }
        await tx
          .insert(optionRules)
          .values({ id: v7(), membershipId, movement, ...row })
          .onConflictDoUpdate({
            target: [optionRules.membershipId, optionRules.movement],
            set: row,
          })
      }
      // Which movement and which way is health data: the audit tells only that a rule was changed.
      await tx.insert(auditEntries).values({
        id: v7(),
        gymId: viewer.gymId,
        personId: viewer.personId,
        action: option === '' ? 'rule.removed' : 'rule.set',
        subject: membershipId,
      })
    })
  },
)

function mustCoach(viewer: Viewer): void {
  if (!viewer.roles.includes('coach')) throw new AppError('not-found', 'There is no such member.')
}
