/** A class that is dense with beeps, in a gym of its own, and the session of a member who may play it. */
import { createHash, randomBytes } from 'node:crypto'
import { v7 } from 'uuid'
import type { Database } from '@/db/client'
import { demoMovements } from '@/db/seed/movements'
import { classVersions } from '@/db/schema/class-versions'
import { healthAnswers } from '@/db/schema/health-answers'
import { scheduledClasses } from '@/db/schema/scheduled-classes'
import { signInSessions } from '@/db/schema/sign-in-sessions'
import type { Block } from '@/server/engine/spec/schema'
import type { PublishedVersion } from '@/server/engine/spec/version'
import { answersWith, makeGym } from './gym'

const DAY_MS = 86_400_000

/**
 * Work after a count-in, so that every sound of it is a mark of the compiled class: a class that begins
 * with work, or comes to it from a brief, sounds its start as well.
 */
export function beepingClass(format: Block['format']): PublishedVersion {
  const block: Block = { id: 'beeps', kind: 'work', title: 'Short pieces', format }
  return { spec: { spec: 1, title: 'Sounding line', blocks: [block] }, movements: demoMovements }
}

export interface Planted {
  gymId: string
  versionId: string
  scheduledClassIds: string[]
}

/** Puts `version` into a gym of its own that has it `howOften` times today. */
export async function plantClass(
  db: Database,
  version: PublishedVersion,
  howOften = 1,
): Promise<Planted & { member(name: string): Promise<{ membershipId: string; cookie: string }> }> {
  const gym = await makeGym(db, 'Sounding Hall')
  const now = new Date()
  const versionId = v7()
  await db
    .insert(classVersions)
    .values({ id: versionId, gymId: gym.gymId, classId: v7(), content: version })
  const scheduledClassIds = Array.from({ length: howOften }, () => v7())
  await db.insert(scheduledClasses).values(
    scheduledClassIds.map((id) => ({
      id,
      gymId: gym.gymId,
      versionId,
      day: now.toISOString().slice(0, 10),
      opensAt: new Date(now.getTime() - DAY_MS),
      closesAt: new Date(now.getTime() + DAY_MS),
    })),
  )
  return {
    gymId: gym.gymId,
    versionId,
    scheduledClassIds,
    async member(name) {
      const { membershipId, personId } = await gym.person(name, ['member'], { answered: false })
      await db
        .insert(healthAnswers)
        .values({ id: v7(), membershipId, answers: answersWith(), createdAt: now })
      return { membershipId, cookie: await signedInAs(db, personId, gym.gymId) }
    },
  }
}

/** A session of the person's: the value of its cookie. Signing in a crowd by password would take minutes. */
export async function signedInAs(
  db: Database,
  personId: string,
  gymId: string | null = null,
): Promise<string> {
  const token = randomBytes(32).toString('base64url')
  const until = new Date(Date.now() + DAY_MS)
  await db.insert(signInSessions).values({
    id: createHash('sha256').update(token).digest('hex'),
    userId: personId,
    expiresAt: until,
    absoluteExpiresAt: until,
    gymId,
  })
  return token
}
