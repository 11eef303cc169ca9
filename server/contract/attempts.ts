/** What crosses the wire when a class is recorded and read again. */
import { z } from 'zod'
import { EVENTS_PER_REQUEST } from './batch'
import { eventSchema, type ClassEvent } from '../engine/tally/events'
import type { PublishedVersion } from '../engine/spec/version'
import type { AttemptTally } from '../engine/tally/types'
import type { HurtHold, ScheduledClassSummary } from './classes'

/** RFC 9562, version 7, lower or upper case. */
export const uuidV7Schema = z
  .string()
  .regex(/^[0-9a-f]{8}-[0-9a-f]{4}-7[0-9a-f]{3}-[89ab][0-9a-f]{3}-[0-9a-f]{12}$/i, 'Not a UUIDv7')

/** POST to paths.api.attemptEvents. Repeating it changes nothing. */
export const recordEventsInput = z.strictObject({
  scheduledClassId: z.string().min(1).max(64),
  versionId: z.string().min(1).max(64),
  /** Answer to 'anything new today?'; null: nothing new. Sent with the first batch, kept from there. */
  todayNote: z.string().max(500).nullable().optional(),
  events: z.array(eventSchema).min(1).max(EVENTS_PER_REQUEST),
})
export type RecordEventsInput = z.infer<typeof recordEventsInput>

/** Ids that are stored now, whether by this request or an earlier one. */
export interface RecordEventsResult {
  stored: string[]
  /** Highest seq stored in the attempt, so that another device's clock is overtaken. */
  highestSeq: number
}

export interface StoredEvent {
  event: ClassEvent
  receivedAt: string
}

/** A whole attempt, for the member's tally and the coach's row. */
export interface AttemptDto {
  attemptId: string
  membershipId: string
  memberName: string
  scheduledClass: ScheduledClassSummary
  versionId: string
  version: PublishedVersion
  late: boolean
  todayNote: string | null
  startedAt: string | null
  finishedAt: string | null
  lastEventAt: string | null
  tally: AttemptTally
  events: StoredEvent[]
  holds: HurtHold[]
}
