/** Gyms, people and a class for data tests. Everything is invented. */
import { v7 } from 'uuid'
import type { Database } from '@/db/client'
import { classVersions } from '@/db/schema/class-versions'
import { gyms } from '@/db/schema/gyms'
import { healthAnswers } from '@/db/schema/health-answers'
import { memberships } from '@/db/schema/memberships'
import { people } from '@/db/schema/people'
import { scheduledClasses } from '@/db/schema/scheduled-classes'
import type { Role, Viewer } from '@/server/contract/viewer'
import {
  HEALTH_QUESTIONS,
  type HealthAnswers,
  type HealthQuestion,
} from '@/server/engine/fit/screening'
import type { PublishedVersion } from '@/server/engine/spec/version'
import type { ClassEvent } from '@/server/engine/tally/events'
import type { EventDraft } from '@/server/engine/timeline/run-types'
import { playerFixture } from './player-fixture'

export const NOW = new Date('2026-12-01T12:00:00Z')

/** A hash that verifies like any other, with cheap figures; nobody signs in with it. */
const NOBODY_KNOWS =
  '$argon2id$v=19$m=256,t=1,p=1$NfzUtnNZnR3+V8+1Wxrcpg$Sia3pgymzvBV1U3+L0o/JGrBMVLCCLIFpYu4kZmO5U8'

export interface TestGym {
  gymId: string
  scheduledClassId: string
  versionId: string
  classId: string
  version: PublishedVersion
  person(
    name: string,
    roles: Role[],
    more?: { group?: string; answered?: boolean | HealthQuestion[]; passwordHash?: string },
  ): Promise<Viewer>
}

export function answersWith(...yes: HealthQuestion[]): HealthAnswers {
  return Object.fromEntries(
    HEALTH_QUESTIONS.map((question) => [question, yes.includes(question)]),
  ) as HealthAnswers
}

/** A gym with one class open at `NOW`. `group`: only for that group. */
export async function makeGym(
  db: Database,
  name: string,
  more: { group?: string } = {},
): Promise<TestGym> {
  const gymId = v7()
  const versionId = v7()
  const classId = v7()
  const scheduledClassId = v7()
  const { version } = playerFixture()
  await db.insert(gyms).values({ id: gymId, name, timeZone: 'Europe/Oslo' })
  await db.insert(classVersions).values({
    id: versionId,
    gymId,
    classId,
    content: version,
    createdAt: new Date(NOW.getTime() - 7 * 86_400_000),
  })
  await db.insert(scheduledClasses).values({
    id: scheduledClassId,
    gymId,
    versionId,
    day: '2026-12-01',
    opensAt: new Date('2026-12-01T05:00:00Z'),
    closesAt: new Date('2026-12-01T22:00:00Z'),
    group: more.group ?? null,
  })
  return {
    gymId,
    scheduledClassId,
    versionId,
    classId,
    version,
    async person(personName, roles, { group, answered = true, passwordHash = NOBODY_KNOWS } = {}) {
      const personId = v7()
      const membershipId = v7()
      const email = `${personId}@example.org`
      await db.insert(people).values({ id: personId, email, name: personName, passwordHash })
      await db
        .insert(memberships)
        .values({ id: membershipId, gymId, personId, roles, group: group ?? null })
      if (answered !== false) {
        await db.insert(healthAnswers).values({
          id: v7(),
          membershipId,
          answers: answersWith(...(answered === true ? [] : answered)),
          createdAt: new Date(NOW.getTime() - 86_400_000),
        })
      }
      return {
        personId,
        membershipId,
        gymId,
        roles,
        name: personName,
        email,
        gym: { name, place: '', timeZone: 'Europe/Oslo' },
        gyms: [{ gymId, name }],
      }
    },
  }
}

/** Stamps drafts as a device would, from `seq` on. */
export function stamped(
  drafts: readonly EventDraft[],
  device = 'device-a',
  fromSeq = 1,
): ClassEvent[] {
  return drafts.map(
    (draft, index) =>
      ({
        ...draft,
        id: v7(),
        device,
        seq: fromSeq + index,
        wallMs: NOW.getTime() + index * 1_000,
      }) as ClassEvent,
  )
}
