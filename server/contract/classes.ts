/** Classes as members and coaches see them in lists and before class. Instants are ISO 8601 text. */
import type { BlockKind } from '../engine/spec/schema'
import type { PublishedVersion } from '../engine/spec/version'
import type { AttemptState, AttemptTally } from '../engine/tally/types'
import type { FittedStation } from '../engine/fit/fit'
import type { HealthAnswers } from '../engine/fit/screening'
import type { ClassEvent, HurtPlace } from '../engine/tally/events'

export interface ScheduledClassSummary {
  scheduledClassId: string
  versionId: string
  title: string
  focus: string | null
  day: string
  opensAt: string
  closesAt: string
  group: string | null
  coachName: string | null
  /** Class time plus briefs. */
  realLengthMs: number
  classLengthMs: number
  /** Its blocks in order, for a small picture to scale; together as long as the class. */
  blocks: { kind: BlockKind; lengthMs: number }[]
  /** My own attempts, latest first; empty for a coach's list. */
  myAttempts: { attemptId: string; state: AttemptState; startedAt: string | null }[]
}

export interface HealthStanding {
  /** Latest answers, if any. */
  answers: HealthAnswers | null
  answeredAt: string | null
  goodUntil: string | null
  /** `open`: must be answered; `blocked`: read, not play; `clearance`: states clearance or chooses limits first; `clear`. */
  standing: 'open' | 'blocked' | 'clearance' | 'clear'
  clearedAt: string | null
  limits: string[]
  /** A guardian's consent is missing for somebody who is not an adult. */
  consentMissing: boolean
}

export interface HurtHold {
  id: string
  place: HurtPlace
  since: string
  memberClearedAt: string | null
  coachClearedAt: string | null
}

/** All that the player needs; after this the client is on its own. */
export interface PlayerData {
  scheduledClass: ScheduledClassSummary
  versionId: string
  version: PublishedVersion
  /** The viewer's, to key what is kept in the browser. */
  membershipId: string
  memberName: string
  kit: Record<string, number>
  health: HealthStanding
  holds: HurtHold[]
  /** The option to start with at every station, and why. */
  fitted: FittedStation[]
  emergencyNumber: string | null
  /** Latest attempt not yet finished or stopped, with its events, to go on from another device. */
  openAttempt: { attemptId: string; events: ClassEvent[] } | null
  /** Last finished attempt of the same class or version, for 'last time'. */
  lastTally: AttemptTally | null
}
